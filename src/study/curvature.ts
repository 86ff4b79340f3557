/** An estimate of how f and its limits bend, learnt from slopes and always positive definite. */
export interface Curvature {
  readonly rows: readonly Float64Array[];
  /** take in the slopes of the Lagrangian after and before a step */
  learn(step: Float64Array, after: Float64Array, before: Float64Array): void;
}

/** Where the estimate would lose its sign, the change of slope is drawn towards what the estimate foresaw. */
const DAMPING = 0.2;

/**
 * BFGS with damping; begins as large as the slopes, so that the first step crosses the box.
 *
 * @source J. Nocedal & S. J. Wright, Numerical Optimization, 2nd ed. (2006), (6.20), for the first size
 * @source M. J. D. Powell, Lecture Notes in Mathematics 630 (1978) 144-157
 */
export function createCurvature(size: number, slopes: Float64Array): Curvature {
  const steepest = slopes.reduce((most, value) => Math.max(most, Math.abs(value)), 1e-3);
  const rows = Array.from({ length: size }, (_, i) => {
    const row = new Float64Array(size);
    row[i] = steepest;
    return row;
  });
  let isFirst = true;

  /** Once something is known of how f bends, the guess that the estimate began with gets that size. */
  function rescale(step: Float64Array, change: Float64Array): void {
    const bend = dot(change, step);
    if (!(bend > 0)) return;
    isFirst = false;
    const size = dot(change, change) / bend;
    for (const [i, row] of rows.entries()) row[i] = size;
  }

  return {
    rows,
    learn(step, after, before) {
      if (isFirst)
        rescale(
          step,
          after.map((value, i) => value - before[i]!),
        );
      const foreseen = rows.map((row) => dot(row, step));
      const bend = dot(Float64Array.from(foreseen), step);
      if (!(bend > 1e-18)) return;
      const change = after.map((value, i) => value - before[i]!);
      const found = dot(change, step);
      const share = found >= DAMPING * bend ? 1 : ((1 - DAMPING) * bend) / (bend - found);
      const y = change.map((value, i) => share * value + (1 - share) * foreseen[i]!);
      const curved = dot(y, step);
      for (let i = 0; i < size; i++) {
        for (let j = 0; j < size; j++) {
          rows[i]![j]! += (y[i]! * y[j]!) / curved - (foreseen[i]! * foreseen[j]!) / bend;
        }
      }
    },
  };
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
