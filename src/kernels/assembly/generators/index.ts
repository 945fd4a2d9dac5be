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
export { fillLecuyer1988, fillMrg32k3a, fillWichmannHill } from "./combined";
export { fillFolded, fillGeneral, fillPowerOfTwo, fillShort, fractionWords } from "./congruential";
export { fillChaCha20, fillChaCha8 } from "./chacha";
export { fillPhilox4x64, fillThreefry4x64 } from "./counter4x64";
export { fillKiss64, fillKiss99, fillMwc } from "./kiss";
export { fillKnuthArray, fillR250, fillSubtractive55, fillSubtractWithBorrow } from "./lagged";
export { fillMt19937 } from "./mt19937";
export { fillMt19937x64 } from "./mt19937-64";
export { fillPcg32 } from "./pcg32";
export { fillPcg64, fillPcg64Dxsm } from "./pcg64";
export { fillPhilox4x32 } from "./philox4x32";
export { fillSfc64, fillSplitMix64 } from "./small64";
export { fillRecursive, fillXorshiftTriple32, fillXorshiftTriple64 } from "./recursive";
export { fillLfsr113, fillTaus88 } from "./tausworthe";
export { fillProgression, fillSpan32 } from "./states";
export { fillXoroshiro128Plus, fillXoroshiro128PlusPlus, fillXoroshiro128StarStar } from "./xoroshiro128";
export { fillXorshift128, fillXorshift32, fillXorshift64Star } from "./xorshift";
export { fillXoshiro256Plus, fillXoshiro256PlusPlus, fillXoshiro256StarStar } from "./xoshiro256";
