/** The face of the room: what other rooms may call. */
export { compileFormula, describeFormula, evaluateConstant } from "./compile.js";
export type { FormulaDescription } from "./compile.js";
export { FUNCTIONS, NAMED_NUMBERS, RESERVED_WORDS } from "./language.js";
export { interpretFormula } from "./interpret.js";
export { languageTables } from "./reference-text.js";
