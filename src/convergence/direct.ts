import type { FixedPointMethod } from './method.ts';

/** Direct substitution: xNext = g. Converges like λᵏ, λ the largest eigenvalue (1 − purge fraction in a loop). */
export function createDirect(): FixedPointMethod {
  return {
    name: () => 'direct',
    reset() {},
    next(_x, g, _scale, xNext) {
      xNext.set(g);
    },
    note: () => '',
  };
}
