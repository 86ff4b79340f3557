import { ATM, type RateLaw } from './rate-law.ts';

const R_CAL = 1.987;
const SO2 = 0;
const O2 = 1;
const SO3 = 2;
/** SO2/SO3 at 5 % conversion: the rate holds from there, and is kept at it below */
const LARGEST_RATIO = 0.95 / 0.05;

/**
 * Sulphur dioxide on vanadium pentoxide:
 *   r = k √(pSO2/pSO3) [pO2 − (pSO3/(Kp pSO2))²],
 *   k = exp(−176008/TR − 110.1 ln TR + 912.8) lbmol SO2/(lb s atm),  Kp = exp(42311/(1.987 TR) − 11.24) atm^−1/2,
 * TR in degrees Rankine, p in atm. Counted here per 2 SO2 + O2 = 2 SO3. Below 5 % of conversion the root of
 * pSO2/pSO3 is kept at that of 5 %.
 *
 * @source R. B. Eklund, The rate of oxidation of sulphur dioxide with a commercial vanadium catalyst, Stockholm 1956,
 *   as restated in H. S. Fogler, Elements of Chemical Reaction Engineering (from memory)
 */
export const eklund1956: RateLaw = {
  name: 'eklund-1956',
  summary: 'sulphur dioxide on vanadium',
  species: ['SO2', 'O2', 'SO3'],
  reactions: [{ equation: '2 SO2 + O2 <=> 2 SO3', stoichiometry: { SO2: -2, O2: -1, SO3: 2 } }],
  per: 'mass',
  pressureUnitPa: ATM,
  fugacity: 'one',
  floors: [1e-7, 0, 0],
  forward(T, p, out) {
    const ratio = p[SO2]! / Math.max(p[SO3]!, p[SO2]! / LARGEST_RATIO);
    // lbmol/(lb s) are 1000 mol/(kg s); two SO2 per equation
    out[0] = 500 * rateConstant(1.8 * T) * Math.sqrt(ratio) * p[O2]!;
  },
  lnK(T, out) {
    out[0] = 2 * (42_311 / (R_CAL * 1.8 * T) - 11.24);
  },
  effectiveness: null,
  range: { fromK: 673, toK: 873, fromPa: 0.5e5, toPa: 2e5 },
  source:
    'R. B. Eklund, The rate of oxidation of sulphur dioxide with a commercial vanadium catalyst, Stockholm 1956, as restated in H. S. Fogler, Elements of Chemical Reaction Engineering (from memory)',
  note: 'Pellets as made, diffusion included; range common practice.',
};

function rateConstant(rankine: number): number {
  return Math.exp(-176_008 / rankine - 110.1 * Math.log(rankine) + 912.8);
}
