/** How the values of a setting are spread, in SI (a part of a composition as written, a factor as such). */
export type Shape =
  | { readonly kind: 'normal'; readonly mean: number; readonly sd: number }
  | { readonly kind: 'uniform'; readonly low: number; readonly high: number }
  | { readonly kind: 'triangular'; readonly low: number; readonly mode: number; readonly high: number }
  /** ln of the value is normal: mean ln median, standard deviation ln factor */
  | { readonly kind: 'log-normal'; readonly median: number; readonly factor: number };

/** What is not known for sure: a setting of a block or feed, or a factor on a constant. */
export interface Spread {
  /** e.g. condenser.temperature, makeup.composition.Ar, reactions.synthesis.K, components.NH3.vapour_pressure */
  readonly path: string;
  readonly shape: Shape;
  /** unit that its values are written in, or that of the setting in the file; '' where there is none */
  readonly written: string;
}

/** Two spreads that move together. */
export interface Correlation {
  readonly between: readonly [string, string];
  /** of the ranks (Spearman), above −1 and below 1 */
  readonly value: number;
}
