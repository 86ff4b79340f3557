/**
 * Gain from absorbing all SO3 between two passes: feed 10 % SO2, 11 % O2, rest N2, 1 atm. Derived by us (regression
 * values, not published) from the constant of R. Eklund, The Rate of Oxidation of Sulphur Dioxide, Stockholm 1956:
 * [degC, conversion of the first pass, equilibrium of a single pass, equilibrium of the second pass, overall].
 */
export const interpassAbsorption = [
  [400, 0.9, 0.99186, 0.99223, 0.99922],
  [400, 0.94, 0.99186, 0.99225, 0.99953],
  [400, 0.95, 0.99186, 0.99225, 0.99961],
  [420, 0.9, 0.98682, 0.9874, 0.99874],
  [420, 0.94, 0.98682, 0.98742, 0.99925],
  [420, 0.95, 0.98682, 0.98743, 0.99937],
  [430, 0.9, 0.98342, 0.98413, 0.99841],
  [430, 0.94, 0.98342, 0.98416, 0.99905],
  [430, 0.95, 0.98342, 0.98417, 0.99921],
  [440, 0.9, 0.97931, 0.98015, 0.99802],
  [440, 0.94, 0.97931, 0.98019, 0.99881],
  [440, 0.95, 0.97931, 0.9802, 0.99901],
  [450, 0.9, 0.97436, 0.97536, 0.99754],
  [450, 0.94, 0.97436, 0.97541, 0.99852],
  [450, 0.95, 0.97436, 0.97542, 0.99877],
] as const;

/**
 * Four adiabatic equilibrium beds with intercooling and no absorption, feed 10 % SO2, 11 % O2, 79 % N2 at 1.2 bar.
 * Derived by us (regression values, not published) with the Gibbs energies of M. King, M. Moats & W. G. Davenport,
 * Sulfuric Acid Manufacture, 2nd ed., Elsevier 2013: [inlet degC, outlet degC, cumulative conversion].
 */
export const fourBeds = {
  feedPercent: { SO2: 10, O2: 11, N2: 79 },
  bar: 1.2,
  rows: [
    [420, 620.8, 0.6908],
    [440, 510.2, 0.9303],
    [430, 445.0, 0.981],
    [420, 422.3, 0.9888],
  ],
} as const;

/**
 * What plants reach [%]: EFMA/ESA, Production of Sulphuric Acid, Best Available Techniques booklet 3 (2000), from
 * memory; common practice.
 */
export const plantConversion = { single: [97, 98.5], double: [99.5, 99.9] } as const;
