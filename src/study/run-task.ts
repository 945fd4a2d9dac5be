/** Running one task: open the source for each replicate, integrate, estimate. Pure: the same task, the same result. */
import { estimatorOf } from "../estimators/registry.js";
import { parseSource, type SourceChoice } from "../sources/choice.js";
import type { OpenStream } from "../sources/contract.js";
import { makeKey } from "../sources/key.js";
import { quantityKind } from "../quantities/registry.js";
import { estimateSizes } from "./estimate-sizes.js";
import { Integrator, type IntegrationResult } from "./integrator.js";
import { watchOpening } from "./opening.js";
import type { RunnableProblem } from "./runnable.js";
import type { Offence, Opening, ReplicateResult, Task, TaskResult } from "./tasks.js";

function runAndClose(
  integrator: Integrator,
  stream: OpenStream,
  sizes: readonly number[],
  keep: Float64Array | null,
): IntegrationResult {
  try {
    return integrator.run(stream, sizes, 0, keep);
  } finally {
    stream.close?.();
  }
}

/** Keeps what a thread needs again: one integrator per problem, one parsed source per id. */
export class TaskRunner {
  readonly #problems: ReadonlyMap<string, RunnableProblem>;
  readonly #integrators = new Map<string, Integrator>();
  readonly #sources = new Map<string, SourceChoice>();

  readonly #allowPrograms: boolean;

  /** `allowPrograms`: whether the command line gave leave to start users' programs. */
  constructor(problems: readonly RunnableProblem[], allowPrograms = false) {
    this.#allowPrograms = allowPrograms;
    this.#problems = new Map(problems.map((problem) => [problem.id, problem]));
  }

  run(task: Task): TaskResult {
    const started = performance.now();
    const integrator = this.#integrator(task.problem);
    const source = this.#source(task);
    const { formula, quantity } = this.#problem(task.problem);
    const { dimension } = formula;
    const kind = quantityKind(quantity);
    const estimators = task.estimators.map(estimatorOf);
    const n = task.sizes.at(-1) ?? 0;
    const values = kind.by === "sorted" ? new Float64Array(n) : null;
    const origin = kind.by === "moments" && kind.squares ? integrator.origin : 0;
    const results: ReplicateResult[] = [];
    const offences: Offence[] = [];
    const openings: Opening[] = [];
    let endpoints = 0;
    const { arena } = integrator.kernels;
    const mark = arena.mark();
    for (let replicate = task.from; replicate < task.to; replicate++) {
      const { seed, purpose, problem, sourceId } = task;
      const key = makeKey({
        seed,
        purpose,
        problem,
        source: sourceId,
        replicate,
        ...(task.perSize ? { n } : {}),
      });
      const stream = source.open(
        {
          dimension,
          n,
          key: source.deterministic ? null : key,
          replicate: task.before + replicate,
          allowPrograms: this.#allowPrograms,
        },
        integrator.kernels,
      );
      const opening = watchOpening(stream, integrator.kernels);
      const integration = runAndClose(integrator, stream, task.sizes, values);
      arena.release(mark);
      openings.push({ replicate, digest: opening() });
      endpoints += stream.endpointsHit?.() ?? 0;
      if (integration.offending !== null) offences.push({ replicate, ...integration.offending });
      const { sizes } = integration;
      results.push(...estimateSizes({ quantity, estimators, replicate, sizes, values, origin }));
    }
    const points = n * (task.to - task.from);
    const seconds = (performance.now() - started) / 1000;
    return { id: task.id, results, offences, openings, endpoints, points, seconds };
  }

  #problem(id: string): RunnableProblem {
    const problem = this.#problems.get(id);
    if (problem === undefined) throw new Error(`task for unknown problem "${id}"`);
    return problem;
  }

  #integrator(id: string): Integrator {
    let integrator = this.#integrators.get(id);
    if (integrator === undefined) {
      const problem = this.#problem(id);
      const kind = quantityKind(problem.quantity);
      integrator = new Integrator(problem, { squares: kind.by === "moments" && kind.squares });
      this.#integrators.set(id, integrator);
    }
    return integrator;
  }

  #source(task: Task): SourceChoice {
    let source = this.#sources.get(task.sourceId);
    if (source === undefined) {
      source = parseSource(task.source);
      this.#sources.set(task.sourceId, source);
    }
    return source;
  }
}
