/** The flags of `tolerand inspect` as what is asked about a source. */
import { DEFAULT_SETTINGS } from "../problem/defaults.js";
import { parseInteger } from "../numeric/integer-formula.js";
import type { InspectionRequest } from "../structure/contract.js";
import type { Arguments, Io } from "./command.js";
import { asInput, InputError } from "./errors.js";
import { messages } from "./messages.js";
import { booleanFlag, textFlag, textOrFile, wholeFlag } from "./read.js";

const USUAL_DIMENSIONS = "2..16";
const USUAL_SPAN = 12;

/** More dimensions than any section has a use for. */
const LARGEST_DIMENSION = 10_000;

/** Index sets have at most this many members. */
const LARGEST_SET = 48;

export function inspectionRequest(args: Arguments, io: Io): InspectionRequest {
  const asked = textFlag(args, "dimension");
  const state = textFlag(args, "state");
  const indices = textFlag(args, "indices");
  return {
    dimensions: dimensionsOf(asked ?? USUAL_DIMENSIONS),
    dimensionsGiven: asked !== null,
    points: pointsOf(textFlag(args, "points")),
    streams: wholeFlag(args, "streams", 1) ?? 1,
    state: state === null ? null : textOrFile(state, "state", io).trim(),
    indices: indices === null ? null : indicesOf(indices),
    span: wholeFlag(args, "span", 2) ?? USUAL_SPAN,
    ...(booleanFlag(args, "discrepancy") ? { discrepancy: discrepancyRequest(args) } : {}),
  };
}

function discrepancyRequest(args: Arguments): NonNullable<InspectionRequest["discrepancy"]> {
  return {
    seed: wholeFlag(args, "seed", 0) ?? DEFAULT_SETTINGS.seed,
    allowPrograms: booleanFlag(args, "allow-programs"),
  };
}

/** "2..16", "3,5,8" or one number. */
function dimensionsOf(text: string): number[] {
  const refuse = (): never => {
    throw new InputError(messages.dimensions(LARGEST_DIMENSION, text));
  };
  const whole = (part: string): number => {
    const value = /^\d{1,6}$/.test(part.trim()) ? Number(part) : NaN;
    return value >= 2 && value <= LARGEST_DIMENSION ? value : refuse();
  };
  const [from = "", to, ...more] = text.split("..");
  if (more.length > 0) refuse();
  if (to === undefined) return [...new Set(text.split(",").map(whole))].sort((a, b) => a - b);
  const [first, last] = [whole(from), whole(to)];
  if (first > last) refuse();
  return Array.from({ length: last - first + 1 }, (_, k) => first + k);
}

function pointsOf(text: string | null): number | null {
  if (text === null) return null;
  const points = Number(asInput(() => parseInteger(text, "--points")));
  if (points >= 1 && points <= Number.MAX_SAFE_INTEGER) return points;
  throw new InputError(messages.wholeNumber("points", 1, text));
}

/** "0,1,5". */
function indicesOf(text: string): number[] {
  const indices = text.split(",").map((part) => (/^\d{1,9}$/.test(part.trim()) ? Number(part) : NaN));
  if (indices.some(Number.isNaN) || indices.length > LARGEST_SET) {
    throw new InputError(messages.indices(LARGEST_SET, text));
  }
  const repeated = indices.find((index, j) => indices.indexOf(index) !== j);
  if (repeated !== undefined) throw new InputError(messages.repeatedIndex(repeated, text));
  return indices.sort((a, b) => a - b);
}
