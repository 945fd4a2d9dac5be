/**
 * The form of a problem file and of a suite's `suite.yaml`: which keys there are, what each holds, and the JSON Schema
 * that is published from it (`tolerand schema`). Every part carries two texts: `error` completes the sentence
 * "expected ...", the description says what the key is for. What a form cannot say (a length that is a formula, a name
 * that clashes) is checked in check.ts.
 */
import { z } from "zod";
import { distributionIds, parameterNames } from "./distributions/registry.js";
import { CONSTRUCTIONS } from "./gaussian/constructions.js";
import { PROCESSES, processIds } from "./gaussian/paths.js";
import { DEFAULT_CONFIDENCE, DEFAULT_SETTINGS, DEFAULT_SIZES_TEXT, LIMITS } from "./defaults.js";

/** Names of inputs and constants: as a formula writes them. */
const NAME = /^[A-Za-z][A-Za-z0-9_]*$/;

const name = z.string().regex(NAME, { error: "a name of letters, digits and _ that begins with a letter" });

const text = (what: string) => z.string({ error: what });

/** A number, or a formula of numbers and of the constants of the file. */
const number = (what: string) => z.union([z.number(), z.string().min(1)], { error: `${what}, or a formula` });

const list = (what: string, longest: number) => {
  const error = `${what}, at most ${longest}`;
  return z.array(number("a number"), { error }).min(1, { error }).max(longest, { error });
};

const constant = z.union(
  [
    number("a number"),
    list("numbers", LIMITS.elements),
    z.array(list("rows of numbers", LIMITS.elements)).min(1),
  ],
  { error: "a number, a formula, a vector such as [1, 2, 3] or a matrix such as [[1, 2], [3, 4]]" },
);

/** Which distribution takes which parameter is checked in check.ts, where unknown keys are found too. */
const input = z
  .object(
    {
      distribution: z
        .enum(distributionIds, {
          error: "a distribution such as uniform or normal (`tolerand distributions` lists them)",
        })
        .optional()
        .describe("Law of every coordinate; `tolerand distributions` lists them with their parameters."),
      path: z
        .enum(processIds, { error: `a process: ${processIds.join(", ")}` })
        .optional()
        .describe("Instead of `distribution`: the input is a path of this process at `length` times."),
      file: text("the path of a CSV file")
        .min(1)
        .optional()
        .describe("CSV file of an empirical input, in the folder of the problem file."),
      column: text("the name of a column")
        .min(1)
        .optional()
        .describe("Column of that file; needed where it has several."),
      construction: z
        .enum(CONSTRUCTIONS, { error: `a construction: ${CONSTRUCTIONS.join(", ")}` })
        .optional()
        .meta({ description: "How a path is made from normals.", default: "increments" }),
      length: number("a whole number of coordinates, 1 or more")
        .optional()
        .describe("Coordinates of a vector; without it the input is a single number."),
    },
    { error: "a mapping such as { distribution: normal, length: 64 }" },
  )
  .catchall(
    z.union([z.number(), z.string().min(1), z.array(z.union([z.number(), z.string().min(1)])).min(1)], {
      error: "a number, a formula, or a list of them",
    }),
  );

/** Parameters that are lists. */
const LISTS = new Set(["values", "probabilities", "times"]);

/** The parameters of all distributions, as the published schema lists them beside an input's own keys. */
function parameterProperties(): Record<string, z.core.JSONSchema.JSONSchema> {
  const properties: Record<string, z.core.JSONSchema.JSONSchema> = {};
  const users = new Map<string, string[]>(parameterNames());
  for (const [id, { parameters }] of Object.entries(PROCESSES)) {
    for (const key of [...Object.keys(parameters), "times"]) {
      if (users.get(key)?.includes(id) !== true) users.set(key, [...(users.get(key) ?? []), id]);
    }
  }
  for (const [key, ids] of users) {
    const one: z.core.JSONSchema.JSONSchema[] = [{ type: "number" }, { type: "string", minLength: 1 }];
    const list = LISTS.has(key);
    const anyOf: z.core.JSONSchema.JSONSchema[] = list ? [{ type: "array", items: { anyOf: one } }] : one;
    properties[key] = { anyOf, description: `Parameter of ${ids.join(", ")}.` };
  }
  return properties;
}

const dependence = z.strictObject(
  {
    inputs: z
      .array(text("the name of an input"), { error: "a list of names of inputs" })
      .min(2, { error: "names of two inputs or more" })
      .or(z.array(text("the name of an input")).length(1))
      .optional()
      .describe("The inputs that hang together; all if absent."),
    correlation: z
      .union(
        [
          number("a correlation"),
          z
            .array(
              z
                .array(z.union([z.number(), z.string().min(1)]))
                .min(1)
                .max(LIMITS.elements),
            )
            .min(1),
        ],
        { error: "one correlation for all pairs, a matrix, or the name of a matrix constant" },
      )
      .optional()
      .describe("Of the normals behind the inputs: one number for all pairs, a matrix, or its name."),
    factor: z
      .union([number("a share"), z.array(z.union([z.number(), z.string().min(1)])).min(1)], {
        error: "the share of a common factor in the variance: one number or a list",
      })
      .optional()
      .describe("Instead of `correlation`: share of one common factor in the variance of each component."),
    construction: z
      .enum(["cholesky", "principal-components"], { error: "cholesky or principal-components" })
      .optional()
      .meta({ description: "Factor of the correlation matrix.", default: "cholesky" }),
  },
  { error: "a mapping such as { inputs: [x, y], correlation: 0.5 }" },
);

const reference = z.strictObject(
  {
    value: number("the exact value in digits").describe("Digits, or a formula of numbers and constants."),
    uncertainty: number("the absolute standard uncertainty, 0 or more")
      .optional()
      .meta({ description: "Absolute standard uncertainty of the value, 0 where it is exact.", default: 0 }),
    basis: text("the published source or the derivation of the value, as text")
      .min(1, { error: "the published source or the derivation of the value, as text" })
      .describe("Where the value comes from: the published source or the derivation."),
  },
  { error: "a mapping with value and basis; leave the key out for a consensus of sound sources" },
);

const tolerance = z.strictObject(
  {
    absolute: number("a number above 0").optional().describe("Largest absolute error that is acceptable."),
    relative: number("a number above 0")
      .optional()
      .describe("Largest error as a fraction of what `to` names; instead of `absolute`."),
    to: text("reference, or the name of a constant").optional().meta({
      description: "What `relative` refers to: `reference`, or the name of a constant that is a number.",
      default: "reference",
    }),
    confidence: number("a number between 0.5 and 1").optional().meta({
      description: "Probability with which the error must stay within the tolerance, above 0.5 and below 1.",
      default: DEFAULT_CONFIDENCE,
    }),
  },
  { error: "a mapping such as { absolute: 0.01, confidence: 0.99 }" },
);

const declared = z.strictObject(
  {
    line: text("what the contribution is, as text").min(1).describe("What the contribution is."),
    bias: number("a bound of the bias, 0 or more").optional().describe("Bound of a systematic contribution."),
    deviation: number("a standard deviation, 0 or more")
      .optional()
      .describe("Standard deviation of a random contribution; instead of `bias`."),
    basis: text("where the figure comes from, as text").min(1).describe("Where the figure comes from."),
  },
  { error: "a mapping such as { line: weekly time step, bias: 0.002, basis: halved step }" },
);

const inUse = z.strictObject(
  {
    source: text("the id of a source such as mt19937").min(1).describe("Source that production uses today."),
    points: number("a whole number of points, 2 or more").describe("Evaluations that production spends."),
    secondsPerPoint: number("seconds above 0")
      .optional()
      .describe(
        "Time of one evaluation in production; without it the measured time of this program is used.",
      ),
  },
  { error: "a mapping such as { source: mt19937, points: 100000 }" },
);

const source = z.union([z.string().min(1), z.record(z.string(), z.unknown())], {
  error: "the id of a source such as philox4x32, or a mapping that describes your own",
});

const study = z.strictObject(
  {
    sources: z
      .array(source, { error: "a list of sources such as [philox4x32, sobol+owen]" })
      .min(1, { error: "at least one source such as philox4x32" })
      .optional()
      .meta({
        description: "Sources to be compared: ids, ids with randomisations, or descriptions of your own.",
        default: DEFAULT_SETTINGS.sources,
      }),
    sizes: z
      .union([z.string().min(1), z.number(), z.array(number("a number of points")).min(1)], {
        error: 'sizes such as "2^8..2^16", "1000..1000000 by 10" or [1000, 5000]',
      })
      .optional()
      .meta({
        description: "Numbers of points: doubling between two ends, by another factor, or a list.",
        default: DEFAULT_SIZES_TEXT,
      }),
    replicates: number("a whole number of replicates, 2 or more").optional().meta({
      description: "Independent repetitions of each estimate.",
      default: DEFAULT_SETTINGS.replicates,
    }),
    estimators: z
      .array(text("the name of an estimator"), { error: "a list of estimators such as [crude]" })
      .min(1, { error: "at least one estimator such as crude" })
      .optional()
      .meta({
        description: "Ways to form an estimate from the points.",
        default: DEFAULT_SETTINGS.estimators,
      }),
    falseAlarms: number("a number above 0 and below 0.5").optional().meta({
      description: "Probability of any false finding of bias in a whole study.",
      default: DEFAULT_SETTINGS.falseAlarms,
    }),
    seed: number("a whole number from 0 to 2^53 - 1")
      .optional()
      .meta({ description: "Seed of the study.", default: DEFAULT_SETTINGS.seed }),
  },
  { error: "a mapping of settings such as { replicates: 32 }" },
);

export const problemSchema = z
  .strictObject({
    title: text("a title, as text")
      .min(1)
      .optional()
      .describe("One line for reports; the file name if absent."),
    about: text("a description, as text")
      .optional()
      .describe("What the problem is and why it is of interest."),
    inputs: z
      .record(name, input, { error: "a mapping from names to inputs such as x: { distribution: uniform }" })
      .refine((inputs) => Object.keys(inputs).length > 0, {
        error: "at least one input such as x: { distribution: uniform }",
      })
      .describe("Random inputs by name; they take their coordinates in order."),
    dependence: dependence.optional().describe("How inputs hang together; without it they are independent."),
    constants: z
      .record(name, constant, { error: "a mapping from names to numbers, vectors or matrices" })
      .optional()
      .describe("Numbers, vectors and matrices by name; a formula may use those before it."),
    integrand: text("the integrand, as text in the formula language")
      .min(1, { error: "the integrand, as text in the formula language" })
      .describe("The function to be integrated, in the formula language; its last line is the value."),
    quantity: z
      .union(
        [
          z.enum(["mean", "probability", "ratio", "variance"]),
          z.strictObject({ quantile: number("a level between 0 and 1") }),
          z.strictObject({ shortfall: number("a level between 0 and 1") }),
        ],
        { error: "mean, probability, ratio, variance, { quantile: 0.99 } or { shortfall: 0.975 }" },
      )
      .optional()
      .meta({
        description:
          "What is asked of the integrand: its `mean`, the `probability` of a condition, the `ratio` of the means of its two values, its `variance`, its quantile (`{ quantile: 0.99 }`) or the mean beyond it (`{ shortfall: 0.975 }`).",
        default: "mean",
      }),
    reference: reference
      .optional()
      .describe("The exact value; without it a consensus of sound sources is formed and said."),
    tolerance: tolerance.describe("How large an error is acceptable, and how surely."),
    declared: z
      .array(declared, { error: "a list of contributions" })
      .optional()
      .describe("Contributions to the error that you declare yourself."),
    inUse: inUse.optional().describe("What production does today; the verdict of the problem is about it."),
    study: study.optional().describe("Settings of the study; each has a default."),
  })
  .describe("A problem for tolerand: an integrand, its inputs, its exact value if known, and a tolerance.");

const total = z.strictObject(
  {
    weights: z
      .record(z.string(), number("a weight other than 0"), {
        error: "a mapping from problems of the suite to weights such as { season-guarantee: 40 }",
      })
      .refine((weights) => Object.keys(weights).length > 0, { error: "at least one problem with a weight" })
      .describe("How often each problem counts in the sum; problems without a weight are not in it."),
    tolerance: z
      .strictObject(
        {
          absolute: number("a number above 0").describe(
            "Largest absolute error of the sum that is acceptable.",
          ),
          confidence: number("a number between 0.5 and 1").optional().meta({
            description:
              "Probability with which the error of the sum must stay within it, above 0.5 and below 1.",
            default: DEFAULT_CONFIDENCE,
          }),
        },
        { error: "a mapping such as { absolute: 10, confidence: 0.99 }" },
      )
      .describe("The tolerance on the weighted sum."),
  },
  { error: "a mapping with weights and tolerance" },
);

export const suiteSchema = z
  .strictObject({
    title: text("a title, as text")
      .min(1)
      .optional()
      .describe("One line for listings; the folder name if absent."),
    about: text("a description, as text")
      .optional()
      .describe("What the problems of the folder have in common."),
    problems: z
      .array(text("the name of a shipped problem such as tidal/season-guarantee"), {
        error: "a list of shipped problems such as [tidal/season-guarantee]",
      })
      .optional()
      .describe("Shipped problems that the suite takes in beside the files of its folder, as suite/problem."),
    study: study
      .optional()
      .describe("Settings shared by the problems of the folder; a problem's own come first."),
    total: total
      .optional()
      .describe("A weighted sum of the problems with one tolerance: `tolerand plan` allocates points to it."),
  })
  .describe("Shared settings of the problem files in one folder.");

/** What a problem file holds once its form is right. */
export type ProblemFile = z.infer<typeof problemSchema>;
export type SuiteFile = z.infer<typeof suiteSchema>;
export type StudyFile = z.infer<typeof study>;

/** The JSON Schema (draft 2020-12) of a problem file, as published by `tolerand schema`. */
export function problemJsonSchema(): Record<string, unknown> {
  return {
    ...z.toJSONSchema(problemSchema, {
      io: "input",
      override: ({ zodSchema, jsonSchema }) => {
        if (zodSchema !== (input as unknown)) return;
        jsonSchema.properties = { ...jsonSchema.properties, ...parameterProperties() };
        jsonSchema.additionalProperties = false;
      },
    }),
  };
}

/** The JSON Schema (draft 2020-12) of `suite.yaml`. */
export function suiteJsonSchema(): Record<string, unknown> {
  return { ...z.toJSONSchema(suiteSchema, { io: "input" }) };
}
