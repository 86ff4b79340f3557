import type { GasModelName } from '../model/flowsheet.ts';

/** Derivatives of an enthalpy departure [J/(mol K)], [J/(mol Pa)]. */
export interface DepartureSlopes {
  perKelvin: number;
  perPascal: number;
}

/**
 * Vapour-phase model of a fixed list of components. Every method takes T [K], P [Pa] and mole fractions of
 * the gas in component order (solids 0), allocates nothing and always takes the vapour root.
 */
export interface GasModel {
  readonly name: GasModelName;
  readonly size: number;
  /** ln of the fugacity coefficients, written into `out`; 0 for solids */
  lnPhi(T: number, P: number, y: Float64Array, out: Float64Array): void;
  /** ∂ ln φᵢ/∂T [1/K] and ∂ ln φᵢ/∂P [1/Pa] at constant composition; 0 for solids */
  lnPhiSlopes(T: number, P: number, y: Float64Array, perKelvin: Float64Array, perPascal: Float64Array): void;
  /** N ∂ ln φᵢ/∂nⱼ at constant T and P, size rows of size columns, row by row; N counts all moles of y [-] */
  lnPhiByAmount(T: number, P: number, y: Float64Array, out: Float64Array): void;
  /** Z = PV/(RT) */
  compressibility(T: number, P: number, y: Float64Array): number;
  /**
   * True where the model has only the root of a liquid to offer: the mixture, taken as one fluid, is below its
   * critical temperature and denser than at its critical point. No gas of that composition exists there.
   */
  isLiquidLike(T: number, P: number, y: Float64Array): boolean;
  /** H − H(ideal gas) at the same T, P, y [J/mol] */
  enthalpyDeparture(T: number, P: number, y: Float64Array): number;
  /** ∂/∂T [J/(mol K)] and ∂/∂P [J/(mol Pa)] of that, written into `out` */
  enthalpyDepartureSlopes(T: number, P: number, y: Float64Array, out: DepartureSlopes): void;
  /** S − S(ideal gas) at the same T, P, y [J/(mol K)] */
  entropyDeparture(T: number, P: number, y: Float64Array): number;
  /** the same for a pure component, by index */
  pureLnPhi(i: number, T: number, P: number): number;
  pureCompressibility(i: number, T: number, P: number): number;
  pureEnthalpyDeparture(i: number, T: number, P: number): number;
}
