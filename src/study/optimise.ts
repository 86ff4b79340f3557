import type { Flowsheet, Objective } from '../model/flowsheet.ts';
import type { BoxProblem, BoxValue } from './box-problem.ts';
import { violation } from './box-problem.ts';
import { type Chosen, chosen } from './chosen.ts';
import { type CurveRow, curveAround } from './curve.ts';
import { type FrontPoint, tradeOff } from './front.ts';
import { haltonPoints } from './halton.ts';
import {
  type CaseOptions,
  createObjectiveCases,
  type ObjectiveCase,
  type ObjectiveCases,
} from './objective-cases.ts';
import { bestOf, MET, type SearchEnd, searchFrom, spreadStarts } from './search.ts';
import { type LimitReach, reachOfLimits } from './unmet-limits.ts';

export interface OptimiseOptions extends CaseOptions {
  /** descents from so many starts; 4 if left out */
  readonly starts?: number;
  /** points of a trade-off front; 9 if left out */
  readonly points?: number;
}

export interface StartEnd {
  readonly start: readonly number[];
  readonly settings: readonly number[];
  readonly goal: number;
  readonly meetsLimits: boolean;
}

export interface Optimised {
  readonly flowsheet: Flowsheet;
  readonly objective: Objective;
  readonly outcome: 'found' | 'limits-not-met' | 'not-closed';
  /** the optimum; of limits that cannot be met the case that misses them least; null where nothing closed */
  readonly best: Chosen | null;
  /** per limit of the optimum: what the goal gains, in its own unit, where the bound is let off by one unit of the figure */
  readonly worth: readonly number[];
  readonly starts: readonly StartEnd[];
  readonly curve: readonly CurveRow[];
  /** of two goals, the cases of which none is better in both, from one end to the other */
  readonly front: readonly FrontPoint[];
  /** where limits cannot be met: how far each of them can be brought by itself */
  readonly reach: readonly LimitReach[];
  readonly evaluations: number;
  readonly passes: number;
  /** why nothing closed; empty otherwise */
  readonly failure: string;
}

const DEFAULT_STARTS = 4;
const DEFAULT_POINTS = 9;
/** Two starts closer than this share of the bounds lead to one end. */
const APART = 0.15;

/**
 * The best settings within their bounds and limits: the box is sampled evenly, a descent starts at the settings of the
 * file and at the most promising samples, and the best end is closed again from the feeds. With two goals, the front
 * between their best ends.
 */
export function optimise(
  flowsheet: Flowsheet,
  objective: Objective,
  options: OptimiseOptions = {},
): Optimised {
  const cases = createObjectiveCases(flowsheet, objective, options);
  const samples = sampled(cases);
  if (samples.length === 0) return nothingCloses(flowsheet, cases);
  const scales = objective.goals.map((_, g) =>
    Math.max(...samples.map(({ goals }) => Math.abs(goals[g]!)), Number.MIN_VALUE),
  );
  const problems = objective.goals.map((_, g) => goalProblem(cases, g, scales[g]!));
  const searches = problems.map((problem) =>
    searched(problem, samples, cases, options.starts ?? DEFAULT_STARTS),
  );
  const [first] = searches as [Searched];
  const best = chosen(cases, first.best.u);
  if (best === null || violation({ f: 0, c: best.case.c }) > MET)
    return limitsNotMet(flowsheet, cases, samples, best);
  const common = { flowsheet, objective, outcome: 'found' as const, best, reach: [], failure: '' };
  const [goal] = objective.goals as [Objective['goals'][0]];
  if (objective.goals.length > 1) {
    const ends = searches.map((search) => search.best.u) as [Float64Array, Float64Array];
    const front = tradeOff(cases, ends, options.points ?? DEFAULT_POINTS, (u) => chosen(cases, u));
    return { ...common, worth: [], starts: [], curve: [], front, ...spent(cases) };
  }
  return {
    ...common,
    worth: objective.limits.map(({ bound }, k) =>
      best.active[k] ? (first.best.multipliers[k]! * scales[0]!) / (Math.abs(bound) || 1) : 0,
    ),
    starts: first.ends.map(({ start, u, value }) => ({
      start: cases.settingsAt(start),
      settings: cases.settingsAt(u),
      goal: value.f * scales[0]! * (goal.sense === 'minimise' ? 1 : -1),
      meetsLimits: violation(value) <= MET,
    })),
    curve: curveAround(cases, best.case),
    front: [],
    ...spent(cases),
  };
}

/** One goal over the box, scaled so that f is of the order of one and the lower the better. */
export function goalProblem(cases: ObjectiveCases, goal: number, scale: number): BoxProblem {
  const sign = cases.objective.goals[goal]!.sense === 'minimise' ? 1 : -1;
  return {
    size: cases.objective.moves.length,
    limits: cases.objective.limits.length,
    evaluate(u) {
      const found = cases.at(u);
      return found === null ? null : { f: (sign * found.goals[goal]!) / scale, c: found.c };
    },
  };
}

/** The settings of the file, then points spread over the box; those that close. */
function sampled(cases: ObjectiveCases): ObjectiveCase[] {
  const size = cases.objective.moves.length;
  const points = [cases.asInFile, ...haltonPoints(Math.min(4 + 6 * size, 40), size)];
  return points.flatMap((u) => cases.at(u) ?? []);
}

interface Searched {
  readonly best: SearchEnd;
  readonly ends: readonly SearchEnd[];
}

function searched(
  problem: BoxProblem,
  samples: readonly ObjectiveCase[],
  cases: ObjectiveCases,
  count: number,
): Searched {
  const valued = samples.flatMap(({ u }) => {
    const value = problem.evaluate(u);
    return value === null ? [] : [{ u, value }];
  });
  const penalised = ({ f, c }: BoxValue) => f + 10 * violation({ f, c });
  const order = valued.toSorted((a, b) => penalised(a.value) - penalised(b.value)).map(({ u }) => u);
  const starts = spreadStarts([cases.asInFile, ...order], count, APART);
  const ends = searchFrom(problem, starts);
  // A sample that happens to be best is no worse an answer for having been found by chance.
  const none = new Float64Array(problem.limits);
  const all = [...ends, ...valued.map(({ u, value }) => ({ start: u, u, value, multipliers: none }))];
  const best = refined(problem, bestOf(all)!);
  return { best, ends };
}

/** Once more from the best end with a small radius: a kink near it may have stopped the first descent early. */
function refined(problem: BoxProblem, best: SearchEnd): SearchEnd {
  const again = searchFrom(problem, [best.u], 0.02);
  return bestOf([best, ...again.map((end) => ({ ...end, start: best.start }))].reverse())!;
}

function limitsNotMet(
  flowsheet: Flowsheet,
  cases: ObjectiveCases,
  samples: readonly ObjectiveCase[],
  best: Chosen | null,
): Optimised {
  const reach = reachOfLimits(cases, samples);
  const { objective } = cases;
  const none = { worth: [], starts: [], curve: [], front: [], failure: '' };
  return { flowsheet, objective, outcome: 'limits-not-met', best, reach, ...none, ...spent(cases) };
}

function nothingCloses(flowsheet: Flowsheet, cases: ObjectiveCases): Optimised {
  const none = { best: null, worth: [], starts: [], curve: [], front: [], reach: [] };
  const failure = cases.lastFailure;
  return { flowsheet, objective: cases.objective, outcome: 'not-closed', ...none, failure, ...spent(cases) };
}

function spent({ evaluations, passes }: ObjectiveCases): Pick<Optimised, 'evaluations' | 'passes'> {
  return { evaluations, passes };
}
