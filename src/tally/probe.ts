import { largestShare } from '../convergence/vectors.ts';
import type { NumericSetting } from '../flowsheet/numeric-settings.ts';
import { figureLeaves } from './figure-leaves.ts';
import type { LinearClosure } from './linear-closure.ts';
import type { Plant } from './plant.ts';
import { figuresOf } from './tally.ts';

/** Relative step of a setting [-]. */
const STEP = 3e-4;
/** The tears are moved by at most this share of their size [-]. */
const TEAR_STEP = 3e-4;

/** What a step of a setting did to a plant, a pass on each side. */
export interface Probe {
  readonly side: Side;
  readonly h: number;
  /** change of G per unit of the setting along the tangent */
  readonly slope: Float64Array;
  /** figures after the first and the second step: up and down; at a bound after one step and two */
  readonly figures: readonly [ReadonlyMap<string, number>, ReadonlyMap<string, number>];
  /** G after the same steps */
  readonly tears: readonly [Float64Array, Float64Array];
  /** a stream has another phase on one side than on the other */
  readonly phases: boolean;
}

/** Where a setting is moved to: central, or to one side where a bound is near. */
export type Side = 'both' | 'up' | 'down';

/** Move a setting and, by the tangent, the tears; pass once on each side. */
export function probeAlong(
  plant: Plant,
  closure: LinearClosure,
  setting: NumericSetting,
  tangent: Float64Array,
  h: number,
  side: Side,
): Probe {
  const x = new Float64Array(closure.size);
  const go = (step: number, g: Float64Array) => {
    plant.set(setting.path, setting.value + step);
    for (let i = 0; i < x.length; i++) x[i] = Math.max(closure.x[i] + step * tangent[i], 0);
    closure.pass(x, g);
    return { figures: figureLeaves(figuresOf(plant)), phases: phasesOf(plant) };
  };
  const sign = side === 'down' ? -1 : 1;
  const one = new Float64Array(closure.size);
  const other = new Float64Array(closure.size);
  const first = go(sign * h, one);
  const second = go(side === 'both' ? -h : 2 * sign * h, other);
  const slope = closure.x.map((x0, i) => quotient(side, x0, one[i], other[i], h));
  return {
    side,
    h,
    slope,
    figures: [first.figures, second.figures],
    tears: [one, other],
    phases: first.phases !== second.phases,
  };
}

/** Slope at f0 from two steps: central, or three points of second order to one side. */
export function quotient(side: Side, f0: number, one: number, other: number, h: number): number {
  if (side === 'both') return (one - other) / (2 * h);
  return ((side === 'down' ? -1 : 1) * (4 * one - 3 * f0 - other)) / (2 * h);
}

/** A step that moves the tears by no more than TEAR_STEP. */
export function stepAlong(closure: LinearClosure, setting: NumericSetting, tangent: Float64Array): number {
  const h = STEP * sizeOf(setting);
  const moved = largestShare(tangent, closure.scale);
  return moved === 0 ? h : Math.min(Math.max(TEAR_STEP / moved, 0.01 * h), h);
}

/** What a step is measured against [SI]: the setting, or what is usual where it is next to nothing. */
export function sizeOf({ dimension, value, unitSI }: NumericSetting): number {
  const usual = { temperature: 300, temperatureDifference: 100, pressureDifference: 30, fraction: 3 }[
    dimension as string
  ];
  return Math.max(Math.abs(value), (usual ?? 1) * unitSI);
}

/** Settings that cannot be below 0, or are fractions of a whole, have one side only at the bound. */
export function sideOf(setting: NumericSetting): Side {
  const { dimension, value, path, unitSI } = setting;
  const reach = 2 * STEP * sizeOf(setting);
  if (dimension === 'temperature' || dimension === 'power') return 'both';
  if (value - reach < 0) return 'up';
  const whole = dimension === 'fraction' && unitSI === 0.01 && !path.includes('.composition.');
  return whole && value <= 1 && value + reach > 1 ? 'down' : 'both';
}

function phasesOf(plant: Plant): string {
  return plant.streams.map((s) => (s.vapourFraction >= 1 ? 'g' : s.vapourFraction <= 0 ? 'l' : 'm')).join('');
}
