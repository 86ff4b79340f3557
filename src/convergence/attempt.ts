import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { FixedPointProblem } from './problem.ts';

/** Why a pass gave nothing usable. */
export interface Failure {
  readonly reason: 'trouble' | 'not-finite';
  readonly trouble: PassTrouble | null;
  /** the same for the trace */
  readonly says: string;
}

/** One pass; null when it went well. Errors that are not a block's trouble are ours and go through. */
export function evaluateSafely(problem: FixedPointProblem, x: Float64Array, g: Float64Array): Failure | null {
  return safely(problem.evaluate, x, g);
}

/** `FixedPointProblem.complete` where there is one, in the same way. */
export function completeSafely(problem: FixedPointProblem, x: Float64Array, g: Float64Array): Failure | null {
  return problem.complete ? safely(problem.complete, x, g) : null;
}

function safely(
  work: (x: Float64Array, g: Float64Array) => void,
  x: Float64Array,
  g: Float64Array,
): Failure | null {
  try {
    work(x, g);
  } catch (error) {
    if (!(error instanceof PassTrouble)) throw error;
    const where = error.block === null ? '' : `${error.block}: `;
    return { reason: 'trouble', trouble: error, says: `failed: ${where}${error.message}` };
  }
  for (let i = 0; i < g.length; i++) {
    if (!Number.isFinite(g[i])) {
      return { reason: 'not-finite', trouble: null, says: `failed: variable ${i} is not a finite number` };
    }
  }
  return null;
}
