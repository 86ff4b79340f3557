import { BAR, type RateLaw, TRACE_OF_PLENTY } from './rate-law.ts';

const R = 8.314;
const CO = 0;
const CO2 = 1;
const H2 = 2;
const H2O = 3;

/**
 * Methanol and reverse shift on Cu/ZnO/Al2O3 with carbon monoxide and carbon dioxide both forming methanol:
 *   CO + 2 H2 = CH3OH          rA = kA KCO [fCO fH2^1.5 − fCH3OH/(√fH2 KpA)]/N
 *   CO2 + H2 = CO + H2O        rB = kB KCO2 [fCO2 fH2 − fH2O fCO/KpB]/N
 *   CO2 + 3 H2 = CH3OH + H2O   rC = kC KCO2 [fCO2 fH2^1.5 − fCH3OH fH2O/(fH2^1.5 KpC)]/N
 *   N = (1 + KCO fCO + KCO2 fCO2)(√fH2 + Kw fH2O)
 * in mol per kg of catalyst and second, f in bar (Soave's equation in the paper), Kp of Graaf 1986 with
 * KpC = KpA KpB. Three rates, two independent reactions.
 *
 * @source G. H. Graaf, E. J. Stamhuis, A. A. C. M. Beenackers, Chem. Eng. Sci. 43 (1988) 3185-3195
 */
export const graaf1988: RateLaw = {
  name: 'graaf-1988',
  summary: 'methanol from both oxides and reverse shift on copper',
  species: ['CO', 'CO2', 'H2', 'H2O', 'CH3OH'],
  reactions: [
    { equation: 'CO + 2 H2 <=> CH3OH', stoichiometry: { CO: -1, H2: -2, CH3OH: 1 } },
    { equation: 'CO2 + H2 <=> CO + H2O', stoichiometry: { CO2: -1, H2: -1, CO: 1, H2O: 1 } },
    {
      equation: 'CO2 + 3 H2 <=> CH3OH + H2O',
      stoichiometry: { CO2: -1, H2: -3, CH3OH: 1, H2O: 1 },
    },
  ],
  per: 'mass',
  pressureUnitPa: BAR,
  fugacity: 'gas model',
  floors: [0, 0, TRACE_OF_PLENTY, 0, 0],
  forward(T, f, out) {
    const RT = R * T;
    const KCO = 2.16e-5 * Math.exp(46_800 / RT);
    const KCO2 = 7.05e-7 * Math.exp(61_700 / RT);
    const Kw = 6.37e-9 * Math.exp(84_000 / RT);
    const root = Math.sqrt(f[H2]!);
    const perSites = 1 / ((1 + KCO * f[CO]! + KCO2 * f[CO2]!) * (root + Kw * f[H2O]!));
    out[0] = 4.89e7 * Math.exp(-113_000 / RT) * KCO * f[CO]! * f[H2]! * root * perSites;
    out[1] = 9.64e11 * Math.exp(-152_900 / RT) * KCO2 * f[CO2]! * f[H2]! * perSites;
    out[2] = 1.09e5 * Math.exp(-87_500 / RT) * KCO2 * f[CO2]! * f[H2]! * root * perSites;
  },
  lnK(T, out) {
    out[0] = Math.LN10 * (5139 / T - 12.621);
    out[1] = Math.LN10 * (-2073 / T + 2.029);
    out[2] = Math.LN10 * (3066 / T - 10.592);
  },
  effectiveness: null,
  range: { fromK: 483, toK: 518, fromPa: 15e5, toPa: 50e5 },
  source: 'G. H. Graaf, E. J. Stamhuis & A. A. C. M. Beenackers, Chem. Eng. Sci. 43 (1988) 3185-3195',
  note: 'Intrinsic rates of crushed catalyst; whole pellets are slower (Graaf and co-workers, Chem. Eng. Sci. 45 (1990) 773-783).',
};
