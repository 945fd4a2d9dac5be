// Exports of the math group of kernels.
export { vec_erf } from "./erf";
export { vec_erfc } from "./erfc";
export { vec_gamma } from "./gamma";
export { vec_lgamma } from "./lgamma";
export { vec_normalPdf } from "./normal-pdf";
export { vec_normalCdf } from "./normal-cdf";
export { vec_normalQuantile, normalQuantile_special } from "./normal-quantile";
export { normalBlock, normalBlockScratch } from "./normal-block";
export { vec_exp, vec_expm1, exp_special, expm1_special } from "./exp";
export { vec_log, vec_log1p, log_special, log1p_special } from "./log";
