import type { NumericSetting } from '../flowsheet/numeric-settings.ts';
import type { LinearClosure } from './linear-closure.ts';
import { type Probe, probeAlong } from './probe.ts';
import type { Along, Linearised } from './tangent.ts';

/** Slopes to both sides that differ by more than this share of the larger are those of a kink [-]. */
const KINK = 0.02;
/** Figures change by less than this share by rounding alone [-]. */
const NOISE = 1e-10;
/** A figure below this is measured against it: a duty of nothing but rounding has no kink. */
const SMALL = 0.01;

/** A second step so many times smaller tells a kink from a curve. */
const CLOSER = 2;

/** Do the slopes of figures or tears to both sides differ, or a stream's phases? @throws PassTrouble */
export function isKinked(
  { plant, closure, response: { base } }: Linearised,
  setting: NumericSetting,
  { tangent, probe: far }: Pick<Along, 'tangent' | 'probe'>,
): boolean {
  if (far.side !== 'both') return false;
  if (far.phases) return true;
  const seenFar = threePoints(far, closure, base);
  if (!seenFar.some(bends)) return false;
  // At a kink the second difference falls with the step, in a curve with its square.
  const between = (1 / CLOSER + 1 / CLOSER ** 2) / 2;
  const near = probeAlong(plant, closure, setting, tangent, far.h / CLOSER, 'both');
  const seenNear = threePoints(near, closure, base);
  return seenFar.some((points, i) => {
    const narrow = secondDifference(seenNear[i]!);
    return bends(points) && narrow > NOISE * points.size && narrow > between * secondDifference(points);
  });
}

/** A number below, at and above the setting, and what its changes are measured against. */
interface ThreePoints {
  readonly down: number;
  readonly middle: number;
  readonly up: number;
  readonly size: number;
}

function threePoints(
  { figures, tears }: Probe,
  { x, scale }: LinearClosure,
  base: ReadonlyMap<string, number>,
): ThreePoints[] {
  const [up, down] = figures;
  return [
    ...[...base].map(([name, middle]) => ({
      down: down.get(name) ?? middle,
      middle,
      up: up.get(name) ?? middle,
      size: Math.max(Math.abs(middle), SMALL),
    })),
    ...Array.from(x, (middle, i) => ({ down: tears[1][i], middle, up: tears[0][i], size: scale[i] })),
  ];
}

function bends({ down, middle, up, size }: ThreePoints): boolean {
  const rise = up - middle;
  const fall = middle - down;
  const most = Math.max(Math.abs(rise), Math.abs(fall));
  return most > 1e3 * NOISE * size && Math.abs(rise - fall) > KINK * most;
}

function secondDifference({ down, middle, up }: ThreePoints): number {
  return Math.abs(up - 2 * middle + down);
}
