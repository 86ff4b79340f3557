const GOLDEN = (3 - Math.sqrt(5)) / 2;
const MAX_STEPS = 40;

/**
 * The lowest point of a smooth function of one variable between a and b, where it has one valley: parabolas
 * through the last three points, golden sections where they do not help.
 *
 * @param tolerance  of x, absolute; the value is good to its square
 * @returns where the lowest value met lies, and the value
 * @source R. P. Brent, Algorithms for Minimization without Derivatives (1973), ch. 5
 */
export function lowestPoint(
  f: (x: number) => number,
  a: number,
  b: number,
  tolerance: number,
): { readonly x: number; readonly value: number } {
  let [low, high] = [a, b];
  let x = low + GOLDEN * (high - low);
  let fx = f(x);
  // w and v are the second and third best points; step and its forerunner tell whether parabolas shrink.
  let [w, fw, v, fv] = [x, fx, x, fx];
  let step = 0;
  let before = 0;
  for (let n = 0; n < MAX_STEPS; n++) {
    const middle = 0.5 * (low + high);
    if (Math.abs(x - middle) <= 2 * tolerance - 0.5 * (high - low)) break;
    const parabola = Math.abs(before) > tolerance ? vertex(x, fx, w, fw, v, fv) : Number.NaN;
    const fits = parabola > low && parabola < high && Math.abs(parabola - x) < 0.5 * Math.abs(before);
    before = fits ? step : (x < middle ? high : low) - x;
    step = fits ? parabola - x : GOLDEN * before;
    const u = x + (Math.abs(step) >= tolerance ? step : Math.sign(step || 1) * tolerance);
    const fu = f(u);
    if (fu <= fx) {
      if (u < x) high = x;
      else low = x;
      [v, fv, w, fw, x, fx] = [w, fw, x, fx, u, fu];
    } else {
      if (u < x) low = u;
      else high = u;
      if (fu <= fw || w === x) [v, fv, w, fw] = [w, fw, u, fu];
      else if (fu <= fv || v === x || v === w) [v, fv] = [u, fu];
    }
  }
  return { x, value: fx };
}

/** Where the parabola through three points has its vertex; NaN where they lie on a line. */
function vertex(x: number, fx: number, w: number, fw: number, v: number, fv: number): number {
  const r = (x - w) * (fx - fv);
  const q = (x - v) * (fx - fw);
  return x - ((x - v) * q - (x - w) * r) / (2 * (q - r));
}
