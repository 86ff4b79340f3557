import type { MethodName } from '../model/flowsheet.ts';
import { closePlant } from './close-plant.ts';
import { createPlant, type Group, type Plant } from './plant.ts';
import { phasesIn, vesselsOf } from './why-vessels.ts';

/** Passes that a trial may take, or several together: what closes at all closes well within this. */
export const TRIAL_PASSES = 250;

/**
 * Evaluations that trials may take together for one question, of blocks that count them (`Unit.evaluations`): a pass
 * through a bed that is stiff takes some hundred times as long as one through another loop. Counted, not timed, so that
 * the same is told everywhere.
 */
export const TRIAL_EVALUATIONS = 100_000;

/** What is left for the trials of one question: a loop at which all of them fail is not to take many times as long. */
export interface Patience {
  passes: number;
  evaluations: number;
}

export function createPatience(): Patience {
  return { passes: TRIAL_PASSES, evaluations: TRIAL_EVALUATIONS };
}

/** Were trials ended, or not begun, for want of evaluations? */
export function isOutOfWork({ evaluations }: Patience): boolean {
  return evaluations <= 0;
}

/** A change is worth advising where the recycle is no more than so many times the feed. */
export const SENSIBLE_RECYCLE = 20;

/** Beyond so many times the feed it is rounding that decides whether a recycle closes: no answer to rely on. */
const LARGEST_RECYCLE = 1e5;

/** What a loop does where it closes. */
export interface Trial {
  readonly method: MethodName;
  readonly passes: number;
  /** the largest torn stream [mol/s] and its mole fractions */
  readonly recycle: number;
  readonly fractions: Float64Array;
  /** so many times what enters the flowsheet goes round */
  readonly timesFed: number;
  /** blocks that part gas from liquid and hold no liquid */
  readonly dry: ReadonlySet<string>;
}

/** May an answer be relied on, or is its recycle beyond all use? */
export function isOfUse({ timesFed }: Trial): boolean {
  return timesFed <= LARGEST_RECYCLE;
}

/**
 * Close a plant with some settings moved. A plant of its own is made for it, with the settings as they stand: what units
 * remember of other passes has no part in it, and whoever repeats the trial finds the same.
 *
 * @param changes  values in SI by path
 * @param patience  what is left for trials; what this one spends is taken off
 * @returns null where it does not close within what is left
 */
export function tryOut(
  plant: Plant,
  group: Group,
  tolerance: number,
  changes: readonly (readonly [path: string, value: number])[],
  method: MethodName = 'auto',
  patience: Patience = createPatience(),
): Trial | null {
  if (patience.passes <= 0 || isOutOfWork(patience)) return null;
  const other = createPlant({ ...plant.flowsheet, blocks: plant.blocks, feeds: plant.feeds });
  const sameGroup = other.groups[plant.groups.indexOf(group)]!;
  for (const [path, value] of changes) other.set(path, value);
  const closure = closePlant(other, {
    method,
    tolerance,
    maxPasses: patience.passes,
    isEnough: () => evaluationsOf(other) >= patience.evaluations,
  });
  patience.passes -= closure.passes;
  patience.evaluations -= evaluationsOf(other);
  if (!closure.converged) return null;
  const largest = largestTear(other, sameGroup);
  const recycle = other.mixture.total(other.streams[largest]);
  const fed = other.enters.reduce((sum, s) => sum + other.mixture.total(other.streams[s]), 0);
  return {
    method,
    passes: closure.passes,
    recycle,
    fractions: other.streams[largest].flowsMolPerS.map((flow) => (recycle > 0 ? flow / recycle : 0)),
    timesFed: recycle / fed,
    dry: new Set(
      vesselsOf(other, sameGroup)
        .filter((vessel) => phasesIn(vessel) === 'gas')
        .map(({ name }) => name),
    ),
  };
}

/** What the units of a plant have evaluated since it was made. */
export function evaluationsOf(plant: Plant): number {
  return plant.units.reduce((sum, unit) => sum + (unit.evaluations?.() ?? 0), 0);
}

/** Index of the largest torn stream of a group. */
export function largestTear(plant: Plant, group: Group): number {
  const total = (s: number) => plant.mixture.total(plant.streams[s]);
  return group.tears.reduce((most, s) => (total(s) > total(most) ? s : most), group.tears[0]);
}
