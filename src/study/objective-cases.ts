import type { Flowsheet, MethodName, Objective } from '../model/flowsheet.ts';
import { createCaseRunner } from './case-runner.ts';

export interface CaseOptions {
  /** overrules the file */
  readonly method?: MethodName;
  readonly tolerance?: number;
  readonly maxPasses?: number;
}

/** What the objective asks about, at one place of the box. */
export interface ObjectiveCase {
  /** settings, each 0 to 1 between its bounds */
  readonly u: Float64Array;
  /** as written, larger is better where it is to be maximised */
  readonly goals: readonly number[];
  /** the figures that are limited */
  readonly figures: readonly number[];
  /** figures against their bounds, relative to the size of the bound: at or below zero where the limit holds */
  readonly c: Float64Array;
  /** money per hour of each priced item */
  readonly money: readonly number[];
}

/** Cases of a flowsheet over the box of its objective. */
export interface ObjectiveCases {
  readonly objective: Objective;
  /** the settings of the file, brought within the bounds */
  readonly asInFile: Float64Array;
  /** settings in SI */
  settingsAt(u: Float64Array): number[];
  /** @param fresh  starts from the feeds, so that the answer depends on this case alone */
  at(u: Float64Array, fresh?: boolean): ObjectiveCase | null;
  readonly evaluations: number;
  readonly passes: number;
  /** why the last case that failed did */
  readonly lastFailure: string;
}

export function createObjectiveCases(
  flowsheet: Flowsheet,
  objective: Objective,
  options: CaseOptions = {},
): ObjectiveCases {
  const { goals, moves, limits } = objective;
  const items = flowsheet.prices?.items ?? [];
  const record = [...goals, ...limits]
    .map(({ formula }) => formula)
    .concat(items.map((item) => item.perHour));
  const runner = createCaseRunner(flowsheet, { settings: moves.map(({ path }) => path), record, ...options });
  const out = new Float64Array(record.length);
  const asInFile = Float64Array.from(moves, ({ path, between: [low, high] }) => {
    const value = runner.plant.get(path);
    return value === undefined ? 0.5 : Math.min(Math.max((value - low) / (high - low), 0), 1);
  });
  let evaluations = 0;
  let passes = 0;
  let lastFailure = '';

  // At its bounds a setting is the bound itself, to the last digit.
  const settingsAt = (u: Float64Array) =>
    moves.map(({ between: [low, high] }, i) =>
      u[i]! <= 0 ? low : u[i]! >= 1 ? high : low + u[i]! * (high - low),
    );

  return {
    objective,
    asInFile,
    settingsAt,
    at(u, fresh = false) {
      const outcome = runner.run(settingsAt(u), out, { warm: !fresh });
      evaluations++;
      passes += outcome.passes;
      const asked = out.subarray(0, goals.length + limits.length);
      if (!outcome.converged || !asked.every(Number.isFinite)) {
        const odd = [...goals, ...limits].find((_, k) => !Number.isFinite(asked[k]));
        lastFailure = outcome.converged ? `${odd?.text} is no number there` : outcome.note;
        return null;
      }
      const figures = Array.from(out.subarray(goals.length, goals.length + limits.length));
      return {
        u: u.slice(),
        goals: Array.from(out.subarray(0, goals.length)),
        figures,
        c: Float64Array.from(limits, ({ side, bound }, k) => {
          const over = (figures[k]! - bound) / (Math.abs(bound) || 1);
          return side === 'below' ? over : -over;
        }),
        money: Array.from(out.subarray(goals.length + limits.length)),
      };
    },
    get evaluations() {
      return evaluations;
    },
    get passes() {
      return passes;
    },
    get lastFailure() {
      return lastFailure;
    },
  };
}
