/** Published rate laws: points to check them at, and a bench reactor, each with its source. */

/**
 * Ammonia, D. C. Dyson, J. M. Simon, Ind. Eng. Chem. Fundam. 7 (1968) 605-610: [NH3 mole fraction, kmol NH3 per m3
 * and hour] at 450 degC and 225 atm over 3:1 hydrogen and nitrogen, and where the rate is zero.
 * Derived by us from the printed equation by hand, apart from the program.
 */
export const dysonSimonRates = {
  celsius: 450,
  atm: 225,
  rows: [
    [0.02, 1259],
    [0.05, 462.5],
    [0.1, 195.2],
  ],
  zeroAt: 0.2971,
} as const;

/** Effectiveness of the same paper at 10 % conversion and 700 K: [atm, ξ]. Derived by us from the printed polynomial. */
export const dysonSimonEffectiveness = [
  [150, 0.6557],
  [225, 0.5677],
  [300, 0.4898],
] as const;

/**
 * Fugacity coefficients of the same paper: [degC, atm, H2, N2, NH3]. Derived by us from the printed formulas, which
 * are from memory.
 */
export const dysonSimonFugacity = [
  [350, 100, 1.0325, 1.0568, 0.922],
  [400, 200, 1.0606, 1.0987, 0.9128],
  [450, 200, 1.056, 1.0953, 0.9344],
  [450, 300, 1.0851, 1.1488, 0.9034],
  [500, 300, 1.0789, 1.144, 0.9193],
] as const;

/**
 * Ammonia, A. Murase, H. L. Roberts, A. O. Converse, Ind. Eng. Chem. Process Des. Dev. 9 (1970) 503-513: pressures
 * [atm], rate [kmol N2 per m3 and hour] and k1/k2 [atm^-2] at 750 K. Derived by us from the printed equation.
 */
export const muraseRate = {
  kelvin: 750,
  atm: { N2: 56.789, H2: 170.367, NH3: 34.421 },
  rate: 50.85,
  constant: 3.93e-5,
} as const;

/** Partial pressures or fugacities [bar] that the methanol laws are asked at. */
export const methanolPoint = { CO: 2, CO2: 1.5, H2: 41, H2O: 0.5, CH3OH: 0.5 } as const;

/**
 * K. M. Vanden Bussche, G. F. Froment, J. Catal. 161 (1996) 1-10: [K, r(CO2 + 3 H2), r(CO2 + H2)] in mol/(kg s) at
 * `methanolPoint`. Derived by us from the printed equations.
 */
export const vandenBusscheFromentRates = [
  [493.15, 1.2837e-3, -3.3343e-3],
  [523.15, 1.0655e-2, -8.5574e-3],
] as const;

/**
 * G. H. Graaf, E. J. Stamhuis, A. A. C. M. Beenackers, Chem. Eng. Sci. 43 (1988) 3185-3195: [K, r(CO + 2 H2),
 * r(CO2 + H2), r(CO2 + 3 H2)] in mol/(kg s) at `methanolPoint`. Derived by us from the printed equations.
 */
export const graafRates = [
  [493.15, 6.909e-4, -1.7154e-4, 6.9247e-4],
  [523.15, 3.7643e-3, -3.9452e-4, 2.1305e-3],
] as const;

/**
 * J. Xu, G. F. Froment, AIChE J. 35 (1989) 88-96: rates in kmol/(kg h) at pressures [bar] and 773.15 K. Derived by
 * us from the printed equations.
 */
export const xuFromentRates = {
  kelvin: 773.15,
  bar: { CH4: 2, H2O: 6, CO: 0.5, CO2: 0.5, H2: 1 },
  rates: [-0.37071, 6.513, 0.083489],
} as const;

/**
 * R. B. Eklund 1956 as restated in H. S. Fogler, Elements of Chemical Reaction Engineering (from memory):
 * [K, k in mol/(kg s atm), Kp in atm^-1/2]. Derived by us from the printed formulas.
 */
export const eklundConstants = [
  [673.15, 7.202e-4, 563.4],
  [723.15, 6.215e-3, 167.2],
  [773.15, 2.479e-2, 58.03],
  [873.15, 7.394e-2, 10.06],
] as const;

/**
 * The adiabatic bench reactor of Vanden Bussche and Froment (as above): inlet as published. The profile is derived by
 * us, since the paper shows it as a figure only: inert taken as N2, ideal gas, heats of the NASA tables, no pressure
 * drop, by another program. Columns: share of the catalyst passed, K, then mole fractions.
 */
export const benchReactor = {
  catalystKg: 0.0348,
  feedKgPerS: 2.8e-5,
  kelvin: 493.2,
  bar: 50,
  feed: { CO: 0.04, CO2: 0.03, H2: 0.82, N2: 0.11 },
  columns: ['CO', 'CO2', 'H2', 'H2O', 'CH3OH'],
  profile: [
    [0.1, 512.3, 0.03908, 0.02333, 0.80963, 0.00719, 0.00882],
    [0.2, 536.8, 0.0333, 0.0218, 0.80453, 0.00924, 0.01732],
    [0.3, 550.2, 0.0301, 0.02093, 0.80166, 0.01039, 0.02206],
    [0.5, 552.4, 0.0296, 0.02076, 0.80117, 0.01061, 0.02284],
    [1, 552.4, 0.0296, 0.02076, 0.80116, 0.01061, 0.02284],
  ],
} as const;
