import { type Closer, type Closure, createCloser } from '../convergence/driver.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { MethodName } from '../model/flowsheet.ts';
import type { TraceEntry } from '../model/result.ts';
import type { Group, Plant } from './plant.ts';
import { createRecycleProblem, type RecycleProblem } from './recycle-problem.ts';
import { startFromFeeds } from './start-values.ts';

export interface CloseOptions {
  readonly method: MethodName;
  readonly tolerance: number;
  readonly maxPasses: number;
  /** true starts from the streams as they stand (a neighbouring case), false from the feeds */
  readonly warm?: boolean;
}

/** How the closing of a plant went. */
export interface PlantClosure {
  readonly converged: boolean;
  readonly method: MethodName;
  /** passes of the recycle that took most, the one that found its start values included */
  readonly passes: number;
  /** largest residual of the recycles; NaN where no pass came to its end */
  readonly residual: number;
  readonly history: readonly TraceEntry[];
  /** the group that failed, with its closure and the names of its variables; null when all is closed */
  readonly failure: {
    readonly group: Group;
    readonly closure: Closure | null;
    readonly trouble: PassTrouble | null;
    readonly names: readonly string[];
  } | null;
}

/** Close the groups of a plant one after another, in calculation order; stops at the first that fails. */
export function closePlant(plant: Plant, options: CloseOptions): PlantClosure {
  plant.refreshFeeds();
  const history: TraceEntry[] = [];
  let passes = 1;
  let residual = 0;
  for (const group of plant.groups) {
    if (group.tears.length === 0) {
      const trouble = passOnce(plant, group);
      if (trouble) {
        const failure = { group, closure: null, trouble, names: [] };
        return { converged: false, method: options.method, passes, residual, history, failure };
      }
      continue;
    }
    const { problem, start, closer } = recycleOf(plant, group, options.method);
    const spent = options.warm ? 0 : startFromFeeds(plant, group);
    problem.read(start);
    const closure = closer.close(start, {
      ...options,
      maxPasses: Math.max(options.maxPasses - spent, 1),
    });
    for (const record of closure.history) {
      history.push({
        pass: record.pass + spent,
        residual: Number.isFinite(record.residual) ? record.residual : null,
        worst: problem.names[record.worst] ?? '',
        method: record.method,
        // Worked out when the trace is read: a study reads none.
        get note() {
          return record.note;
        },
      });
    }
    passes = Math.max(passes, closure.passes + spent);
    residual = Math.max(residual, closure.residual);
    if (!closure.converged) {
      const failure = { group, closure, trouble: closure.trouble, names: problem.names };
      return { converged: false, method: options.method, passes, residual, history, failure };
    }
  }
  return { converged: true, method: options.method, passes, residual, history, failure: null };
}

/** What is made once for the recycle of a group and kept while its plant is. */
interface Recycle {
  readonly problem: RecycleProblem;
  readonly start: Float64Array;
  closer: Closer;
}
const recycles = new WeakMap<Group, Recycle>();

function recycleOf(plant: Plant, group: Group, method: MethodName): Recycle {
  let recycle = recycles.get(group);
  if (recycle === undefined) {
    const problem = createRecycleProblem(plant, group);
    recycle = { problem, start: new Float64Array(problem.size), closer: createCloser(problem, method) };
    recycles.set(group, recycle);
  }
  if (recycle.closer.method !== method) recycle.closer = createCloser(recycle.problem, method);
  return recycle;
}

function passOnce(plant: Plant, group: Group): PassTrouble | null {
  try {
    for (const step of group.steps) plant.pass(step);
    return null;
  } catch (trouble) {
    if (trouble instanceof PassTrouble) return trouble;
    throw trouble;
  }
}
