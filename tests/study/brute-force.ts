import type { ObjectiveCase, ObjectiveCases } from '../../src/study/objective-cases.ts';

/** Points of a grid along one setting, and how often it is drawn together to one step either side of the best. */
const OUTER = { side: 7, zooms: 2 };
const INNER = { side: 7, zooms: 8 };

/**
 * The best case that meets its limits by trying everything: a grid over one setting, for each of its points one
 * over the other, each drawn together around its best. Knows nothing of slopes, and a grid inside a grid follows a limit
 * that runs aslant, where one over both settings stops at the first step.
 *
 * @param inner  index of the setting that is searched inside the other: the one that the limit holds
 */
export function bruteForce(cases: ObjectiveCases, inner: 0 | 1): ObjectiveCase {
  const sign = cases.objective.goals[0]!.sense === 'minimise' ? 1 : -1;
  const worthOf = (one: ObjectiveCase | null) =>
    one === null || one.c.some((c) => c > 1e-6) ? Number.POSITIVE_INFINITY : sign * one.goals[0]!;
  const best = (tryAt: (x: number) => ObjectiveCase | null, { side, zooms }: typeof OUTER) => {
    let found: ObjectiveCase | null = null;
    let place = 0.5;
    let width = 1;
    const tried = new Set<string>();
    for (let zoom = 0; zoom <= zooms; zoom++) {
      const low = Math.min(Math.max(place - width / 2, 0), 1 - width);
      for (let k = 0; k < side; k++) {
        const x = low + (k / (side - 1)) * width;
        // Ends and middle of a grid that was drawn together are known already.
        if (tried.has(x.toFixed(12))) continue;
        tried.add(x.toFixed(12));
        const one = tryAt(x);
        if (worthOf(one) < worthOf(found)) {
          found = one;
          place = x;
        }
      }
      width *= 2 / (side - 1);
    }
    return found;
  };
  return best((x) => best((y) => cases.at(Float64Array.from(inner === 1 ? [x, y] : [y, x])), INNER), OUTER)!;
}
