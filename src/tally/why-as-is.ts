import type { Closure } from '../convergence/driver.ts';
import type { MethodName } from '../model/flowsheet.ts';
import type { CloseOptions } from './close-plant.ts';
import type { Group, Plant } from './plant.ts';
import {
  createPatience,
  isOutOfWork,
  TRIAL_EVALUATIONS,
  TRIAL_PASSES,
  type Trial,
  tryOut,
} from './why-trial.ts';

/** Methods by which a loop is tried as it is, the surest first. */
const TRIED = ['auto', 'newton', 'anderson'] as const;

/** What trials of a loop as it is came to. */
export interface AsItIs {
  /** the first that closed */
  readonly closed: Trial | null;
  /** methods whose trials came to their end and did not close */
  readonly failing: readonly MethodName[];
}

/**
 * The first way by which the loop closes with its settings as they stand. Each method has its passes, all share the
 * evaluations: auto may take them all, and those after it leave each other as much. What the closing itself has shown
 * is not tried again; with aims that may have been on a plant whose units remember other settings, so then it is.
 *
 * @param spent  evaluations of the closing
 */
export function closedAsItIs(
  plant: Plant,
  group: Group,
  closure: Closure,
  spent: number,
  options: CloseOptions,
) {
  const failing: MethodName[] = [];
  let { evaluations } = createPatience();
  const isFirst = !options.warm && plant.flowsheet.aims.length === 0;
  for (const [k, method] of TRIED.entries()) {
    if (isFirst && wouldRepeat(method, closure, spent)) continue;
    const share = Math.max(k === 0 ? evaluations : Math.ceil(evaluations / (TRIED.length - k)), 0);
    const patience = { ...createPatience(), evaluations: share };
    const closed = tryOut(plant, group, options.tolerance, [], method, patience);
    if (closed !== null) return { closed, failing };
    if (!isOutOfWork(patience)) failing.push(method);
    evaluations -= share - patience.evaluations;
  }
  return { closed: null, failing };
}

/** Would a trial make the passes of a closing from the feeds again, and end where that did or before? */
function wouldRepeat(method: MethodName, closure: Closure, spent: number): boolean {
  if (method !== closure.method) return false;
  return closure.reason !== 'max-passes' || closure.passes >= TRIAL_PASSES || spent >= TRIAL_EVALUATIONS;
}
