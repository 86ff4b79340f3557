/** NRTL: τ = b/(R T) with b in J/mol, one α for both directions. */
export interface NrtlPair {
  readonly form: 'nrtl';
  readonly first: string;
  readonly second: string;
  readonly b12JPerMol: number;
  readonly b21JPerMol: number;
  readonly alpha: number;
  readonly source: string;
}

/** Redlich-Kister: g/RT = x1 x2 Σ (a + b/T)ₖ (x1 − x2)ᵏ, terms in rising k as [a, b in K]. */
export interface RedlichKisterPair {
  readonly form: 'redlich-kister';
  readonly first: string;
  readonly second: string;
  readonly terms: readonly (readonly [a: number, bK: number])[];
  readonly source: string;
}

export type ActivityPair = NrtlPair | RedlichKisterPair;

const J_PER_CAL = 4.184;

/** The pairs whose liquids are not taken as ideal. First and second are exchanged together with 12 and 21. */
export const activityPairs: readonly ActivityPair[] = [
  {
    form: 'nrtl',
    first: 'CH3OH',
    second: 'H2O',
    b12JPerMol: -253.88 * J_PER_CAL,
    b21JPerMol: 845.21 * J_PER_CAL,
    alpha: 0.2994,
    source:
      'NRTL, Smith, Van Ness & Abbott, Introduction to Chemical Engineering Thermodynamics (from memory), after Gmehling & Onken, DECHEMA I/1',
  },
  {
    form: 'nrtl',
    first: 'C2H5OH',
    second: 'H2O',
    b12JPerMol: -57.9601 * J_PER_CAL,
    b21JPerMol: 1241.7396 * J_PER_CAL,
    alpha: 0.2937,
    source: 'NRTL, Gmehling & Onken, Vapor-Liquid Equilibrium Data Collection, DECHEMA I/1',
  },
  {
    form: 'redlich-kister',
    first: 'NH3',
    second: 'H2O',
    // Fitted by us with `gas: srk` to T(p, x) and y(p, x) of the correlation at 0.02 to 2 MPa, x 0.01 to 0.98: in
    // bubble pressure 1.1 % on average, at most 5 % (at the ends of the range of pressure). The correlation itself is
    // not an excess function: it breaks the Gibbs-Duhem equation by as much, and ends at 2 MPa.
    terms: [
      [4.7531, -2131.15],
      [-0.1138, 201.92],
      [-1.112, 510.81],
      [0.2977, -140.13],
    ],
    source:
      'Redlich-Kister terms fitted to the ammonia-water correlation of Patek & Klomfar, Int. J. Refrig. 18 (1995) 228',
  },
];
