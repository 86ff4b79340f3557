import type { FixedPointProblem } from '../../src/convergence/driver.ts';
import type { MethodName } from '../../src/model/flowsheet.ts';
import { converterFeedProblem, loop1 } from './ammonia-loop.ts';

/** A fixed-point problem with a known answer. */
export interface KnownProblem {
  readonly name: string;
  readonly problem: FixedPointProblem;
  readonly start: readonly number[];
  readonly solution: readonly number[];
  /** digits the solution is known to, as a relative tolerance: the reason stands beside the problem */
  readonly known: number;
  /** methods that cannot close it, with the reason */
  readonly cannot: Readonly<Partial<Record<MethodName, string>>>;
  /** evaluations until the largest |G(x) − x| / max(1, |G|) is 1e-8, derived independently; null: not in 2000 */
  readonly evaluations: Readonly<Partial<Record<MethodName, number | null>>>;
}

function scalar(f: (x: number) => number): FixedPointProblem {
  return {
    size: 1,
    lower: Float64Array.of(-Infinity),
    evaluate(x, g) {
      g[0] = f(x[0]);
    },
  };
}

function map(size: number, f: (x: Float64Array) => readonly number[], lower = 0): FixedPointProblem {
  return {
    size,
    lower: new Float64Array(size).fill(lower),
    evaluate(x, g) {
      g.set(f(x));
    },
  };
}

/** Ethylene, oxygen, ethylene oxide with 6 % conversion; 98, 99.5 and 3 % of them go round again. */
const ethyleneOxide = map(3, (x) => [
  196 + 0.98 * 0.94 * x[0],
  84.5 + 0.995 * (x[1] - 0.03 * x[0]),
  0.03 * (x[2] + 0.06 * x[0]),
]);
const ethylene = 196 / (1 - 0.98 * 0.94);

/** CO, H2, N2; 20 % of the hydrogen reacts, methanol is taken out, 5 % purge. */
const methanol = map(3, (x) => [36 + 0.95 * (x[0] - 0.1 * x[1]), 60 + 0.95 * 0.8 * x[1], 4 + 0.95 * x[2]]);

/** N2, H2, inert, NH3; 25 % of the nitrogen reacts, 65 % of the ammonia is condensed. */
const purge = 7.9000884 / 346.48924;
const ammoniaSplit = map(4, (x) => [
  24.75 + (1 - purge) * 0.75 * x[0],
  74.25 + (1 - purge) * (x[1] - 0.75 * x[0]),
  1 + (1 - purge) * x[2],
  (1 - purge) * 0.35 * (x[3] + 0.5 * x[0]),
]);

/** FP-1 ... FP-9: closed forms or independent solutions; `known` follows the digits given or the closed form. */
export const bank: readonly KnownProblem[] = [
  {
    name: 'FP-1: x = cos x',
    problem: scalar(Math.cos),
    start: [1],
    solution: [0.7390851332151607],
    known: 1e-9,
    cannot: {},
    evaluations: { direct: 46, wegstein: 6, eigenvalue: 13, broyden: 6, anderson: 6 },
  },
  {
    name: 'FP-2: x = exp(-x)',
    problem: scalar((x) => Math.exp(-x)),
    start: [0.5],
    solution: [0.5671432904097838],
    known: 1e-9,
    cannot: {},
    evaluations: { direct: 30, wegstein: 5, eigenvalue: 9, broyden: 5, anderson: 6 },
  },
  {
    name: 'FP-3: x = 5 exp(-x)',
    problem: scalar((x) => 5 * Math.exp(-x)),
    start: [1],
    solution: [1.3267246652422002],
    known: 1e-9,
    cannot: { direct: 'the eigenvalue is -1.33: every pass throws further to the other side' },
    evaluations: { direct: null, wegstein: 7, eigenvalue: 21, broyden: 7, anderson: 9 },
  },
  {
    name: 'FP-4: x = 1 + 0.99 x - 0.001 x²',
    problem: scalar((x) => 1 + 0.99 * x - 0.001 * x * x),
    start: [1],
    solution: [27.0156211871642],
    known: 1e-9,
    cannot: {},
    evaluations: { direct: 246, wegstein: 10, eigenvalue: 21, broyden: 10, anderson: 14 },
  },
  {
    name: 'FP-5: two variables that chase each other (complex eigenvalues, modulus 0.943)',
    problem: map(2, (x) => [1 + 0.5 * x[0] - 0.8 * x[1], 1 + 0.8 * x[0] + 0.5 * x[1]], -Infinity),
    start: [0, 0],
    solution: [-30 / 89, 130 / 89], // (I - A) x = (1, 1) by Cramer's rule, determinant 0.89
    known: 1e-9,
    cannot: {
      wegstein: 'each variable is accelerated by itself, and here each answers to the other',
      eigenvalue: 'a leap along one direction cannot follow a pair that turns',
    },
    evaluations: { direct: 318, wegstein: null, eigenvalue: null, broyden: 5, anderson: 4 },
  },
  {
    name: 'FP-6: methanol loop with fixed conversion',
    problem: methanol,
    start: [36, 60, 4],
    solution: [245, 250, 80], // closed form: H2 = 60/(1 - 0.95·0.8), N2 = 4/0.05
    known: 1e-9,
    cannot: {},
    evaluations: { direct: 301, wegstein: 5, eigenvalue: 57, broyden: 5, anderson: 4 },
  },
  {
    name: 'FP-7: ethylene oxide loop with fixed conversion',
    problem: ethyleneOxide,
    start: [196, 84.5, 0],
    // closed form from the first variable on; 2487.309645, 2050.761421, 4.615626
    solution: [ethylene, (84.5 - 0.995 * 0.03 * ethylene) / 0.005, (0.03 * 0.06 * ethylene) / 0.97],
    known: 1e-9,
    cannot: {},
    evaluations: { direct: 2484, wegstein: 5, eigenvalue: 145, broyden: 7, anderson: 5 },
  },
  {
    name: 'FP-8: ammonia loop with fixed conversion and condensation',
    problem: ammoniaSplit,
    start: [24.75, 74.25, 1, 0],
    solution: [92.661824, 277.985472, 43.858907, 24.082934],
    known: 2e-8, // eight digits given
    cannot: {},
    evaluations: { direct: 635, wegstein: 5, eigenvalue: 58, broyden: 7, anderson: 5 },
  },
  {
    name: 'FP-9: ammonia loop at equilibrium with a saturated separator',
    problem: converterFeedProblem(loop1),
    start: [24.75, 74.25, 1, 0],
    solution: [67.94947, 203.848409, 50, 8.905136],
    known: 1e-7, // seven digits given
    cannot: {},
    evaluations: { direct: 719, wegstein: 31, eigenvalue: 121, broyden: 20, anderson: 9 },
  },
];
