/** Where a stream of a pseudo-random source begins: at a key's state, a published one, or further on. */
import type { IntegerRequest, OpenRequest, ReplicateSupply } from "./contract.js";
import type { Recurrence, State, Usage } from "./recurrence.js";
import { seedOf, validSeeds, type Seeding } from "./seeding.js";

/** The request with the state that the source's seeding names, unless it names one itself. */
export function seeded<R extends IntegerRequest & { readonly replicate?: number }>(
  seeding: Seeding,
  request: R,
): R {
  const seed = request.state ?? seedOf(seeding, request.replicate ?? 0);
  return seed === null ? request : { ...request, state: seed };
}

/**
 * As many replicates as there are seeds. One stream per coordinate takes the seeds s, s + 1, ...: a stride below the
 * dimension would hand a coordinate's stream to the next replicate.
 */
export function supplyOfSeeds(
  recurrence: Recurrence,
  { seeding, tuples }: Usage,
  dimension: number,
): ReplicateSupply {
  const { id } = recurrence.about;
  const perCoordinate = tuples.kind === "per-coordinate";
  if (seeding.kind === "published" && perCoordinate && seeding.stride < BigInt(dimension)) {
    throw new RangeError(
      `source.seeding: expected a stride of at least ${dimension} for source "${id}", whose ${dimension} coordinates take one seed each, found ${seeding.stride}`,
    );
  }
  const valid = (seed: string): boolean => {
    try {
      recurrence.stateFromText(perCoordinate ? nextSeed(seed, dimension - 1) : seed);
      return true;
    } catch (error) {
      if (error instanceof RangeError) return false;
      throw error;
    }
  };
  return { count: validSeeds(seeding, valid), why: "it has no more valid seeds" };
}

/** The state that a request names, or its key's, moved on by its jump. */
export function startingState(recurrence: Recurrence, { key, state, jump }: IntegerRequest): State {
  if (jump !== undefined) {
    const start = startingState(recurrence, { key, ...(state === undefined ? {} : { state }) });
    if (recurrence.advance !== undefined) return recurrence.advance(start, jump);
    throw new RangeError(`jump: source "${recurrence.about.id}" cannot jump`);
  }
  if (state !== undefined) return recurrence.stateFromText(state);
  if (key !== null) return recurrence.stateFromKey(key);
  throw new TypeError(`key: source "${recurrence.about.id}" needs a key or a state, found neither`);
}

/** One starting state, or one per coordinate: from keys below the stream's, or from published seeds s, s + 1, ... */
export function startingStates(recurrence: Recurrence, usage: Usage, asked: OpenRequest): readonly State[] {
  const request = seeded(usage.seeding, asked);
  if (usage.tuples.kind === "strided") return [startingState(recurrence, request)];
  return Array.from({ length: request.dimension }, (_, j) => {
    const { state, key, jump } = request;
    return startingState(recurrence, {
      key: key?.derive(`coordinate ${j}`) ?? null,
      ...(state === undefined ? {} : { state: nextSeed(state, j) }),
      ...(jump === undefined ? {} : { jump }),
    });
  });
}

function nextSeed(seed: string, j: number): string {
  if (/^\d+$/.test(seed)) return (BigInt(seed) + BigInt(j)).toString();
  throw new RangeError(`state: expected one whole number with tuples per-coordinate, found "${seed}"`);
}
