import type { FixedPointProblem } from '../../src/convergence/driver.ts';
import { methods } from '../../src/convergence/methods.ts';
import type { MethodName } from '../../src/model/flowsheet.ts';

/** Evaluations until the largest |G(x) − x| / max(1, |G|) is `within`, by the method alone, without the driver's safeguards. */
export function evaluationsNeeded(
  problem: FixedPointProblem,
  start: readonly number[],
  method: MethodName,
  within = 1e-8,
): number {
  const made = methods[method]();
  const n = start.length;
  const [x, g, scale] = [Float64Array.from(start), new Float64Array(n), new Float64Array(n)];
  const next = new Float64Array(n);
  made.reset(n);
  for (let count = 1; count <= 5000; count++) {
    problem.evaluate(x, g);
    for (let i = 0; i < n; i++) scale[i] = Math.max(1, Math.abs(g[i]));
    if (x.every((value, i) => Math.abs(g[i] - value) / scale[i] <= within)) return count;
    made.next(x, g, scale, next);
    x.set(next);
  }
  return Infinity;
}
