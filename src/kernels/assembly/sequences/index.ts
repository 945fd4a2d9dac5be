// Exports of the sequences group of kernels.
export { net2Fill, net2FillOwen, net2Natural, net2Seek } from "./net2";
export { net2Scramble } from "./linear";
export { owenHash } from "./owen";
