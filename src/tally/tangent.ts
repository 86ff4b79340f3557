import { closeFixedPoint } from '../convergence/driver.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { NumericSetting } from '../flowsheet/numeric-settings.ts';
import { type FigureResponse, slopesOf } from './figure-slopes.ts';
import { isKinked } from './kink.ts';
import type { LinearClosure } from './linear-closure.ts';
import type { Plant } from './plant.ts';
import { type Probe, probeAlong, type Side, sizeOf, stepAlong } from './probe.ts';

/** The slopes of two steps agree to this share of them [-] ... */
const AGREED = 2e-6;
/** A tangent to one side is as good as this: three passes to one side are noisier, and what it lacks is made up for in `along`. */
const ONE_SIDED = 2e-5;
/** ... or to this share of the figure: the noise of a pass [-]. */
const NOISE = 2e-12;
/** Steps are halved so many times at most. */
const HALVINGS = 6;
/** Two steps further apart than this are looked at for a kink at once, in units of what counts as agreed. */
const FAR_APART = 1e4;

/** A plant made ready for the slopes of its figures. */
export interface Linearised {
  readonly plant: Plant;
  readonly closure: LinearClosure;
  readonly response: FigureResponse;
}

/** What moving along a tangent of the closed tears found. */
export interface Along {
  /** by figure, per SI unit of the setting */
  readonly slopes: ReadonlyMap<string, number>;
  /** d tear/d setting */
  readonly tangent: Float64Array;
  /** the step the slopes come from */
  readonly probe: Probe;
  /** largest difference from the slopes of a step twice as wide, 1 where they agree */
  readonly gap: number;
  /** more of the setting does something else than less */
  readonly kinked: boolean;
}

/**
 * Slopes by the linearised recycles: a step with the tears held gives their tangent, a step of half the size along
 * it gives the slopes and what is wrong with the tangent, which is made good; and so on until two steps agree. They
 * do at once unless something changes between the two, as where a range of validity ends close by.
 *
 * @param known  a tangent to start from and the step along it, made before; the tears held when left out
 * @throws PassTrouble
 */
export function along(
  linearised: Linearised,
  setting: NumericSetting,
  side: Side,
  known: Pick<Along, 'tangent' | 'probe'> | null = null,
): Along {
  const { plant, closure, response } = linearised;
  let best: Along | null = null;
  let least = Infinity;
  let widest = 0;
  let before: ReadonlyMap<string, number> | null = null;
  let at = known?.tangent ?? new Float64Array(closure.size);
  for (let k = 0; k <= HALVINGS; k++) {
    const probe =
      k === 0 && known !== null
        ? known.probe
        : probeAlong(plant, closure, setting, at, stepAlong(closure, setting, at) / 2 ** k, side);
    const { h } = probe;
    widest = Math.max(widest, h);
    const more = probe.slope.map((value, i) => value - at[i]);
    if (!closure.solve(more)) throw noTangent();
    const slopes = slopesOf(probe, response, more);
    const gap = before === null ? Infinity : gapBetween(before, slopes, response, h);
    // A shorter step is no better where it is but the noise that two steps differ by.
    const apart = before === null ? Infinity : gapBetween(before, slopes, response, widest);
    if (best === null || apart < least) {
      best = { slopes, tangent: at, probe, gap, kinked: false };
      least = apart;
    }
    if (gap <= 1 || k > 1 || (k === 1 && gap > FAR_APART))
      best = { ...best, kinked: isKinked(linearised, setting, best) };
    if (gap <= 1 || best.kinked) break;
    before = slopes;
    at = at.map((value, i) => value + more[i]);
  }
  return best!;
}

function gapBetween(
  before: ReadonlyMap<string, number>,
  slopes: ReadonlyMap<string, number>,
  { size }: FigureResponse,
  h: number,
): number {
  let gap = 0;
  for (const [name, slope] of slopes) {
    const apart = Math.abs(slope - before.get(name)!);
    if (apart > 0) gap = Math.max(gap, apart / (AGREED * Math.abs(slope) + (NOISE * size(name)) / h));
  }
  return gap;
}

/**
 * The same to one side of a kink: the tangent is the fixed point of passing along it. The recycles are linearised on
 * that side, and again in every pass, as it depends on the tangent which side that is.
 */
export function alongOneSide(linearised: Linearised, setting: NumericSetting, side: 'up' | 'down'): Along {
  const { plant, closure } = linearised;
  const size = sizeOf(setting);
  let { solve } = closure;
  let last: Pick<Along, 'tangent' | 'probe'> | null = null;
  const tangentOf = (u: Float64Array) => u.map((value, i) => (value * closure.scale[i]) / size);
  const found = closeFixedPoint(
    {
      size: closure.size,
      lower: new Float64Array(closure.size).fill(-Infinity),
      evaluate(u, next) {
        const tangent = tangentOf(u);
        const h = stepAlong(closure, setting, tangent);
        const probe = probeAlong(plant, closure, setting, tangent, h, side);
        last = { tangent, probe };
        const more = probe.slope.map((value, i) => value - tangent[i]);
        solve = closure.solveHere();
        if (!solve(more)) throw noTangent();
        for (let i = 0; i < u.length; i++) next[i] = u[i] + (more[i] * size) / closure.scale[i];
      },
      scale: (u, next, out) => {
        let most = 1e-3;
        for (let i = 0; i < u.length; i++) most = Math.max(most, Math.abs(u[i]), Math.abs(next[i]));
        out.fill(most);
      },
    },
    new Float64Array(closure.size),
    { method: 'anderson', tolerance: ONE_SIDED, maxPasses: 40 },
  );
  if (!found.converged) throw noTangent();
  return along({ ...linearised, closure: { ...closure, solve } }, setting, side, last);
}

function noTangent(): PassTrouble {
  return new PassTrouble(
    'not-closed',
    'The recycles answer to no small change of this setting.',
    'their linearised form is singular',
    'look whether a pressure or a flow of the loop is left undetermined',
  );
}
