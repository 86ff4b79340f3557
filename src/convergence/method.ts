import type { Derivatives } from './problem.ts';

/** A remark for the trace; where it takes work, it is worked out when the trace is read. */
export type Note = string | (() => string);

export function wordsOf(note: Note): string {
  return typeof note === 'string' ? note : note();
}

/**
 * A way of making the next guess from what a pass returned. Methods see plain numbers only: bounds, failing
 * blocks, the stopping test and the trace are the driver's business. A method takes part in every pass of one
 * closure, may be handed any guess (the driver shortens and clips steps), and allocates in `reset` alone.
 */
export interface FixedPointMethod {
  /** as it appears in the trace; `auto` gives the method it is using at the moment */
  name(): string;
  /**
   * Forget everything and make room for n variables.
   *
   * @param derivatives  those of the map, for methods that use them; null where there are none
   */
  reset(n: number, derivatives?: Derivatives | null): void;
  /**
   * Keep what the last closure has taught of the map and begin a neighbouring one. False, or left out: it has learnt
   * nothing worth keeping, and `reset` is due.
   */
  resume?(): boolean;
  /**
   * The next guess.
   *
   * @param x,g  guess and G(guess), length n [units of each variable]
   * @param scale  characteristic size of each variable, length n, all > 0 [units of each variable]
   * @param xNext  written in place, length n; may leave the bounds
   */
  next(x: Float64Array, g: Float64Array, scale: Float64Array, xNext: Float64Array): void;
  /** Guess and answer that the next guess starts from, where they are not those just handed in. */
  base?(): { readonly x: Float64Array; readonly g: Float64Array } | null;
  /**
   * The largest scaled distance of a guess from the fixed point, as the method's derivatives see it [-]; NaN where it has
   * none, Infinity where they are singular.
   */
  distance?(x: Float64Array, g: Float64Array, scale: Float64Array): number;
  /** It cannot do more than direct steps here. */
  isStuck?(): boolean;
  /** What it did in the last call and why; empty when nothing is worth saying. */
  note(): Note;
}
