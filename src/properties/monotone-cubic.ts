/** A smooth curve through a table that never swings beyond it; all arrays of the same length n ≥ 2. */
export interface MonotoneCubic {
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** slope at each point */
  readonly slope: Float64Array;
}

/**
 * Prepare a monotone cubic interpolation: between two points the curve rises or falls as the table does.
 * Slopes are those of the parabola through three neighbours, cut back where they would overshoot.
 *
 * @param x  ascending, length n ≥ 2
 * @param y  length n
 * @source F. N. Fritsch & R. E. Carlson, SIAM J. Numer. Anal. 17, 238 (1980)
 */
export function createMonotoneCubic(x: readonly number[], y: readonly number[]): MonotoneCubic {
  const n = x.length;
  const secant = Float64Array.from({ length: n - 1 }, (_, k) => (y[k + 1] - y[k]) / (x[k + 1] - x[k]));
  const slope = new Float64Array(n);
  for (let k = 1; k < n - 1; k++) {
    const [left, right] = [secant[k - 1], secant[k]];
    const [toLeft, toRight] = [x[k] - x[k - 1], x[k + 1] - x[k]];
    slope[k] = left * right > 0 ? (left * toRight + right * toLeft) / (toLeft + toRight) : 0;
  }
  slope[0] = n > 2 ? endSlope(secant[0], slope[1]) : secant[0];
  slope[n - 1] = n > 2 ? endSlope(secant[n - 2], slope[n - 2]) : secant[0];
  cutBack(slope, secant);
  return { x: Float64Array.from(x), y: Float64Array.from(y), slope };
}

/** Value at T between the first and the last point of the table. */
export function interpolate(curve: MonotoneCubic, T: number): number {
  const { x, y, slope } = curve;
  const k = intervalAt(x, T);
  const width = x[k + 1] - x[k];
  const t = (T - x[k]) / width;
  const u = 1 - t;
  return (
    u * u * ((1 + 2 * t) * y[k] + t * width * slope[k]) +
    t * t * ((1 + 2 * u) * y[k + 1] - u * width * slope[k + 1])
  );
}

/** Slope at T between the first and the last point of the table. */
export function interpolateSlope(curve: MonotoneCubic, T: number): number {
  const { x, y, slope } = curve;
  const k = intervalAt(x, T);
  const width = x[k + 1] - x[k];
  const t = (T - x[k]) / width;
  const u = 1 - t;
  const secant = (y[k + 1] - y[k]) / width;
  return 6 * t * u * secant + u * (u - 2 * t) * slope[k] + t * (t - 2 * u) * slope[k + 1];
}

/** The parabola over the first (last) interval that has the neighbour's slope, held to the table's direction. */
function endSlope(secant: number, neighbour: number): number {
  const slope = 2 * secant - neighbour;
  return slope * secant > 0 ? slope : 0;
}

function cutBack(slope: Float64Array, secant: Float64Array): void {
  for (let k = 0; k < secant.length; k++) {
    if (secant[k] === 0) {
      slope[k] = 0;
      slope[k + 1] = 0;
      continue;
    }
    const size = Math.hypot(slope[k] / secant[k], slope[k + 1] / secant[k]);
    if (size > 3) {
      slope[k] *= 3 / size;
      slope[k + 1] *= 3 / size;
    }
  }
}

function intervalAt(x: Float64Array, T: number): number {
  let low = 0;
  let high = x.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (T < x[middle]) high = middle;
    else low = middle;
  }
  return low;
}
