/**
 * Hermite's constants gamma_t: the largest squared length that the shortest vector of a lattice of determinant 1 in t
 * dimensions can have. Exact for t = 1...8 and 24 (J. H. Conway and N. J. A. Sloane, Sphere Packings, Lattices and
 * Groups, 3rd ed. (1999), table 1.2 and chapter 1; t = 24: H. Cohn and A. Kumar, Annals of Mathematics 170 (2009) 1003-1050).
 *
 * Beyond, two bounds. From above gamma_t = 4 delta^(2/t), delta the bound on centre densities of C. A. Rogers, "The packing
 * of equal spheres", Proceedings of the London Mathematical Society 8 (1958) 609-620, as P. L'Ecuyer, "Tables of linear
 * congruential generators of different sizes and good lattice structure", Mathematics of Computation 68 (1999) 249-260, takes
 * it: delta = sqrt(t + 1) t! Omega / 2^(t/2), Omega the share of a sphere that a corner of the regular simplex sees, which is
 * the chance that t normal variables of correlations -1/t are all positive, E Phi(i W / sqrt(t + 1))^t with W standard
 * normal. Computed from that integral with PARI/GP 2.15.2 at 77 digits along two contours, which agree to 17 digits or more.
 * From below the densest lattices known for t = 9...16 (Conway and Sloane, table 1.2: Lambda9, Lambda10, K11, K12, K13,
 * Lambda14, Lambda15, Lambda16).
 */

/** gamma_t^t. */
const EXACT: Readonly<Record<number, number>> = {
  1: 1,
  2: 4 / 3,
  3: 2,
  4: 4,
  5: 8,
  6: 64 / 3,
  7: 64,
  8: 256,
  24: 4 ** 24,
};

/** gamma_t of Rogers' bound, t = 9 ... 48. */
const ROGERS: readonly number[] = [
  2.141237211002, 2.275197374375959, 2.40815140537497, 2.540221894671545, 2.671509549188845,
  2.802098205485399, 2.932058468749575, 3.061450409491573, 3.190325598581644, 3.318728667847221,
  3.446698524084622, 3.574269305647199, 3.701471144961494, 3.828330782747924, 3.954872067530659,
  4.081116365420179, 4.207082898990112, 4.3327890295933, 4.458250494167412, 4.583481605126861,
  4.708495420090333, 4.833303886787971, 4.957917967413134, 5.082347745847693, 5.206602520536788,
  5.33069088527493, 5.454620799757762, 5.578399651428366, 5.702034309885562, 5.825531174910252,
  5.948896218994083, 6.072135025114133, 6.195252820381975, 6.31825450610009, 6.441144684679595,
  6.563927683807289, 6.686607578194944, 6.80918820919743, 6.931673202547159, 7.054065984419305,
];
const FIRST_OF_ROGERS = 9;

/** Centre densities, t = 9 ... 16. */
const DENSEST: Readonly<Record<number, number>> = {
  9: 1 / (16 * Math.SQRT2),
  10: 1 / (16 * Math.sqrt(3)),
  11: 1 / (18 * Math.sqrt(3)),
  12: 1 / 27,
  13: 1 / (18 * Math.sqrt(3)),
  14: 1 / (16 * Math.sqrt(3)),
  15: 1 / (16 * Math.SQRT2),
  16: 1 / 16,
};

export const LARGEST_HERMITE = 48;

export interface HermiteConstant {
  /** gamma_t, or a number that it does not exceed. */
  readonly most: number;
  /** gamma_t, or a number that it is not below; null where none is kept. */
  readonly least: number | null;
  readonly exact: boolean;
}

/** For t = 1 ... 48; throws a RangeError beyond. */
export function hermiteConstant(t: number): HermiteConstant {
  const power = EXACT[t];
  if (power !== undefined) {
    const value = power ** (1 / t);
    return { most: value, least: value, exact: true };
  }
  const most = ROGERS[t - FIRST_OF_ROGERS];
  if (most === undefined) {
    throw new RangeError(`dimension: expected a whole number from 1 to ${LARGEST_HERMITE}, found ${t}`);
  }
  const density = DENSEST[t];
  return { most, least: density === undefined ? null : 4 * density ** (2 / t), exact: false };
}
