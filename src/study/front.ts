import type { BoxProblem } from './box-problem.ts';
import { violation } from './box-problem.ts';
import type { Chosen } from './chosen.ts';
import type { ObjectiveCase, ObjectiveCases } from './objective-cases.ts';
import { bestOf, MET, searchFrom } from './search.ts';

/** A case of the front. */
export type FrontPoint = Chosen;

/**
 * Cases between the best of one goal and the best of the other, of which none is better in both. Evenly spread: the
 * line between the two ends is divided evenly, and from each division the second goal is brought down on the normal
 * to that line (normalised normal constraint). Points that another one beats are left out.
 *
 * @param ends  where the first and the second goal are best
 * @source A. Messac, A. Ismail-Yahaya & C. A. Mattson, Structural and Multidisciplinary Optimization 25 (2003) 86-98
 */
export function tradeOff(
  cases: ObjectiveCases,
  ends: readonly [Float64Array, Float64Array],
  points: number,
  close: (u: Float64Array) => Chosen | null,
): FrontPoint[] {
  const signs = cases.objective.goals.map(({ sense }) => (sense === 'minimise' ? 1 : -1));
  const goalsOf = ({ goals }: ObjectiveCase) => goals.map((goal, g) => signs[g]! * goal);
  const corners = ends.map((u) => cases.at(u)!);
  const [a, b] = corners.map(goalsOf) as [number[], number[]];
  const span = [b[0]! - a[0]!, a[1]! - b[1]!];
  // Where one case is best in both there is nothing to trade.
  if (!(span[0]! > 1e-9 * Math.abs(a[0]!) && span[1]! > 1e-9 * Math.abs(b[1]!)))
    return nonEmpty(close(ends[0]));
  const ratioOf = (one: ObjectiveCase): [number, number] => {
    const goals = goalsOf(one);
    return [(goals[0]! - a[0]!) / span[0]!, (goals[1]! - b[1]!) / span[1]!];
  };
  const found: Float64Array[] = [ends[0]];
  for (let k = 1; k < points - 1; k++) {
    const share = k / (points - 1);
    const problem = onNormal(cases, ratioOf, share);
    const between = ends[0].map((x, i) => x + share * (ends[1][i]! - x));
    const end = bestOf(searchFrom(problem, [found.at(-1)!, between], 0.1));
    if (end !== null && violation(end.value) <= MET) found.push(end.u);
  }
  const closed = [...found, ends[1]].flatMap((u) => nonEmpty(close(u)));
  return closed.filter(
    (one) => !closed.some((other) => other !== one && beats(goalsOf(other.case), goalsOf(one.case))),
  );
}

/** The second goal, on the side of the normal through a division of the line that is nearer to the first goal's best. */
function onNormal(
  cases: ObjectiveCases,
  ratioOf: (one: ObjectiveCase) => [number, number],
  share: number,
): BoxProblem {
  return {
    size: cases.objective.moves.length,
    limits: cases.objective.limits.length + 1,
    evaluate(u) {
      const one = cases.at(u);
      if (one === null) return null;
      const [x, y] = ratioOf(one);
      // The line runs from (0, 1) to (1, 0); the normal through (share, 1 - share) is x - y = 2 share - 1.
      return { f: y, c: Float64Array.of(...one.c, x - y - (2 * share - 1)) };
    },
  };
}

/** At least as good in both and better in one, by more than what closings leave open. */
function beats(a: readonly number[], b: readonly number[]): boolean {
  const slack = a.map((value, g) => 1e-8 * Math.max(Math.abs(value), Math.abs(b[g]!)));
  return a.every((value, g) => value <= b[g]! + slack[g]!) && a.some((value, g) => value < b[g]! - slack[g]!);
}

function nonEmpty<T>(one: T | null): T[] {
  return one === null ? [] : [one];
}
