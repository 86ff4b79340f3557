/** Bubble points of one pair: [mole fraction of the first in the liquid, in the vapour, degC], at 1.01325 bar. */
type BubblePoints = readonly (readonly [x: number, y: number, celsius: number])[];

/**
 * Methanol-water at 1 atm.
 * @source Perry's Chemical Engineers' Handbook, older International Critical Tables origin; the row at x 0.15 and the
 *   temperatures at x 0.04, 0.08 and 0.95 from memory
 */
export const methanolWater: BubblePoints = [
  [0.02, 0.134, 96.4],
  [0.04, 0.23, 93.5],
  [0.06, 0.304, 91.2],
  [0.08, 0.365, 89.3],
  [0.1, 0.418, 87.7],
  [0.15, 0.517, 84.4],
  [0.2, 0.579, 81.7],
  [0.3, 0.665, 78],
  [0.4, 0.729, 75.3],
  [0.5, 0.779, 73.1],
  [0.6, 0.825, 71.2],
  [0.7, 0.87, 69.3],
  [0.8, 0.915, 67.6],
  [0.9, 0.958, 66],
  [0.95, 0.979, 65],
];

/**
 * Ethanol-water at 1 atm; the last row is the azeotrope.
 * @source J. S. Carey, W. K. Lewis, Ind. Eng. Chem. 24 (1932) 882, as reprinted in Perry's handbook
 */
export const ethanolWater: BubblePoints = [
  [0.019, 0.17, 95.5],
  [0.0721, 0.3891, 89],
  [0.0966, 0.4375, 86.7],
  [0.1238, 0.4704, 85.3],
  [0.1661, 0.5089, 84.1],
  [0.2337, 0.5445, 82.7],
  [0.2608, 0.558, 82.3],
  [0.3273, 0.5826, 81.5],
  [0.3965, 0.6122, 80.7],
  [0.5079, 0.6564, 79.8],
  [0.5198, 0.6599, 79.7],
  [0.5732, 0.6841, 79.3],
  [0.6763, 0.7385, 78.74],
  [0.7472, 0.7815, 78.41],
  [0.8943, 0.8943, 78.15],
];

/** [m, n, a] */
const temperatureTerms = [
  [0, 0, 3.22302],
  [0, 1, -0.384206],
  [0, 2, 0.0460965],
  [0, 3, -0.00378945],
  [0, 4, 0.00013561],
  [1, 0, 0.487755],
  [1, 1, -0.120108],
  [1, 2, 0.0106154],
  [2, 3, -0.000533589],
  [4, 0, 7.85041],
  [5, 0, -11.5941],
  [5, 1, -0.052315],
  [6, 0, 4.89596],
  [13, 1, 0.0421059],
] as const;
const vapourTerms = [
  [0, 0, 19.8022017],
  [0, 1, -11.8092669],
  [0, 6, 27.747998],
  [0, 7, -28.8634277],
  [1, 0, -59.1616608],
  [2, 1, 578.091305],
  [2, 2, -6.21736743],
  [3, 2, -3421.98402],
  [4, 3, 11940.3127],
  [5, 4, -24541.3777],
  [6, 5, 29159.1865],
  [7, 6, -18478.229],
  [7, 7, 23.4819434],
  [8, 7, 4803.10617],
] as const;

/**
 * Bubble temperature [K] of ammonia-water and the ammonia in its vapour, 0.002 to 2 MPa:
 *   T = 100 Σ a (1 − x)^m ln(2/p)^n,  y = 1 − exp(ln(1 − x) Σ a (p/2)^m x^(n/3)),  p in MPa.
 * @source J. Patek, J. Klomfar, Int. J. Refrig. 18 (1995) 228
 */
export function ammoniaWater(x: number, megapascal: number): { readonly T: number; readonly y: number } {
  const ln = Math.log(2 / megapascal);
  const T = 100 * temperatureTerms.reduce((sum, [m, n, a]) => sum + a * (1 - x) ** m * ln ** n, 0);
  const exponent = vapourTerms.reduce((sum, [m, n, a]) => sum + a * (megapascal / 2) ** m * x ** (n / 3), 0);
  return { T, y: 1 - Math.exp(Math.log(1 - x) * exponent) };
}

/** Where ammonia-water is compared: the whole range of composition, 0.2 to 20 bar. */
export const ammoniaWaterGrid = {
  megapascal: [0.02, 0.05, 0.1, 0.2, 0.5, 1, 2],
  x: [0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9],
} as const;
