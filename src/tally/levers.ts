import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { type NumericSetting, numericSettings } from '../flowsheet/numeric-settings.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import { type Balance, type BalanceOptions, balancePlant } from './balance.ts';
import { figureLeaves } from './figure-leaves.ts';
import { isKinked } from './kink.ts';
import { type LinearClosure, linearise } from './linear-closure.ts';
import { createPlant, type Plant } from './plant.ts';
import { type Probe, quotient, sideOf } from './probe.ts';
import { figuresOf } from './tally.ts';
import { alongBothSides, alongOneSide, extrapolated, type Steps } from './tangent.ts';

/** What a setting does to the figures of a closed plant. */
export interface Lever {
  readonly setting: NumericSetting;
  /** d figure / d setting per natural unit of the setting, by the figure's dotted name */
  readonly figures: Readonly<Record<string, number>>;
  /** where a little more does something else than a little less: both slopes, `figures` being their mean */
  readonly sides: {
    readonly more: Readonly<Record<string, number>>;
    readonly less: Readonly<Record<string, number>>;
  } | null;
  /** what to know before trusting the numbers, null where there is nothing */
  readonly note: string | null;
}

export interface Levers extends Balance {
  /** the figures where the plant is closed, by dotted name; empty where it did not close */
  readonly figures: Readonly<Record<string, number>>;
  readonly levers: readonly Lever[];
}

export interface LeversOptions extends BalanceOptions {
  /** settings to look at; all numeric ones when left out */
  readonly over?: readonly NumericSetting[];
}

/**
 * Close a flowsheet and find what a small change of each setting does to every figure, the recycles closed again:
 * from the linearised closure dx/ds = (I − dG/dx)⁻¹ dG/ds, without solving again. The setting of an aim stays
 * where the aim has put it.
 *
 * @throws InputError as `balance` does
 */
export function levers(flowsheet: Flowsheet, options: LeversOptions = {}): Levers {
  const plant = createPlant(flowsheet);
  const balance = balancePlant(plant, options);
  if (!balance.result.convergence.converged) return { ...balance, figures: {}, levers: [] };
  const base = figureLeaves(figuresOf(plant));
  // An aim may have moved a setting since the file was read.
  const settings = (options.over ?? numericSettings(flowsheet)).map((setting) => ({
    ...setting,
    value: plant.get(setting.path) ?? setting.value,
  }));
  return { ...balance, figures: Object.fromEntries(base), levers: leversOf(plant, settings) };
}

function leversOf(plant: Plant, settings: readonly NumericSetting[]): Lever[] {
  let closure: LinearClosure;
  try {
    closure = linearise(plant);
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble)) throw trouble;
    return settings.map((setting) => unknown(setting, noSlope(trouble)));
  }
  const base = figureLeaves(figuresOf(plant));
  return settings.map((setting) => leverOf(plant, closure, setting, base));
}

/** A change below this share of a figure is rounding [-]. */
const ROUNDING = 1e-13;

function leverOf(
  plant: Plant,
  closure: LinearClosure,
  setting: NumericSetting,
  base: ReadonlyMap<string, number>,
): Lever {
  const scaled = (slopes: ReadonlyMap<string, number>): Record<string, number> =>
    Object.fromEntries([...slopes].map(([name, slope]) => [name, slope * setting.unitSI]));
  try {
    const side = sideOf(setting);
    if (side !== 'both') {
      const slopes = slopesOf(alongOneSide(plant, closure, setting, side), base);
      return { setting, figures: scaled(slopes), sides: null, note: AT_BOUND[side] };
    }
    const both = alongBothSides(plant, closure, setting);
    if (!isKinked(closure, both, base))
      return { setting, figures: scaled(slopesOf(both, base)), sides: null, note: null };
    const more = slopesOf(alongOneSide(plant, closure, setting, 'up'), base);
    const less = slopesOf(alongOneSide(plant, closure, setting, 'down'), base);
    const mean = new Map([...more].map(([name, slope]) => [name, (slope + (less.get(name) ?? slope)) / 2]));
    return {
      setting,
      figures: scaled(mean),
      sides: { more: scaled(more), less: scaled(less) },
      note: both.far.phases
        ? `a stream changes its phase here: ${TWO_SIDES}`
        : `a kink, as where a mixer takes the lower of two equal pressures: ${TWO_SIDES}`,
    };
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble)) throw trouble;
    return unknown(setting, noSlope(trouble));
  } finally {
    plant.set(setting.path, setting.value);
    closure.pass(closure.x, new Float64Array(closure.size));
  }
}

const TWO_SIDES = 'more of it does something else than less; the numbers are the mean of both';
const AT_BOUND = {
  up: 'at its lower bound: taken upwards only',
  down: 'at its upper bound: taken downwards only',
} as const;

/** Slopes of the figures: those of two steps extrapolated to none. */
function slopesOf({ far, near }: Steps, base: ReadonlyMap<string, number>): Map<string, number> {
  const wide = slopesAt(far, base);
  return new Map(
    [...slopesAt(near, base)].map(([name, slope]) => [name, extrapolated(wide.get(name)!, slope)]),
  );
}

function slopesAt(probe: Probe, base: ReadonlyMap<string, number>): Map<string, number> {
  const slopes = new Map<string, number>();
  for (const [name, f0] of base) {
    // A duty or power of nothing is left out of the figures.
    const one = probe.figures[0].get(name) ?? 0;
    const other = probe.figures[1].get(name) ?? 0;
    const slope = quotient(probe.side, f0, one, other, probe.h);
    // A slope that is no more than rounding is none; duties are differences of the heat that flows about.
    const size = Math.max(Math.abs(f0), /^(duty|power)_kW/.test(name) ? largestHeat(base) : 0);
    slopes.set(name, Math.abs(slope) * probe.h <= ROUNDING * size ? 0 : slope);
  }
  return slopes;
}

function largestHeat(base: ReadonlyMap<string, number>): number {
  let most = 0;
  for (const [name, value] of base) if (name.startsWith('duty_kW')) most = Math.max(most, Math.abs(value));
  return most;
}

function noSlope(trouble: PassTrouble): string {
  return `no slope was found: ${trouble.message}`;
}

function unknown(setting: NumericSetting, note: string): Lever {
  return { setting, figures: {}, sides: null, note };
}
