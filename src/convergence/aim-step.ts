import { undecided } from './fighting-aims.ts';
import { singularValues } from './singular-values.ts';

/** The least that the other aims must be told apart by when one is given up at a bound [-]. */
const APART = 1e-3;

/** A step of the settings, with those that bounds hold and the aims given up for them. */
export interface AimStep {
  readonly du: Float64Array;
  /** −1 held at its lower bound, 1 at its upper, 0 free */
  readonly held: Int8Array;
  /** aims given up, as many as settings held */
  readonly given: Uint8Array;
}

/**
 * The step toward all aims: Newton's where damping is 0, shorter and turned downhill with more of it. Combinations of
 * aims that no setting moves have no say, so that aims that fight meet where the squares of their misses are least.
 * A setting that would leave its bound is held there and one aim is given up for it, its own where the others can be
 * met by the settings left; they go on toward their targets.
 *
 * @param damping  relative to the largest singular value
 * @param aside  1 for an aim that is not gone for
 */
export function aimStep(
  J: readonly Float64Array[],
  u: Float64Array,
  f: Float64Array,
  damping: number,
  aside: Uint8Array,
): AimStep {
  const n = u.length;
  const held = new Int8Array(n);
  const given = aside.slice();
  const du = new Float64Array(n);
  for (let round = 0; round <= n; round++) {
    const aims = kept(given);
    const free = kept(held);
    du.fill(0);
    if (aims.length === 0) break;
    const part = aims.map((i) => Float64Array.from(free, (j) => J[i][j]));
    const found = damped(
      part,
      aims.map((i) => f[i]),
      damping,
    );
    free.forEach((j, k) => {
      du[j] = found[k];
    });
    const out = free.find((j) => (u[j] <= 0 && du[j] < 0) || (u[j] >= 1 && du[j] > 0));
    if (out === undefined) break;
    held[out] = du[out] < 0 ? -1 : 1;
    du[out] = 0;
    given[givenUp(J, aims, kept(held), out)] = 1;
  }
  return { du, held, given };
}

/** The aim to give up for a setting that is held: its own, unless the rest can only be met without another. */
function givenUp(
  J: readonly Float64Array[],
  aims: readonly number[],
  free: readonly number[],
  own: number,
): number {
  const order = [own, ...aims].filter((i) => aims.includes(i));
  const apart = order.find((i) => {
    const rest = aims.filter((one) => one !== i).map((one) => Float64Array.from(free, (j) => J[one][j]));
    if (rest.length === 0) return true;
    const { sigma } = singularValues(
      rest.map((row) => row.map((value) => value / (Math.hypot(...row) || 1))),
    );
    return sigma.at(-1)! > APART;
  });
  return apart ?? order[0];
}

function kept(marks: ArrayLike<number>): number[] {
  return Array.from(marks, (mark, i) => (mark === 0 ? i : -1)).filter((i) => i >= 0);
}

/** −Σ v σ (w·f)/(σ² + λ²) over the combinations that can be told apart. */
function damped(J: readonly Float64Array[], f: readonly number[], damping: number): Float64Array {
  const du = new Float64Array(J[0]?.length ?? 0);
  const { sigma, w, v } = singularValues(J);
  const lambda = damping * sigma[0];
  const usable = J.length - undecided(J);
  for (let k = 0; k < usable && sigma[k] > 0; k++) {
    const along = w[k].reduce((sum, weight, i) => sum + weight * f[i], 0);
    const length = (-sigma[k] * along) / (sigma[k] ** 2 + lambda ** 2);
    for (let j = 0; j < du.length; j++) du[j] += length * v[k][j];
  }
  return du;
}
