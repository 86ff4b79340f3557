import { closeFixedPoint } from '../convergence/driver.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { NumericSetting } from '../flowsheet/numeric-settings.ts';
import type { LinearClosure } from './linear-closure.ts';
import type { Plant } from './plant.ts';
import { largest, type Probe, probeAlong, type Side, sizeOf, stepAlong } from './probe.ts';

/** The tangent is right when a pass along it leaves this share of it [-]. */
const TANGENT = 1e-7;
/** ... or less than the noise of a pass, per relative change of the setting [-]. */
const STILL = 1e-9;
/** A correction that leaves more than this share of what was open does not pay [-]. */
const GAIN = 0.3;
const CORRECTIONS = 8;
/** A second step so many times smaller tells a kink from a curve, and a slope from its curvature. */
export const CLOSER = 2;

/** Two steps along the tangent, the near one so many times smaller. */
export interface Steps {
  readonly far: Probe;
  readonly near: Probe;
}

/** Along the tangent of the closed tears by the linearised recycles, made good by passes along it: two steps. */
export function alongBothSides(plant: Plant, closure: LinearClosure, setting: NumericSetting): Steps {
  const tangent = new Float64Array(closure.size);
  let steps = stepsAlong(plant, closure, setting, tangent, 'both');
  let before = Infinity;
  for (let k = 0; k < CORRECTIONS; k++) {
    const residual = residualOf(steps, tangent);
    const open = largest(residual, closure.scale);
    const moves = largest(tangent, closure.scale);
    const still = TANGENT * moves + STILL / sizeOf(setting);
    if (k > 0 && (open <= still || open > GAIN * before)) break;
    before = open;
    if (!closure.solve(residual)) throw noTangent();
    for (let i = 0; i < tangent.length; i++) tangent[i] += residual[i];
    steps = stepsAlong(plant, closure, setting, tangent, 'both');
  }
  return steps;
}

function stepsAlong(
  plant: Plant,
  closure: LinearClosure,
  setting: NumericSetting,
  tangent: Float64Array,
  side: Side,
): Steps {
  const h = stepAlong(closure, setting, tangent);
  return {
    far: probeAlong(plant, closure, setting, tangent, h, side),
    near: probeAlong(plant, closure, setting, tangent, h / CLOSER, side),
  };
}

/** What the passes leave of a tangent. */
function residualOf({ far, near }: Steps, tangent: Float64Array): Float64Array {
  return tangent.map((value, i) => extrapolated(far.slope[i], near.slope[i]) - value);
}

/** Slopes of a far and a near step extrapolated to none. */
export function extrapolated(far: number, near: number): number {
  return near + (near - far) / (CLOSER ** 2 - 1);
}

/**
 * The same to one side, where the recycles linearised to both sides are a guide only: the tangent is the fixed
 * point of passing along it.
 */
export function alongOneSide(
  plant: Plant,
  closure: LinearClosure,
  setting: NumericSetting,
  side: 'up' | 'down',
): Steps {
  const size = sizeOf(setting);
  const tangentOf = (u: Float64Array) => u.map((value, i) => (value * closure.scale[i]) / size);
  const found = closeFixedPoint(
    {
      size: closure.size,
      lower: new Float64Array(closure.size).fill(-Infinity),
      evaluate(u, next) {
        const tangent = tangentOf(u);
        const residual = residualOf(stepsAlong(plant, closure, setting, tangent, side), tangent);
        if (!closure.solve(residual)) throw noTangent();
        for (let i = 0; i < u.length; i++) next[i] = u[i] + (residual[i] * size) / closure.scale[i];
      },
      scale: (u, next, out) => {
        let most = 1e-3;
        for (let i = 0; i < u.length; i++) most = Math.max(most, Math.abs(u[i]), Math.abs(next[i]));
        out.fill(most);
      },
    },
    new Float64Array(closure.size),
    { method: 'anderson', tolerance: 1e-6, maxPasses: 40 },
  );
  if (!found.converged) throw noTangent();
  return stepsAlong(plant, closure, setting, tangentOf(found.g), side);
}

function noTangent(): PassTrouble {
  return new PassTrouble(
    'not-closed',
    'The recycles answer to no small change of this setting.',
    'their linearised form is singular',
    'look whether a pressure or a flow of the loop is left undetermined',
  );
}
