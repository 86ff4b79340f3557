import { BAR, type RateLaw, TRACE_OF_PLENTY } from './rate-law.ts';

const R = 8.314;
const CO2 = 1;
const H2 = 2;
const H2O = 3;

/**
 * Methanol and reverse shift on Cu/ZnO/Al2O3, all methanol by carbon dioxide:
 *   CO2 + 3 H2 = CH3OH + H2O   r1 = A pCO2 pH2 [1 − pH2O pCH3OH/(K1 pH2³ pCO2)]/D³
 *   CO2 + H2 = CO + H2O        r2 = B pCO2 [1 − pH2O pCO/(K2 pCO2 pH2)]/D
 *   D = 1 + C pH2O/pH2 + E √pH2 + F pH2O
 * in mol per kg of catalyst and second, p in bar. The constants K are those of Graaf 1986; the paper writes the
 * second for CO + H2O, which stands here the other way round. A grows on cooling, being a rate constant times
 * heats of adsorption.
 *
 * @source K. M. Vanden Bussche, G. F. Froment, J. Catal. 161 (1996) 1-10, doi 10.1006/jcat.1996.0156
 */
export const vandenBusscheFroment1996: RateLaw = {
  name: 'vanden-bussche-froment-1996',
  summary: 'methanol and reverse shift on copper',
  species: ['CO', 'CO2', 'H2', 'H2O', 'CH3OH'],
  reactions: [
    {
      equation: 'CO2 + 3 H2 <=> CH3OH + H2O',
      stoichiometry: { CO2: -1, H2: -3, CH3OH: 1, H2O: 1 },
    },
    { equation: 'CO2 + H2 <=> CO + H2O', stoichiometry: { CO2: -1, H2: -1, CO: 1, H2O: 1 } },
  ],
  per: 'mass',
  pressureUnitPa: BAR,
  fugacity: 'one',
  floors: [0, 0, TRACE_OF_PLENTY, 0, 0],
  forward(T, p, out) {
    const RT = R * T;
    const A = 1.07 * Math.exp(36_696 / RT);
    const B = 1.22e10 * Math.exp(-94_765 / RT);
    const E = 0.499 * Math.exp(17_197 / RT);
    const F = 6.62e-11 * Math.exp(124_119 / RT);
    const D = 1 + (3453.38 * p[H2O]!) / p[H2]! + E * Math.sqrt(p[H2]!) + F * p[H2O]!;
    out[0] = (A * p[CO2]! * p[H2]!) / (D * D * D);
    out[1] = (B * p[CO2]!) / D;
  },
  lnK(T, out) {
    out[0] = Math.LN10 * (3066 / T - 10.592);
    out[1] = Math.LN10 * (-2073 / T + 2.029);
  },
  effectiveness: null,
  range: { fromK: 453, toK: 553, fromPa: 15e5, toPa: 51e5 },
  source: 'K. M. Vanden Bussche & G. F. Froment, J. Catal. 161 (1996) 1-10',
  note: 'Intrinsic rates of crushed catalyst (0.5 mm); whole pellets are slower (common practice).',
};
