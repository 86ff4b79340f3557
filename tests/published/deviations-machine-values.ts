/** Published values of gas density, throttling and compression to compare with, each with its source. */

/**
 * Z = PV/(RT) at 25 degC: [component, bar, Z].
 * @source reference equations of state: hydrogen J. W. Leachman et al., J. Phys. Chem. Ref. Data 38 (2009) 721;
 *   nitrogen R. Span et al., J. Phys. Chem. Ref. Data 29 (2000) 1361; from memory
 */
export const compressibilities = [
  ['H2', 50, 1.0297],
  ['H2', 100, 1.0601],
  ['H2', 200, 1.1231],
  ['H2', 300, 1.1879],
  ['N2', 50, 0.9959],
  ['N2', 100, 1.0041],
  ['N2', 200, 1.0555],
  ['N2', 300, 1.1422],
] as const;

/**
 * Temperature change of throttling: [component, K, from bar, to bar, change in K].
 * @source reference equations of state, from memory; propane: J. M. Smith, H. C. Van Ness & M. M. Abbott,
 *   Introduction to Chemical Engineering Thermodynamics, Example 7.4 (385 K behind the valve, whole kelvins)
 */
export const throttling = [
  ['H2', 300, 200, 1, 7.18],
  ['H2', 150, 100, 1, -2.12],
  ['N2', 300, 200, 1, -30.81],
  ['N2', 273.15, 100, 1, -23.01],
  ['CH4', 300, 200, 1, -82.49],
  ['CO2', 300, 50, 1, -75.25],
  ['C3H8', 400, 20, 1, -15],
] as const;

/**
 * Isentropic compression of air, 300 K, 100 to 900 kPa, k = 1.4, R = 0.287 kJ/(kg K): 263.2 kJ/kg.
 * @source Y. A. Cengel & M. A. Boles, Thermodynamics, Example 7-13
 */
export const airToNineBar = { inletK: 300, fromBar: 1, toBar: 9, workKJPerKg: 263.2 };

/**
 * Isentropic compression of 0.1 m3/s of air (counted at 273 K, 101.3 kPa) from 289 K, 101.3 to 380 kPa, k = 1.4: 17.2 kW.
 * @source J. M. Coulson, J. F. Richardson and others, Chemical Engineering vol. 1, Example 8.3
 */
export const airToFourBar = {
  inletK: 289,
  fromBar: 1.013,
  toBar: 3.8,
  flowMolPerS: (0.1 * 101_300) / (8.314 * 273),
  powerKW: 17.2,
};

/**
 * Saturated steam from 100 to 300 kPa, isentropic efficiency 75 %: 284.5 kJ/kg, 519.25 K.
 * @source J. M. Smith, H. C. Van Ness & M. M. Abbott, Introduction to Chemical Engineering Thermodynamics, Example 7.8
 */
export const steam = { fromBar: 1, toBar: 3, efficiency: 0.75, workKJPerKg: 284.5, outletK: 519.25 };

/**
 * Saturated ammonia vapour compressed without loss: [evaporating degC, condensing degC, from bar, to bar, kJ/kg,
 * discharge degC].
 * @source reference equation of state: K. Gao et al., J. Phys. Chem. Ref. Data 49 (2020); from memory
 */
export const ammoniaCompression = [
  [-33, 30, 1.029, 11.665, 370.5, 144.7],
  [-33, 35, 1.029, 13.5, 399.7, 158.1],
  [-33, 40, 1.029, 15.545, 428.7, 171.3],
  [-25, 30, 1.514, 11.665, 304.0, 122.5],
  [-25, 35, 1.514, 13.5, 331.4, 135.4],
  [-25, 40, 1.514, 15.545, 358.7, 148.2],
  [-20, 30, 1.9, 11.665, 266.3, 110.1],
  [-20, 35, 1.9, 13.5, 292.7, 122.8],
  [-20, 40, 1.9, 15.545, 319.0, 135.3],
  [-10, 30, 2.906, 11.665, 198.4, 88.3],
  [-10, 35, 2.906, 13.5, 223.0, 100.4],
  [-10, 40, 2.906, 15.545, 247.5, 112.4],
  [0, 30, 4.292, 11.665, 139.1, 69.8],
  [0, 35, 4.292, 13.5, 162.1, 81.4],
  [0, 40, 4.292, 15.545, 185.0, 92.9],
  [5, 30, 5.156, 11.665, 112.2, 61.7],
  [5, 35, 5.156, 13.5, 134.4, 73.0],
  [5, 40, 5.156, 15.545, 156.6, 84.3],
] as const;

/**
 * 3:1 hydrogen-nitrogen from 25 to 200 bar as ideal gas, each stage from 35 degC with isentropic efficiency 0.80, no
 * pressure lost in the coolers: [stages, kJ/kmol, discharge degC].
 * @source derived by us from NASA heat capacities (regression values, not published)
 */
export const synthesisGasCompression = [
  [1, 9085.6, 345.0],
  [2, 7754.2, 167.8],
  [3, 7365.8, 119.3],
  [4, 7180.7, 96.7],
] as const;

/**
 * Hydrogen dissolved in ammonia at 25 degC: [total pressure in atm, normal cm3 per g of ammonia].
 * @source R. Wiebe & T. H. Tremearne, J. Am. Chem. Soc. 56 (1934) 2357; from memory
 */
export const dissolvedHydrogen = [
  [50, 4.47],
  [100, 10.15],
  [200, 20.95],
  [400, 41.1],
] as const;
