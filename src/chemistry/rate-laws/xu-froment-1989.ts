import { BAR, type RateLaw, TRACE } from './rate-law.ts';

const R = 8.314;
const CH4 = 0;
const H2O = 1;
const CO = 2;
const H2 = 4;
/** [kmol/(kg h)] to [mol/(kg s)] */
const PER_SECOND = 1 / 3.6;

/**
 * Steam reforming, shift and, backwards, methanation on Ni/MgAl2O4:
 *   CH4 + H2O = CO + 3 H2      r1 = k1/pH2^2.5 [pCH4 pH2O − pH2³ pCO/K1]/D²
 *   CO + H2O = CO2 + H2        r2 = k2/pH2 [pCO pH2O − pH2 pCO2/K2]/D²
 *   CH4 + 2 H2O = CO2 + 4 H2   r3 = k3/pH2^3.5 [pCH4 pH2O² − pH2⁴ pCO2/K3]/D²
 *   D = 1 + KCO pCO + KH2 pH2 + KCH4 pCH4 + KH2O pH2O/pH2
 * in kmol per kg of catalyst and hour, p in bar. K1 = exp(30.114 − 26830/T) bar², K2 = exp(4400/T − 4.036),
 * K3 = K1 K2. Steam adsorbs less on cooling (+88680), the other three more.
 *
 * @source J. Xu, G. F. Froment, AIChE J. 35 (1989) 88-96
 */
export const xuFroment1989: RateLaw = {
  name: 'xu-froment-1989',
  summary: 'reforming, shift and methanation on nickel',
  species: ['CH4', 'H2O', 'CO', 'CO2', 'H2'],
  reactions: [
    { equation: 'CH4 + H2O <=> CO + 3 H2', stoichiometry: { CH4: -1, H2O: -1, CO: 1, H2: 3 } },
    { equation: 'CO + H2O <=> CO2 + H2', stoichiometry: { CO: -1, H2O: -1, CO2: 1, H2: 1 } },
    { equation: 'CH4 + 2 H2O <=> CO2 + 4 H2', stoichiometry: { CH4: -1, H2O: -2, CO2: 1, H2: 4 } },
  ],
  per: 'mass',
  pressureUnitPa: BAR,
  fugacity: 'one',
  floors: [0, 0, 0, 0, TRACE],
  forward(T, p, out) {
    const RT = R * T;
    const D =
      1 +
      8.23e-5 * Math.exp(70_650 / RT) * p[CO]! +
      6.12e-9 * Math.exp(82_900 / RT) * p[H2]! +
      6.65e-4 * Math.exp(38_280 / RT) * p[CH4]! +
      (1.77e5 * Math.exp(-88_680 / RT) * p[H2O]!) / p[H2]!;
    const perSites = PER_SECOND / (D * D);
    const h = p[H2]!;
    const steam = p[H2O]!;
    const perRoot = 1 / (h * h * Math.sqrt(h));
    out[0] = 4.225e15 * Math.exp(-240_100 / RT) * perRoot * p[CH4]! * steam * perSites;
    out[1] = ((1.955e6 * Math.exp(-67_130 / RT)) / h) * p[CO]! * steam * perSites;
    out[2] = ((1.02e15 * Math.exp(-243_900 / RT) * perRoot) / h) * p[CH4]! * steam * steam * perSites;
  },
  lnK(T, out) {
    out[0] = 30.114 - 26_830 / T;
    out[1] = 4400 / T - 4.036;
    out[2] = out[0] + out[1];
  },
  effectiveness: null,
  range: { fromK: 573, toK: 848, fromPa: 3e5, toPa: 15e5 },
  source: 'J. Xu & G. F. Froment, AIChE J. 35 (1989) 88-96',
  note: 'Intrinsic rates at a reference activity (fresh catalyst 2.246 times as much); methanation was measured at 573-673 K; effectiveness of whole reforming pellets 0.01-0.05 (common practice). Pressure range from memory.',
};
