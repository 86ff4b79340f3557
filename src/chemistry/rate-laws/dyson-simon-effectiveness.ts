import { ATM, type PublishedEffectiveness } from './rate-law.ts';

/** b0 ... b6 by pressure [atm] */
const columns: readonly (readonly [atm: number, b: readonly number[]])[] = [
  [150, [-17.539096, 0.07697849, 6.900548, -1.08279e-4, -26.424699, 4.927648e-8, 38.93727]],
  [225, [-8.2125534, 0.03774149, 6.190112, -5.354571e-5, -20.86963, 2.379142e-8, 27.88403]],
  [300, [-4.6757259, 0.02354872, 4.687353, -3.463308e-5, -11.28031, 1.540881e-8, 10.46627]],
];

/**
 * ξ = b0 + b1 T + b2 X + b3 T² + b4 X² + b5 T³ + b6 X³, X the conversion of nitrogen since the converter's inlet,
 * held to 0–1: the cubic turns negative at small X above about 750 K. Given at 150, 225 and 300 atm; in between it
 * is interpolated linearly, which is common practice and not the authors', and beyond the ends the end is kept.
 * The same is done with T outside 643–803 K and X above 0.5, where the cubics turn over.
 *
 * @source D. C. Dyson, J. M. Simon, Ind. Eng. Chem. Fundam. 7 (1968) 605-610
 */
export const effectivenessOfDysonSimon: PublishedEffectiveness = {
  of: 'N2',
  at(temperatureK, pressurePa, conversion) {
    const T = Math.min(Math.max(temperatureK, 643), 803);
    const X = Math.min(Math.max(conversion, 0), 0.5);
    const atm = Math.min(Math.max(pressurePa / ATM, columns[0]![0]), columns.at(-1)![0]);
    const upper = atm <= columns[1]![0] ? 1 : 2;
    const [lowAtm, low] = columns[upper - 1]!;
    const [highAtm, high] = columns[upper]!;
    const share = (atm - lowAtm) / (highAtm - lowAtm);
    const value = (1 - share) * polynomial(low, T, X) + share * polynomial(high, T, X);
    return Math.min(Math.max(value, 0), 1);
  },
  note: 'Effectiveness of 6 to 10 mm iron catalyst after Dyson and Simon 1968, held to 0-1; between their pressures (150, 225, 300 atm) interpolated linearly.',
};

function polynomial(b: readonly number[], T: number, X: number): number {
  return b[0]! + T * (b[1]! + T * (b[3]! + T * b[5]!)) + X * (b[2]! + X * (b[4]! + X * b[6]!));
}
