// Quantiles of discrete laws as a block pass: the least value whose distribution function reaches u.
//
// A guide of equal cells of u says where to begin; from there a few steps forward (H.-C. Chen and Y. Asau, "On generating
// random variates from an empirical distribution", AIIE Transactions 6 (1974) 163-166). Good for: any finite table, in
// about constant time. Bad at: a cell with very many values of small mass, which are walked one by one.

/**
 * Replaces the uniforms in `rows` rows of `count` values; value i of row r stands at pointer + (r * stride + i) * 8.
 * `table`: number of cells (a power of two), number of values, the first value of each cell, the distribution function at
 * each value (rounded down; the last is 1), the values. u below 0 gives the first, above 1 and NaN give NaN.
 */
export function stepsBlock(pointer: usize, stride: i32, rows: i32, count: i32, table: usize): void {
  let cells = load<f64>(table);
  let guide = table + 16;
  let reached = guide + (<usize>cells << 3);
  let values = reached + (<usize>load<f64>(table, 8) << 3);
  for (let r = 0; r < rows; r++) {
    let end = pointer + (<usize>count << 3);
    for (let at = pointer; at < end; at += 8) {
      let u = load<f64>(at);
      if (!(u <= 1)) {
        store<f64>(at, NaN);
        continue;
      }
      let cell = max(0, min(u * cells, cells - 1));
      let k = <usize>load<f64>(guide + (<usize>cell << 3)) << 3;
      while (load<f64>(reached + k) < u) k += 8;
      store<f64>(at, load<f64>(values + k));
    }
    pointer += <usize>stride << 3;
  }
}
