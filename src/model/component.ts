/** One interval of a NASA nine-coefficient polynomial; T in K, standard pressure 1 bar. */
export interface Nasa9Interval {
  readonly fromK: number;
  readonly toK: number;
  /** a1..a7 of Cp/R = a1/T² + a2/T + a3 + a4 T + a5 T² + a6 T³ + a7 T⁴ */
  readonly a: readonly [number, number, number, number, number, number, number];
  /** enthalpy constant [K], reference: elements at 298.15 K */
  readonly b1: number;
  /** b1 moved to the formation enthalpy of the Active Thermochemical Tables; null where they have no entry */
  readonly b1Atct: number | null;
  /** entropy constant [-] */
  readonly b2: number;
}

/** log10(P/bar) = A − B/(T + C), T in K, liquid. */
export interface AntoineSet {
  readonly A: number;
  readonly B: number;
  readonly C: number;
  readonly fromK: number;
  readonly toK: number;
}

/** Wide-range vapour pressure; see properties/vapour-pressure.ts for both forms. */
export type WideVapourPressure =
  | {
      readonly form: 'wagner25';
      readonly criticalK: number;
      readonly criticalPa: number;
      readonly c: readonly [number, number, number, number];
      readonly fromK: number;
      readonly toK: number;
    }
  | {
      readonly form: 'dippr101';
      readonly c: readonly [number, number, number, number, number];
      readonly fromK: number;
      readonly toK: number;
    };

/** What is known of the saturated liquid. */
export interface LiquidData {
  /** Rackett parameter, null where unknown */
  readonly rackettZ: number | null;
  /** saturation table: ascending temperatures [K] and molar volumes [m3/mol]; empty where none exists */
  readonly tableK: readonly number[];
  readonly tableVolumeM3PerMol: readonly number[];
  /** compressibility factor of the saturated gas at the same temperatures [-] */
  readonly tableGasCompressibility: readonly number[];
  /** heat of vaporisation at the boiling point [J/mol] and Watson exponent; null where unknown */
  readonly vaporisationAtBoilingJPerMol: number | null;
  readonly watsonExponent: number | null;
  /** one fixed molar volume [m3/mol] for a component that has nothing better; null otherwise */
  readonly fixedVolumeM3PerMol: number | null;
}

/** A chemical species with the data that its properties are computed from; SI units. */
export interface Component {
  /** key in files and tables, e.g. NH3 */
  readonly id: string;
  readonly name: string;
  readonly formula: string;
  readonly cas: string | null;
  /** atoms per molecule by element symbol */
  readonly elements: Readonly<Record<string, number>>;
  readonly molarMassKgPerMol: number;
  /** true for a solid that is in neither gas nor liquid (graphite) */
  readonly solid: boolean;
  /** ascending, adjoining intervals */
  readonly idealGas: readonly Nasa9Interval[];
  readonly critical: {
    readonly temperatureK: number;
    readonly pressurePa: number;
    readonly acentricFactor: number;
  } | null;
  readonly boilingK: number | null;
  /** ascending, adjoining ranges; empty where no vapour pressure is known */
  readonly antoine: readonly AntoineSet[];
  readonly wideVapourPressure: WideVapourPressure | null;
  readonly liquid: LiquidData | null;
  /** lower and higher heating value at 25 degC [J/mol]; 0 for what does not burn */
  readonly lowerHeatingJPerMol: number;
  readonly higherHeatingJPerMol: number;
  readonly note: string;
  /** where the data come from, by kind: 'critical', 'ideal gas', 'vapour pressure', 'liquid', ... */
  readonly sources: Readonly<Record<string, string>>;
  /** true for a component defined in the user's file */
  readonly custom: boolean;
}
