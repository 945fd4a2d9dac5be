// Sorting of vectors of points: row r of a vector holds element r for two points, and both lanes are sorted at once.
//
// Merge exchange (K. E. Batcher, "Sorting networks and their applications", Proc. AFIPS Spring Joint Computer
// Conference 32 (1968) 307-314; Knuth, The Art of Computer Programming, vol. 3, 5.2.2, Algorithm M): the comparisons do
// not depend on the data, so one minimum and one maximum serve both points. About n log2(n)^2 / 4 of them. A NaN
// spreads to both results of a comparison, and as a sorting network leads from every place to every other, all elements
// of a point with a NaN become NaN.

/** Sorts `rows` vectors, the first at `at`, `stride` bytes apart, in ascending order. */
export function sortRows(at: usize, rows: i32, stride: i32): void {
  if (rows < 2) return;
  let top = 1 << (31 - clz(rows - 1));
  for (let p = top; p > 0; p >>= 1) {
    let q = top, r = 0, d = p;
    for (;;) {
      let gap = <usize>(d * stride);
      for (let i = 0; i < rows - d; i++) {
        if ((i & p) != r) continue;
        let low = at + <usize>(i * stride);
        let a = v128.load(low), b = v128.load(low + gap);
        v128.store(low, f64x2.min(a, b));
        v128.store(low + gap, f64x2.max(a, b));
      }
      if (q == p) break;
      d = q - p;
      q >>= 1;
      r = p;
    }
  }
}
