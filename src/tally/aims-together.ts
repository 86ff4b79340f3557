import { solveTogether, type TogetherPoint, type TogetherProblem } from '../convergence/together.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { AimTask } from './aim-task.ts';
import { linearise } from './linear-closure.ts';
import type { Plant } from './plant.ts';
import { createRecycleProblem } from './recycle-problem.ts';

/** Where the joint way of aims and recycles ended. */
export interface TogetherEnd {
  /** why it ended before its goal; null when recycles and aims are within their tolerances */
  readonly stopped: string | null;
  /** settings of the best aims on the way */
  readonly settings: Float64Array;
}

/**
 * Reach the aims of a closed plant together with its recycles: settings and tears move from pass to pass, along the
 * recycles linearised where the plant stands. Leaves the plant after a pass at the settings handed back.
 *
 * @param tolerance  of the recycles
 * @param aimTolerance  of the aims, relative
 */
export function reachTogether(
  task: AimTask,
  start: Float64Array,
  tolerance: number,
  aimTolerance: number,
): TogetherEnd {
  const { plant, low, high, aims } = task;
  const settingsAt = (u: Float64Array) =>
    u.map((share, a) => (share >= 1 ? high[a] : low[a] + share * (high[a] - low[a])));
  const names = [...recycleNames(plant), ...aims.map((aim) => `aim ${aim.name}`)];
  try {
    const { x, scale, pass, solve, passes } = linearise(plant);
    task.spend(passes, {
      residual: 0,
      worst: '',
      note: 'linearised, to move settings and recycles together',
    });
    let unsaid = 0;
    const evaluate: TogetherProblem['evaluate'] = (tears, u, g) => {
      unsaid++;
      task.set(settingsAt(u));
      pass(tears, g);
      return (f) => f.set(task.residuals());
    };
    const onPass = ({ open, f }: TogetherPoint, note: string) => {
      task.spend(unsaid, { ...worstOf([...open, ...f.filter(Number.isFinite)], names), note });
      unsaid = 0;
    };
    const { best, stopped } = solveTogether(
      { scale, correct: solve, evaluate },
      x,
      start.map((value, a) => (value - low[a]) / (high[a] - low[a])),
      { tolerance, aimTolerance, onPass },
    );
    if (best === null) return { stopped, settings: start };
    const settings = settingsAt(best.u);
    if (stopped !== null) {
      evaluate(best.x, best.u, new Float64Array(x.length));
      onPass(best, `back to the best so far: ${stopped}`);
    }
    return { stopped, settings };
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble)) throw trouble;
    return { stopped: trouble.message, settings: start };
  }
}

function recycleNames(plant: Plant): string[] {
  return plant.groups.flatMap((group) =>
    group.tears.length === 0 ? [] : createRecycleProblem(plant, group).names,
  );
}

function worstOf(open: readonly number[], names: readonly string[]) {
  const sizes = open.map(Math.abs);
  const residual = Math.max(...sizes);
  return { residual, worst: names[sizes.indexOf(residual)] ?? '' };
}
