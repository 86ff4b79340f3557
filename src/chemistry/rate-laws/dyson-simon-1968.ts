import { effectivenessOfDysonSimon } from './dyson-simon-effectiveness.ts';
import { lnPhiOfDysonSimon } from './dyson-simon-fugacity.ts';
import { ATM, type RateLaw, TRACE, TRACE_OF_PLENTY } from './rate-law.ts';

/** k of the decomposition, counted in ammonia formed [kmol/(m3 h)]; half of it counts nitrogen */
const K0_NH3 = 1.7698e15;
const E_CAL_PER_MOL = 40_765;
const R_CAL = 1.987;
const ALPHA = 0.5;
const N2 = 0;
const H2 = 1;
const NH3 = 2;
/** [kmol NH3/h] to [mol N2/s] */
const PER_NITROGEN = 1000 / 3600 / 2;

/**
 * Ammonia on promoted iron, Temkin's equation in the form of Dyson and Simon:
 *   r = k [Ka² aN2 (aH2³/aNH3²)^α − (aNH3²/aH2³)^(1−α)],  k = k0 exp(−E/(R T)),
 * in kmol NH3 per m3 of bed and hour, a in atm, Ka of 1/2 N2 + 3/2 H2 = NH3 after Gillespie and Beattie, fugacity
 * coefficients by the authors' correlation. Here it is counted per N2 + 3 H2 = 2 NH3, and
 *   forward = k Ka² aN2 (aH2³/aNH3²)^α.
 *
 * @source D. C. Dyson, J. M. Simon, Ind. Eng. Chem. Fundam. 7 (1968) 605-610; k0 as printed: from memory, agreeing
 *   with the nitrogen-based 8.849e14 of later work
 */
export const dysonSimon1968: RateLaw = {
  name: 'dyson-simon-1968',
  summary: 'ammonia on promoted iron',
  species: ['N2', 'H2', 'NH3'],
  reactions: [{ equation: 'N2 + 3 H2 <=> 2 NH3', stoichiometry: { N2: -1, H2: -3, NH3: 2 } }],
  per: 'volume',
  pressureUnitPa: ATM,
  fugacity: 'own',
  lnPhi: lnPhiOfDysonSimon,
  floors: [0, TRACE_OF_PLENTY, TRACE],
  forward(T, a, out) {
    const k = K0_NH3 * Math.exp(-E_CAL_PER_MOL / (R_CAL * T));
    const driving = a[H2]! ** 3 / (a[NH3]! * a[NH3]!);
    out[0] = PER_NITROGEN * k * Math.exp(lnKaSquared(T)) * a[N2]! * driving ** ALPHA;
  },
  lnK(T, out) {
    out[0] = lnKaSquared(T);
  },
  effectiveness: effectivenessOfDysonSimon,
  range: { fromK: 643, toK: 773, fromPa: 150 * ATM, toPa: 300 * ATM },
  source: 'D. C. Dyson & J. M. Simon, Ind. Eng. Chem. Fundam. 7 (1968) 605-610',
  note: 'Particles of 6 to 10 mm; range from memory. Full activity of the catalyst of that time.',
};

/** log10 Ka = −2.691122 log10 T − 5.519265e-5 T + 1.848863e-7 T² + 2001.6/T + 2.6899 (Gillespie and Beattie 1930) */
function lnKaSquared(T: number): number {
  const log10Ka = -2.691122 * Math.log10(T) - 5.519265e-5 * T + 1.848863e-7 * T * T + 2001.6 / T + 2.6899;
  return 2 * Math.LN10 * log10Ka;
}
