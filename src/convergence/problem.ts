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
  /**
   * Work out what the passes left out because nothing that goes round asks for it, at the last guess evaluated: its
   * variables, which no other one depends on, are written into x and g. Until then `extraError` leaves it out too. May
   * throw PassTrouble.
   */
  complete?(x: Float64Array, g: Float64Array): void;
  /** dG/dx at the last guess evaluated; left out where only differences of passes can tell. */
  readonly derivatives?: Derivatives;
}

/** Derivatives of a map, as the map itself knows them. */
export interface Derivatives {
  /** they cost about as much as a pass, not one pass for each variable */
  readonly propagated: boolean;
  /** May a variable stay as it is where nothing in the map decides it? None may when left out. */
  mayFloat?(variable: number): boolean;
  /**
   * @param out  written: ∂gᵢ/∂xⱼ row by row, size² numbers
   * @returns false where there are none at this guess; the map then is as the last evaluation left it
   */
  at(out: Float64Array): boolean;
}
