/** A map G whose fixed point x = G(x) is wanted. */
export interface FixedPointProblem {
  /** number of variables */
  readonly size: number;
  /** One pass: writes G(x) into g; may throw PassTrouble. */
  evaluate(x: Float64Array, g: Float64Array): void;
  /** Lowest values, −Infinity where there is none; 0 for flows. G itself keeps them. */
  readonly lower: Float64Array;
  /** Highest values, Infinity where there is none. */
  readonly upper?: Float64Array;
  /** Characteristic size of each variable, > 0; max(1, |g|) when left out. */
  scale?(x: Float64Array, g: Float64Array, out: Float64Array): void;
  /** An error of the last pass that must be within the tolerance too, e.g. of the balance over the battery limit. */
  extraError?(): number;
}
