/** Published equilibrium constants and equilibria to test against, each with its source. */

/**
 * Gas-phase constants of ammonia, 1/2 N2 + 3/2 H2 = NH3, atm^-1: the printed formula at round temperatures.
 * L. J. Gillespie & J. A. Beattie, Phys. Rev. 36 (1930) 743-753.
 */
export const gillespieBeattie: readonly (readonly [degC: number, Ka: number])[] = [
  [200, 0.545505],
  [300, 0.0614391],
  [400, 0.0125665],
  [450, 0.00660741],
  [500, 0.00374943],
  [600, 0.00144619],
  [700, 0.000670733],
];

/**
 * K for N2 + 3 H2 = 2 NH3, atm^-2, table of general-chemistry textbooks (Zumdahl and others).
 * 450 and 550 degC: from memory.
 */
export const textbookAmmonia: readonly (readonly [degC: number, K: number])[] = [
  [300, 0.00434],
  [400, 0.000164],
  [450, 4.51e-5],
  [500, 1.45e-5],
  [550, 5.38e-6],
  [600, 2.25e-6],
];

/**
 * Methanol and reverse shift: [degC, K(CO + 2 H2) 1986, 2016 in bar^-2, K(CO2 + H2 = CO + H2O) 1986, 2016,
 * K(CO2 + 3 H2) 1986, 2016 in bar^-2], the printed formulas at round temperatures.
 * G. H. Graaf et al., Chem. Eng. Sci. 41 (1986) 2883-2890;
 * G. H. Graaf & J. G. M. Winkelman, Ind. Eng. Chem. Res. 55 (2016) 5854-5864.
 */
export const graaf: readonly (readonly [number, number, number, number, number, number, number])[] = [
  [200, 0.01739, 0.01773, 0.004444, 0.004324, 7.726e-5, 7.667e-5],
  [220, 0.006306, 0.006513, 0.00669, 0.006531, 4.219e-5, 4.253e-5],
  [250, 0.001593, 0.001657, 0.01165, 0.01139, 1.856e-5, 1.887e-5],
  [280, 0.0004671, 0.0004841, 0.01911, 0.01864, 8.929e-6, 9.025e-6],
  [300, 0.0002214, 0.0002279, 0.02583, 0.02511, 5.72e-6, 5.723e-6],
];

/** CO + H2O = CO2 + H2. J. M. Moe, Chem. Eng. Prog. 58 (1962) 33. */
export const moe: readonly (readonly [degC: number, K: number])[] = [
  [200, 209.6],
  [300, 38.75],
  [400, 11.83],
  [500, 4.909],
  [600, 2.491],
];

/**
 * SO2 + 1/2 O2 = SO3, atm^-1/2: [degC, Eklund, King].
 * R. Eklund, The Rate of Oxidation of Sulphur Dioxide, Stockholm 1956;
 * M. King, M. Moats & W. G. Davenport, Sulfuric Acid Manufacture, 2nd ed. 2013 (from memory).
 */
export const sulphurTrioxide: readonly (readonly [number, number, number])[] = [
  [400, 483.5, 564.37],
  [450, 149.74, 167.33],
  [500, 53.968, 58.061],
  [550, 22.018, 22.911],
  [600, 9.9541, 10.056],
];

/**
 * CH4 + H2O = CO + 3 H2, bar^2: exp(30.114 - 26830/T). M. V. Twigg (ed.), Catalyst Handbook, 2nd ed. 1989.
 */
export const twigg: readonly (readonly [degC: number, K: number])[] = [
  [400, 5.868e-5],
  [600, 0.5413],
  [800, 166.1],
  [900, 1400],
];

/**
 * K from the polynomials of B. J. McBride, S. Gordon & M. A. Reno, NASA TM-4513 (1993), 1 bar, graphite (from memory):
 * [degC, CH4 + H2O = CO + 3 H2, C + CO2 = 2 CO, C + H2O = CO + H2, CH4 = C + 2 H2].
 */
export const nasaCarbon: readonly (readonly [number, number, number, number, number])[] = [
  [300, 6.763e-8, 3.401e-7, 1.387e-5, 0.004876],
  [500, 0.009974, 0.004116, 0.02107, 0.4735],
  [700, 12.56, 1.0, 1.612, 7.795],
  [900, 1452, 35.93, 28.22, 51.46],
  [1100, 42520, 440.6, 213.9, 198.8],
];

/**
 * Coal gasifier with solid carbon: 0.5 CO2 + 1.881 N2 + 1 H2O over carbon, 20 bar; K of C + CO2 = 2 CO and of
 * C + H2O = CO + H2 with the extents, [T, Ka, Kb, extent a, extent b, y H2, y CO, y H2O, y CO2, y N2].
 * J. M. Smith, H. C. Van Ness & M. M. Abbott, Introduction to Chemical Engineering Thermodynamics, Example 13.13.
 */
export const gasifier: readonly (readonly number[])[] = [
  [1000, 1.758, 2.561, -0.0506, 0.5336, 0.138, 0.112, 0.121, 0.143, 0.487],
  [1100, 11.405, 11.219, 0.121, 0.7124, 0.169, 0.227, 0.068, 0.09, 0.446],
  [1200, 53.155, 38.609, 0.3168, 0.8551, 0.188, 0.327, 0.032, 0.04, 0.413],
  [1300, 194.79, 110.064, 0.4302, 0.9357, 0.197, 0.378, 0.014, 0.015, 0.396],
  [1400, 583.343, 268.764, 0.4738, 0.9713, 0.201, 0.398, 0.006, 0.005, 0.39],
  [1500, 1514.118, 583.577, 0.4895, 0.9863, 0.203, 0.405, 0.003, 0.002, 0.387],
];

/**
 * Shift at 1100 K, K = 1 (case g: 1650 K, ln K = -1.15): feed CO, H2O, CO2, N2, bar, ln K, share of the steam reacted.
 * Smith, Van Ness & Abbott, Example 13.5.
 */
export const shiftCases: readonly (readonly [
  string,
  number,
  number,
  number,
  number,
  number,
  number,
  number,
])[] = [
  ['a', 1, 1, 0, 0, 1, 0, 0.5],
  ['b', 1, 1, 0, 0, 10, 0, 0.5],
  ['c', 1, 1, 0, 2, 1, 0, 0.5],
  ['d', 1, 2, 0, 0, 1, 0, 0.333],
  ['e', 2, 1, 0, 0, 1, 0, 0.667],
  ['f', 1, 1, 1, 0, 1, 0, 0.333],
  ['g', 1, 1, 0, 0, 1, -1.15, 0.36],
];

/**
 * Reforming at 1 bar, CH4:H2O = 1:5, K = 0.574 (to CO) and 2.21 (shift): mole fractions at equilibrium.
 * K. V. Narayanan, A Textbook of Chemical Engineering Thermodynamics, Example 9.23.
 */
export const reforming = { CH4: 0.01124, H2O: 0.4416, CO: 0.03569, H2: 0.43059, CO2: 0.08088 };

/**
 * Derived by us from the Graaf-Winkelman constants, ideal gas (regression values, not published):
 * [degC, bar, CO conversion of CO + 2 H2, CO2 conversion and methanol yield of CO2 + 3 H2,
 * mol % methanol, CO conversion, CO2 conversion of 10 CO, 8 CO2, 70 H2, 12 inert].
 */
export const methanolConversions: readonly (readonly number[])[] = [
  [220, 50, 0.6979, 0.2814, 0.2442, 12.087, 0.8398, 0.167],
  [240, 75, 0.6843, 0.308, 0.2616, 12.162, 0.8164, 0.2023],
  [250, 100, 0.6998, 0.336, 0.2891, 12.822, 0.8283, 0.2403],
  [260, 50, 0.4333, 0.2385, 0.1307, 6.662, 0.4837, 0.1302],
  [280, 100, 0.5313, 0.2993, 0.1988, 8.967, 0.601, 0.1991],
];

/**
 * SO2 conversion of converter gas, balance N2, derived by us (regression values, not published):
 * [% SO2, % O2, degC, Eklund 1 atm, NASA TM-4513 1 atm, Eklund 1.2 bar].
 */
export const sulphurConversions: readonly (readonly [number, number, number, number, number, number])[] = [
  [10, 11, 400, 0.9919, 0.993, 0.9925],
  [10, 11, 500, 0.9329, 0.9372, 0.9379],
  [10, 11, 600, 0.7331, 0.735, 0.7484],
  [7, 11, 450, 0.9767, 0.9791, 0.9786],
  [7, 11, 550, 0.8633, 0.8677, 0.8728],
  [12, 9, 425, 0.9796, 0.9821, 0.9812],
  [12, 9, 575, 0.7594, 0.7633, 0.773],
  [8, 12.4, 475, 0.9634, 0.9665, 0.9663],
];

/**
 * Adiabatic first bed, 10 % SO2, 11 % O2, 79 % N2 from 690 K at 1.2 bar: conversion 0.692, 893 K.
 * King, Moats & Davenport 2013, chapter 12 (from memory).
 */
export const sulphurBed = { conversion: 0.692, outletK: 893 };
