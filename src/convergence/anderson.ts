import type { FixedPointMethod } from './method.ts';
import { createSecants, type Secants } from './secants.ts';

/** Pairs of differences kept: more than a loop has slow modes; older ones are from too far away to help. */
export const ANDERSON_MEMORY = 8;
/** Remainder below which a pair repeats the newer ones; tried 1e-10 to 0.05 on ammonia loops, 1e-4 was best. */
export const ANDERSON_INDEPENDENCE = 1e-4;

/**
 * Anderson acceleration: the residual of the last passes as a combination of their differences, and the guess
 * that the same combination makes vanish. Works on all variables together, so that coupled and oscillating
 * modes are as good as slow ones; ends on a linear map after its number of distinct eigenvalues + 2 passes.
 *
 * @source D. G. Anderson, J. ACM 12 (1965) 547-560
 */
export function createAnderson(memory = ANDERSON_MEMORY): FixedPointMethod {
  let secants: Secants;
  let mixing: Float64Array;
  let used = 0;
  return {
    name: () => 'anderson',
    reset(n) {
      secants = createSecants(n, memory, ANDERSON_INDEPENDENCE);
      mixing = new Float64Array(n).fill(1);
    },
    next(x, g, scale, xNext) {
      secants.record(x, g);
      used = secants.step(x, g, scale, mixing, xNext);
    },
    note: () => (used < secants.held() ? `${used} of ${secants.held()} earlier passes used` : ''),
  };
}
