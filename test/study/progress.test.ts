// Progress with a clock of our own: a bar on a terminal, few plain lines elsewhere.
import { describe, expect, it } from "vitest";
import { startProgress, timeText } from "../../src/study/progress.js";

function fake(isTTY: boolean) {
  const written: string[] = [];
  return { written, stream: { isTTY, write: (text: string) => written.push(text) } };
}

describe("progress", () => {
  it("draws a bar with the time left on a terminal", () => {
    const { written, stream } = fake(true);
    let clock = 0;
    const progress = startProgress("study", 10, stream, () => clock);
    clock = 3000;
    progress.advance(3);
    expect(written).toEqual(["\r\u001b[Kstudy ━━━━━━━·················  30 %  7.0 s left"]);
    clock = 10_000;
    progress.finish();
    expect(written.slice(1).join("")).toBe("\r\u001b[Kstudy: 10 s\n");
  });

  it("writes a plain line every ten seconds elsewhere", () => {
    const { written, stream } = fake(false);
    let clock = 0;
    const progress = startProgress("study", 4, stream, () => clock);
    clock = 5000;
    progress.advance(1);
    clock = 10_000;
    progress.advance(1);
    expect(written).toEqual(["study: 50 %, 10 s left\n"]);
  });

  it("words times as people do", () => {
    expect([400, 9949, 9951, 59_600, 200_000, 7_500_000].map(timeText)).toEqual([
      "0.4 s",
      "9.9 s",
      "10 s",
      "1 min 0 s",
      "3 min 20 s",
      "2 h 5 min",
    ]);
  });
});
