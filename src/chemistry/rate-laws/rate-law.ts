/** A reaction that a rate law speaks of, products positive; its rate counts the equation as written here. */
export interface LawReaction {
  readonly equation: string;
  readonly stoichiometry: Readonly<Record<string, number>>;
}

/** Share of the intrinsic rate that a pellet keeps, as the authors of a law give it. */
export interface PublishedEffectiveness {
  /** the species whose conversion since the converter's inlet it depends on */
  readonly of: string;
  /** @returns effectiveness 0–1 at T [K], P [Pa] and that conversion [0–1] */
  at(T: number, P: number, conversion: number): number;
  /** what it is and where it holds, a plain sentence */
  readonly note: string;
}

/**
 * A published rate law, written as
 *   rate_r = forward_r (1 − Q_r/K_r),
 * so that the bracket, which decides where the reaction stops, can be taken with the constants of the flowsheet
 * or with those of the authors. The activities a = y φ P/(pressure unit) of the forward rate are always the
 * authors' own.
 */
export interface RateLaw {
  /** as in a flowsheet */
  readonly name: string;
  readonly summary: string;
  /** what the activities and the smallest fractions are listed by */
  readonly species: readonly string[];
  readonly reactions: readonly LawReaction[];
  /** rates count per m3 of bed or per kg of catalyst */
  readonly per: 'volume' | 'mass';
  /** pressure that the activities are referred to [Pa] */
  readonly pressureUnitPa: number;
  /** φ of the activities: 1, that of the flowsheet's gas model, or a correlation of the authors (`lnPhi`) */
  readonly fugacity: 'one' | 'gas model' | 'own';
  /** ln φ per species at T [K] and P [Pa]; only where `fugacity` is `own` */
  lnPhi?(T: number, P: number, out: Float64Array): void;
  /**
   * Mole fractions below which a species counts as if more were there, because the law is singular without it;
   * 0 where it is not.
   */
  readonly floors: readonly number[];
  /** Rates with the bracket left out. @param a activities per species @param out [mol/(m3 s) or mol/(kg s)] */
  forward(T: number, a: Float64Array, out: Float64Array): void;
  /** the authors' ln K per reaction, for the activities of this law */
  lnK(T: number, out: Float64Array): void;
  readonly effectiveness: PublishedEffectiveness | null;
  /** where the authors measured */
  readonly range: {
    readonly fromK: number;
    readonly toK: number;
    readonly fromPa: number;
    readonly toPa: number;
  };
  readonly source: string;
  /** what a user should know before he trusts it, plain sentences */
  readonly note: string;
}

/**
 * The fraction below which a product counts as if so much were there, in a law that is singular without it. The
 * rate falls with 1/y, so the first traces take no room: on the way from nothing to 10 % it matters by 1e-8 of the
 * bed.
 */
export const TRACE = 1e-5;
/** The same for a reactant of which there is always plenty. */
export const TRACE_OF_PLENTY = 1e-3;

export const ATM = 101_325;
export const BAR = 1e5;
