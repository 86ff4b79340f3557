import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { type NumericSetting, numericSettings } from '../flowsheet/numeric-settings.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import { type Balance, type BalanceOptions, balancePlant } from './balance.ts';
import { figureLeaves } from './figure-leaves.ts';
import { figureResponse } from './figure-slopes.ts';
import { linearise } from './linear-closure.ts';
import { createPlant, type Plant } from './plant.ts';
import { sideOf } from './probe.ts';
import { figuresOf } from './tally.ts';
import { type Along, along, alongOneSide, type Linearised } from './tangent.ts';

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
  let linearised: Linearised;
  try {
    const closure = linearise(plant);
    linearised = { plant, closure, response: figureResponse(plant, closure) };
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble)) throw trouble;
    return settings.map((setting) => unknown(setting, noSlope(trouble)));
  }
  const found = settings.map((setting) => leverOf(linearised, setting));
  passAgain(linearised);
  return found;
}

/** Leave the plant as it was closed. */
function passAgain({ closure }: Linearised): void {
  closure.pass(closure.x, new Float64Array(closure.size));
}

function leverOf(linearised: Linearised, setting: NumericSetting): Lever {
  const scaled = ({ slopes }: Along): Record<string, number> =>
    Object.fromEntries([...slopes].map(([name, slope]) => [name, slope * setting.unitSI]));
  const { plant } = linearised;
  try {
    const side = sideOf(setting);
    const found = along(linearised, setting, side);
    if (!found.kinked) {
      const unsure = found.gap > UNSURE ? CLOSE_BY : null;
      return {
        setting,
        figures: scaled(found),
        sides: null,
        note: side === 'both' ? unsure : AT_BOUND[side],
      };
    }
    const more = scaled(alongOneSide(linearised, setting, 'up'));
    const less = scaled(alongOneSide(linearised, setting, 'down'));
    return {
      setting,
      figures: Object.fromEntries(Object.keys(more).map((name) => [name, (more[name]! + less[name]!) / 2])),
      sides: { more, less },
      note: found.probe.phases
        ? `a stream changes its phase here: ${TWO_SIDES}`
        : `a kink, as where a mixer takes the lower of two equal pressures: ${TWO_SIDES}`,
    };
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble)) throw trouble;
    plant.set(setting.path, setting.value);
    passAgain(linearised);
    return unknown(setting, noSlope(trouble));
  } finally {
    plant.set(setting.path, setting.value);
  }
}

/** Slopes further apart than so many times what counts as agreed are told [-]. */
const UNSURE = 5;
const CLOSE_BY = 'the slopes of two steps differ by more than 1e-5 of them: something changes close by';
const TWO_SIDES = 'more of it does something else than less; the numbers are the mean of both';
const AT_BOUND = {
  up: 'at its lower bound: taken upwards only',
  down: 'at its upper bound: taken downwards only',
} as const;

function noSlope(trouble: PassTrouble): string {
  return `no slope was found: ${trouble.message}`;
}

function unknown(setting: NumericSetting, note: string): Lever {
  return { setting, figures: {}, sides: null, note };
}
