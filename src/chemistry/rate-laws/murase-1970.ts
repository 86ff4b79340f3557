import { ATM, type RateLaw, TRACE, TRACE_OF_PLENTY } from './rate-law.ts';

const R_CAL = 1.987;
const N2 = 0;
const H2 = 1;
const NH3 = 2;
const KMOL_PER_H = 1000 / 3600;

/**
 * Ammonia on promoted iron, Temkin's equation with two constants in partial pressures:
 *   r = k1 pN2 pH2^1.5/pNH3 − k2 pNH3/pH2^1.5,
 *   k1 = 1.78954e4 exp(−20800/(R T)),  k2 = 2.5714e16 exp(−47400/(R T)),
 * in kmol N2 per m3 of catalyst and hour, p in atm. The real gas of some 286 atm is inside k1/k2. The exponent 1.5
 * is lost or moved in some later papers.
 *
 * @source A. Murase, H. L. Roberts, A. O. Converse, Ind. Eng. Chem. Process Des. Dev. 9 (1970) 503-513;
 *   S. R. Upreti, K. Deb, Comput. Chem. Eng. 21 (1997) 87-92
 */
export const murase1970: RateLaw = {
  name: 'murase-1970',
  summary: 'ammonia on promoted iron, tube-cooled converter near 286 atm',
  species: ['N2', 'H2', 'NH3'],
  reactions: [{ equation: 'N2 + 3 H2 <=> 2 NH3', stoichiometry: { N2: -1, H2: -3, NH3: 2 } }],
  per: 'volume',
  pressureUnitPa: ATM,
  fugacity: 'one',
  floors: [0, TRACE_OF_PLENTY, TRACE],
  forward(T, a, out) {
    const k1 = 1.78954e4 * Math.exp(-20_800 / (R_CAL * T));
    out[0] = (KMOL_PER_H * k1 * a[N2]! * a[H2]! * Math.sqrt(a[H2]!)) / a[NH3]!;
  },
  lnK(T, out) {
    out[0] = Math.log(1.78954e4 / 2.5714e16) + (47_400 - 20_800) / (R_CAL * T);
  },
  effectiveness: null,
  range: { fromK: 643, toK: 793, fromPa: 200 * ATM, toPa: 320 * ATM },
  source:
    'A. Murase, H. L. Roberts & A. O. Converse, Ind. Eng. Chem. Process Des. Dev. 9 (1970) 503-513; as in S. R. Upreti & K. Deb, Comput. Chem. Eng. 21 (1997) 87-92',
  note: 'The constants are those of a converter at 286 atm, pellets included; range from memory.',
};
