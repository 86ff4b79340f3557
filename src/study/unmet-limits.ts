import type { BoxProblem } from './box-problem.ts';
import type { ObjectiveCase, ObjectiveCases } from './objective-cases.ts';
import { bestOf, MET, searchFrom, spreadStarts } from './search.ts';

/** How far one limit can be brought when nothing else is asked for. */
export interface LimitReach {
  /** index of the limit */
  readonly limit: number;
  /** the figure nearest to (or best within) its bound, in its unit */
  readonly nearest: number;
  readonly settings: readonly number[];
  /** false where no settings within their bounds meet it, even alone */
  readonly canBeMet: boolean;
}

/** Each limit by itself: the least or the most that its figure can be. */
export function reachOfLimits(cases: ObjectiveCases, samples: readonly ObjectiveCase[]): LimitReach[] {
  return cases.objective.limits.map((_, limit) => {
    const problem = alone(cases, limit);
    const order = samples.toSorted((a, b) => a.c[limit]! - b.c[limit]!).map(({ u }) => u);
    const best = bestOf(searchFrom(problem, spreadStarts(order, 2, 0.15)))!;
    const found = cases.at(best.u, true)!;
    return {
      limit,
      nearest: found.figures[limit]!,
      settings: cases.settingsAt(best.u),
      canBeMet: found.c[limit]! <= MET,
    };
  });
}

function alone(cases: ObjectiveCases, limit: number): BoxProblem {
  return {
    size: cases.objective.moves.length,
    limits: 0,
    evaluate(u) {
      const found = cases.at(u);
      return found === null ? null : { f: found.c[limit]!, c: new Float64Array(0) };
    },
  };
}
