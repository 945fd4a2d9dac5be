// Exports of the sequences group of kernels.
export { haltonFill, haltonFillLeaped, haltonPrepare } from "./halton";
export { net2Scramble } from "./linear";
export { net2Fill, net2FillOwen, net2Natural, net2Seek } from "./net2";
export { netbFill, netbSeek } from "./netb";
export { owenHash } from "./owen";
export { radicalFill, radicalSeek } from "./radical";
export { rotationFill, rotationSeek } from "./rotation";
export { boxesPass, latinPass, latinPrepare } from "./strata";
