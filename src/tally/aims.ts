import { reachAims } from '../convergence/aims.ts';
import type { AimResult } from '../model/result.ts';
import { notesOf } from './aim-notes.ts';
import { createAimTask } from './aim-task.ts';
import { reachTogether } from './aims-together.ts';
import type { CloseOptions, PlantClosure } from './close-plant.ts';
import type { Plant } from './plant.ts';
import { scopeOf } from './tally.ts';

/** A figure meets its target within this share of the size of the target, or of the figure's first value. */
const TOLERANCE = 1e-8;
/** Together with the recycles aims are held to this share of it: a last closing may move them a little. */
const JOINT_SHARE = 0.1;

/**
 * Move the settings of the aims until their figures meet the targets: together with the recycles where that is stable,
 * else around them, closing the loop for every try from the one before. Leaves the plant closed at the best settings
 * found.
 *
 * @returns the account of all passes, the last closing by itself, and the aims
 */
export function closeWithAims(
  plant: Plant,
  options: CloseOptions,
): {
  readonly closure: PlantClosure;
  readonly last: PlantClosure;
  readonly aims: Record<string, AimResult>;
} {
  const task = createAimTask(plant, options);
  const { aims } = task;
  let start = task.start;
  let note = '';
  if (task.closeAt(start, '').converged && !reached(task.residuals())) {
    const joint = reachTogether(task, start, options.tolerance, JOINT_SHARE * TOLERANCE);
    start = joint.settings;
    note =
      joint.stopped === null
        ? 'aims reached together with the recycles'
        : 'aims looked for around the closing';
  }
  task.closeAt(start, note);
  const outcome = reachAims(
    task.residualsAt,
    start,
    task.low,
    task.high,
    new Float64Array(aims.length).fill(TOLERANCE),
  );
  const last = task.closeAt(outcome.values, 'the best settings found');
  const scope = last.converged ? scopeOf(plant) : null;
  const achieved = aims.map((aim) => (scope ? aim.until.evaluate(scope) : Number.NaN));
  const notes = notesOf(outcome, task, achieved);
  return {
    closure: { ...last, passes: task.passes, history: task.history },
    last,
    aims: Object.fromEntries(
      aims.map((aim, a) => [
        aim.name,
        {
          reached: isReached(outcome.residuals[a]),
          setting: aim.move,
          value: outcome.values[a],
          unit: aim.unit,
          target: aim.target,
          until: aim.until.text === '' ? '' : `${aim.until.text} = ${aim.wanted}`,
          achieved: achieved[a],
          note: isReached(outcome.residuals[a]) ? null : notes(a),
        },
      ]),
    ),
  };
}

function reached(residuals: Float64Array): boolean {
  return residuals.every(isReached);
}

function isReached(residual: number): boolean {
  return Math.abs(residual) <= TOLERANCE;
}
