/**
 * Equilibrium NH3 [mole %] over 3:1 hydrogen-nitrogen without inerts, by pressure [atm] and temperature [degC].
 * Measured cells: 350 to 500 degC at 10 to 100 atm, 450 and 500 degC up to 1000 atm; the rest is the original
 * extrapolation. The cells at 1000 atm and 550 degC and above stand below the trend of the table and are left
 * out (null).
 *
 * @source A. T. Larson, R. L. Dodge, J. Am. Chem. Soc. 45 (1923) 2918; A. T. Larson, J. Am. Chem. Soc. 46
 *   (1924) 367; from memory, as reprinted in handbooks
 */
export const larsonDodge = {
  pressuresAtm: [10, 30, 50, 100, 300, 600, 1000],
  rows: [
    {
      celsius: 200,
      percent: [50.66, 67.56, 74.38, 81.54, 89.94, 95.37, 98.29],
      measured: [false, false, false, false, false, false, false],
    },
    {
      celsius: 250,
      percent: [28.34, 47.22, 56.33, 67.24, 81.38, 90.66, 96.17],
      measured: [false, false, false, false, false, false, false],
    },
    {
      celsius: 300,
      percent: [14.73, 30.25, 39.41, 52.04, 70.96, 84.21, 92.55],
      measured: [false, false, false, false, false, false, false],
    },
    {
      celsius: 350,
      percent: [7.41, 17.78, 25.23, 37.35, 59.12, 75.62, 87.46],
      measured: [true, true, true, true, false, false, false],
    },
    {
      celsius: 400,
      percent: [3.85, 10.15, 15.27, 25.12, 47, 65.2, 79.82],
      measured: [true, true, true, true, false, false, false],
    },
    {
      celsius: 450,
      percent: [2.11, 5.86, 9.15, 16.43, 35.82, 53.71, 69.69],
      measured: [true, true, true, true, true, true, true],
    },
    {
      celsius: 500,
      percent: [1.21, 3.49, 5.56, 10.61, 26.44, 42.15, 57.47],
      measured: [true, true, true, true, true, true, true],
    },
    {
      celsius: 550,
      percent: [0.76, 2.18, 3.45, 6.82, 19.13, 31.63, null],
      measured: [false, false, false, false, false, false, false],
    },
    {
      celsius: 600,
      percent: [0.49, 1.39, 2.26, 4.52, 13.77, 23.1, null],
      measured: [false, false, false, false, false, false, false],
    },
    {
      celsius: 650,
      percent: [0.33, 0.96, 1.53, 3.11, 9.92, 16.02, null],
      measured: [false, false, false, false, false, false, false],
    },
    {
      celsius: 700,
      percent: [0.24, 0.68, 1.05, 2.18, 7.28, 12.6, null],
      measured: [false, false, false, false, false, false, false],
    },
  ],
} as const;

/**
 * Measured NH3 [mole %] at 450 degC, at the pressures [atm] of the table.
 * @source A. T. Larson, J. Am. Chem. Soc. 46 (1924) 367, from memory
 */
export const larsonAt450 = [2.04, 5.8, 9.17, 16.36, 35.5, 53.6, 69.4] as const;

/**
 * log10 Ka for 1/2 N2 + 3/2 H2 = NH3, Ka in 1/atm, T in K.
 * @source L. J. Gillespie, J. A. Beattie, Phys. Rev. 36 (1930) 743
 */
export function gillespieBeattieLog10Ka(T: number): number {
  return -2.691122 * Math.log10(T) - 5.519265e-5 * T + 1.848863e-7 * T * T + 2001.6 / T + 2.6899;
}

/**
 * Fugacity coefficients of the components in the equilibrium gas: [degC, atm, H2, N2, NH3].
 * @source D. C. Dyson, J. M. Simon, Ind. Eng. Chem. Fundam. 7 (1968) 605, their correlations evaluated; from memory
 */
export const dysonSimon = [
  [350, 100, 1.0325, 1.0568, 0.922],
  [350, 200, 1.0659, 1.1008, 0.8855],
  [350, 300, 1.1004, 1.1542, 0.8544],
  [400, 100, 1.0299, 1.0548, 0.9494],
  [400, 200, 1.0606, 1.0987, 0.9128],
  [400, 300, 1.0922, 1.1522, 0.8817],
  [450, 100, 1.0277, 1.0514, 0.971],
  [450, 200, 1.056, 1.0953, 0.9344],
  [450, 300, 1.0851, 1.1488, 0.9034],
  [500, 100, 1.0257, 1.0467, 0.9869],
  [500, 200, 1.052, 1.0906, 0.9503],
  [500, 300, 1.0789, 1.144, 0.9193],
] as const;
