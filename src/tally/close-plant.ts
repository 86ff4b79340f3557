import { type Closer, type Closure, createCloser } from '../convergence/driver.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { MethodName } from '../model/flowsheet.ts';
import type { TraceEntry } from '../model/result.ts';
import { type HeatLeft, heatLeft } from './heat-left.ts';
import type { Group, Plant } from './plant.ts';
import { createRecycleProblem, type RecycleProblem } from './recycle-problem.ts';
import { startFromFeeds } from './start-values.ts';

export interface CloseOptions {
  readonly method: MethodName;
  readonly tolerance: number;
  readonly maxPasses: number;
  /** true starts from the streams as they stand (a neighbouring case), false from the feeds */
  readonly warm?: boolean;
  /** asked before every pass of a recycle: true ends it as if no more passes were allowed */
  readonly isEnough?: () => boolean;
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
  const closed: ClosedGroup[] = [];
  let passes = 1;
  let residual = 0;

  const outcome = (failure: PlantClosure['failure']) =>
    new Outcome(options.method, passes, residual, failure, closed);

  for (const group of plant.groups) {
    if (group.tears.length === 0) {
      const trouble = passOnce(plant, group);
      if (trouble) return outcome({ group, closure: null, trouble, names: [] });
      continue;
    }
    const { problem, left, start, closer } = recycleOf(plant, group, options.method);
    const { names } = problem;
    const spent = options.warm ? 0 : startFromFeeds(plant, group, left);
    problem.read(start);
    const maxPasses = Math.max(options.maxPasses - spent, 1);
    const closure = closer.close(start, { ...options, maxPasses });
    closed.push({ closure, spent, names });
    passes = Math.max(passes, closure.passes + spent);
    residual = Math.max(residual, closure.residual);
    if (!closure.converged) return outcome({ group, closure, trouble: closure.trouble, names });
  }
  return outcome(null);
}

/**
 * The trace is worked out when it is read: a study reads none. A class, for a getter of an object literal is kept with a
 * hidden class of its own, made anew each time among the old objects, from where it holds on to the whole closing.
 */
class Outcome implements PlantClosure {
  readonly converged: boolean;
  readonly method: MethodName;
  readonly passes: number;
  readonly residual: number;
  readonly failure: PlantClosure['failure'];
  readonly #closed: readonly ClosedGroup[];
  #history: TraceEntry[] | null = null;

  constructor(
    method: MethodName,
    passes: number,
    residual: number,
    failure: PlantClosure['failure'],
    closed: readonly ClosedGroup[],
  ) {
    this.converged = failure === null;
    this.method = method;
    this.passes = passes;
    this.residual = residual;
    this.failure = failure;
    this.#closed = closed;
  }

  get history(): readonly TraceEntry[] {
    this.#history ??= this.#closed.flatMap(traceOf);
    return this.#history;
  }
}

interface ClosedGroup {
  readonly closure: Closure;
  /** passes that found the start values */
  readonly spent: number;
  /** of the variables */
  readonly names: readonly string[];
}

function traceOf({ closure, spent, names }: ClosedGroup): TraceEntry[] {
  return closure.history.map(({ pass, residual, worst, method, note }) => ({
    pass: pass + spent,
    residual: Number.isFinite(residual) ? residual : null,
    worst: names[worst] ?? '',
    method,
    note,
  }));
}

/** What is made once for the recycle of a group and kept while its plant is. */
interface Recycle {
  readonly problem: RecycleProblem;
  readonly left: HeatLeft | null;
  readonly start: Float64Array;
  closer: Closer;
}
const recycles = new WeakMap<Group, Recycle>();

function recycleOf(plant: Plant, group: Group, method: MethodName): Recycle {
  let recycle = recycles.get(group);
  if (recycle === undefined) {
    const left = heatLeft(plant, group);
    const problem = createRecycleProblem(plant, group, left);
    recycle = { problem, left, start: new Float64Array(problem.size), closer: createCloser(problem, method) };
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
