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
export { pow_special, vec_pow } from "./pow"; // in this order: both inline logThen, and vec_pow calls the other within it
export { vec_log2, vec_log10, log2_special, log10_special } from "./log-bases";
export { vec_cbrt, cbrt_special } from "./cbrt";
export { vec_sin, vec_cos, vec_tan, sin_special, cos_special, tan_special } from "./sine";
export { sortRows } from "./sort-rows";
export { vec_atan, vec_atan2, atan_special, atan2_special } from "./atan";
export { vec_asin, vec_acos } from "./asin";
export { vec_sinh, vec_cosh, vec_tanh, sinh_special, cosh_special, tanh_special } from "./hyperbolic";
