import { randomNumbers } from '../bench/random-numbers.ts';

/** Choices that look random and are the same for the same seed. */
export interface Chance {
  /** a whole number from 0 to below n */
  below(n: number): number;
  pick<T>(list: readonly T[]): T;
  /** true once in n times */
  once(n: number): boolean;
}

/** The choices of one case: the seed of the run and the number of the case fix them. */
export function chanceOf(seed: number, index: number): Chance {
  const draw = randomNumbers(Math.imul(seed, 0x9e3779b1) ^ Math.imul(index + 1, 0x85ebca6b));
  const below = (n: number) => Math.floor(n * draw());
  return { below, pick: (list) => list[below(list.length)]!, once: (n) => below(n) === 0 };
}
