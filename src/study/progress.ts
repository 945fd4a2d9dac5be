/** Progress of a run on standard error: a bar with the time left on a terminal, a plain line now and then elsewhere. */

export interface ProgressStream {
  readonly isTTY?: boolean;
  write(text: string): unknown;
}

export interface Progress {
  /** `work` of the units of the stage are done. */
  advance(work: number): void;
  finish(): void;
}

const BAR = 24;
const TERMINAL_INTERVAL = 100;
const PLAIN_INTERVAL = 10_000;

/** Progress of one stage of `total` units of work. `now` gives milliseconds. */
export function startProgress(
  stage: string,
  total: number,
  stream: ProgressStream,
  now: () => number = () => performance.now(),
): Progress {
  const started = now();
  const terminal = stream.isTTY === true;
  let done = 0;
  let shown = started;
  const show = (): void => {
    const share = total === 0 ? 1 : done / total;
    const percent = `${Math.floor(share * 100)} %`.padStart(5);
    const left = share > 0 ? timeText(((now() - started) * (1 - share)) / share) : "…";
    if (terminal) {
      const filled = Math.round(share * BAR);
      stream.write(
        `\r\u001b[K${stage} ${"━".repeat(filled)}${"·".repeat(BAR - filled)} ${percent}  ${left} left`,
      );
    } else {
      stream.write(`${stage}: ${percent.trim()}, ${left} left\n`);
    }
  };
  return {
    advance(work) {
      done += work;
      const interval = terminal ? TERMINAL_INTERVAL : PLAIN_INTERVAL;
      if (now() - shown < interval) return;
      shown = now();
      show();
    },
    finish() {
      if (terminal) stream.write("\r\u001b[K");
      stream.write(`${stage}: ${timeText(now() - started)}\n`);
    },
  };
}

/** "0.4 s", "12 s", "3 min 20 s", "2 h 5 min". */
export function timeText(milliseconds: number): string {
  const seconds = milliseconds / 1000;
  if (seconds < 9.95) return `${seconds.toFixed(1)} s`;
  const whole = Math.round(seconds);
  if (whole < 60) return `${whole} s`;
  if (whole < 3600) return `${Math.floor(whole / 60)} min ${whole % 60} s`;
  return `${Math.floor(whole / 3600)} h ${Math.floor((whole % 3600) / 60)} min`;
}
