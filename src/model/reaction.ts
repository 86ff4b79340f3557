/** Where the equilibrium constant of a reaction comes from. */
export type ConstantSource =
  /** K from the Gibbs energies of the components */
  | { readonly kind: 'gibbs' }
  /** a published correlation by its name in chemistry/published-constants.ts */
  | { readonly kind: 'published'; readonly name: string }
  /** the user's own ln K(T), T in K, activities referred to standardPressurePa */
  | {
      readonly kind: 'formula';
      readonly text: string;
      readonly lnK: (temperatureK: number) => number;
      readonly standardPressurePa: number;
    };

/** A balanced reaction between the components of a flowsheet. */
export interface Reaction {
  readonly name: string;
  /** as written by the user */
  readonly equation: string;
  /** stoichiometric coefficients in component order, products positive */
  readonly coefficients: Float64Array;
  readonly constant: ConstantSource;
  /** moved by studies of a plant of their own: ln of a factor on K; left out where K is as the source says */
  readonly moved?: { lnFactor: number };
}
