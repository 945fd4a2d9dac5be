// Exports of the math group of kernels.
export { vec_normalQuantile } from "./normal-quantile";
export { normalBlock, normalBlockScratch } from "./normal-block";
export { vec_exp, vec_expm1, exp_special, expm1_special } from "./exp";
export { vec_log, vec_log1p, log_special, log1p_special } from "./log";
