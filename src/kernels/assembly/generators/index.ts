// Exports of the generators group of kernels.
export {
  keepEvery32,
  keepEvery64,
  rowsMidpoint32,
  rowsMidpoint64,
  rowsQuotient64,
  rowsScaled32,
  rowsScaled64,
} from "./convert";
export { fillFolded, fillGeneral, fillPowerOfTwo, fillShort, fractionWords } from "./congruential";
export { fillMt19937 } from "./mt19937";
export { fillPcg64 } from "./pcg64";
export { fillPhilox4x32 } from "./philox4x32";
export { fillXoshiro256PlusPlus } from "./xoshiro256";
