import type { ObjectiveCase, ObjectiveCases } from './objective-cases.ts';
import { MET } from './search.ts';

/** A step of one setting away from the optimum, the others staying. */
export interface CurveRow {
  /** index of the move */
  readonly move: number;
  /** SI */
  readonly value: number;
  /** null where the loop does not close */
  readonly goal: number | null;
  /** indices of the limits that do not hold there */
  readonly broken: readonly number[];
}

/** Steps to either side, in shares of the way between the bounds. */
const STEPS = [-0.2, -0.05, -0.01, 0, 0.01, 0.05, 0.2];

/** The goal on either side of a case, setting by setting; steps beyond a bound end at it. */
export function curveAround(cases: ObjectiveCases, best: ObjectiveCase): CurveRow[] {
  return cases.objective.moves.flatMap((_, move) => {
    const places = STEPS.map((step) => Math.min(Math.max(best.u[move]! + step, 0), 1));
    return places
      .filter((place, k) => places.indexOf(place) === k)
      .map((place): CurveRow => {
        const u = best.u.slice();
        u[move] = place;
        const found = place === best.u[move] ? best : cases.at(u);
        return {
          move,
          value: cases.settingsAt(u)[move]!,
          goal: found?.goals[0] ?? null,
          broken: found === null ? [] : Array.from(found.c.keys()).filter((k) => found.c[k]! > MET),
        };
      });
  });
}
