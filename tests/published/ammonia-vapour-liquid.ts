/** Conditions the correlation below is asked at; it is recommended from about −25 to +35 degC, 5 to 30 MPa. */
export const saturationGrid = {
  celsius: [-30, -20, -10, 0, 10, 20, 30],
  megapascal: [5, 10, 15, 20, 25, 30],
} as const;

/**
 * NH3 [mole fraction] in 3:1 hydrogen-nitrogen saturated over liquid ammonia,
 *   log10(y %) = 4.1856 + 1.9060/sqrt(P/MPa) − 1099.5/(T/K); good to about 10 % of y.
 *
 * @source the correlation of ammonia design handbooks, from memory; fitted to A. T. Larson, C. A. Black,
 *   J. Am. Chem. Soc. 47 (1925) 1015
 */
export function saturatedAmmoniaFraction(T: number, P: number): number {
  return 10 ** (4.1856 + 1.906 / Math.sqrt(P / 1e6) - 1099.5 / T) / 100;
}

/**
 * Vapour pressure of ammonia [degC, kPa].
 * @source reference equation of state: K. Gao et al., J. Phys. Chem. Ref. Data 49 (2020); from memory, two agreeing
 */
export const ammoniaVapourPressure = [
  [-40, 71.63],
  [-33.33, 101.25],
  [-30, 119.38],
  [-25, 151.42],
  [-20, 190.03],
  [-10, 290.64],
  [0, 429.25],
  [10, 614.79],
  [20, 857.04],
  [25, 1002.69],
  [30, 1166.54],
  [40, 1554.53],
  [50, 2032.97],
] as const;

/**
 * Hydrogen in liquid ammonia at 25 degC: [atm, mole fraction], order of magnitude.
 * @source after R. Wiebe, T. H. Tremearne, J. Am. Chem. Soc. 56 (1934) 2357, from memory, rounded
 */
export const hydrogenInAmmonia = [
  [50, 0.0034],
  [100, 0.0076],
] as const;
