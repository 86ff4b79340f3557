import type { AntoineSet } from '../../model/component.ts';
import {
  BUECKER_WAGNER_2006,
  DE_REUCK_CRAVEN_1993,
  GAO_2016,
  GAO_2020,
  LANDOLT_BOERNSTEIN,
  LEACHMAN_2009,
  LEMMON_2009,
  LEMMON_SPAN_2006,
  ORTIZVEGA_2019,
  PERRY_2_8,
  SCHMIDT_WAGNER_1985,
  SCHROEDER_2014,
  SETZMANN_WAGNER_1991,
  SMUKALA_2000,
  SPAN_2000,
  SPAN_WAGNER_1996,
  TEGELER_1999,
  VDI_2010,
  WAGNER_PRUSS_2002,
  WU_2011,
} from './sources.ts';

/** Antoine sets of one liquid, adjoining from the triple point to the critical point: log10(P/bar) = A − B/(T + C). */
export interface AntoineRow {
  readonly source: string;
  readonly note: string;
  /** each set with its largest deviation from the source [%]; null where it was not compared */
  readonly sets: readonly (AntoineSet & { readonly maxDeviationPercent: number | null })[];
}

export const antoine: Readonly<Record<string, AntoineRow>> = {
  H2: {
    source: LEACHMAN_2009,
    note: '',
    sets: [
      { A: 2.880711, B: 64.96684, C: 2.2283, fromK: 13.97, toK: 20.3689, maxDeviationPercent: 0.17 },
      { A: 3.314728, B: 85.86389, C: 5.5796, fromK: 20.3689, toK: 26.8, maxDeviationPercent: 0.08 },
      { A: 4.152673, B: 149.63981, C: 16.08, fromK: 26.8, toK: 33.14, maxDeviationPercent: 0.16 },
    ],
  },
  N2: {
    source: SPAN_2000,
    note: '',
    sets: [
      { A: 3.647455, B: 259.16353, C: -6.1902, fromK: 63.17, toK: 77.355, maxDeviationPercent: 0.01 },
      { A: 3.80854, B: 283.64498, C: -2.767, fromK: 77.355, toK: 101.8, maxDeviationPercent: 0.1 },
      { A: 4.586577, B: 462.81623, C: 25.2711, fromK: 101.8, toK: 126.19, maxDeviationPercent: 0.24 },
    ],
  },
  NH3: {
    source: GAO_2020,
    note: '',
    sets: [
      { A: 4.65169, B: 988.20802, C: -27.1323, fromK: 195.51, toK: 239.8343, maxDeviationPercent: 0.04 },
      { A: 4.627083, B: 981.20251, C: -27.5156, fromK: 239.8343, toK: 322.7, maxDeviationPercent: 0.09 },
      { A: 5.389864, B: 1500.58939, C: 44.4783, fromK: 322.7, toK: 405.55, maxDeviationPercent: 0.35 },
    ],
  },
  Ar: {
    source: TEGELER_1999,
    note: '',
    sets: [
      { A: 3.737473, B: 303.63898, C: -5.9359, fromK: 83.82, toK: 87.3021, maxDeviationPercent: 0 },
      { A: 3.885234, B: 329.66832, C: -2.3255, fromK: 87.3021, toK: 119, maxDeviationPercent: 0.13 },
      { A: 4.633494, B: 532.0132, C: 29.8649, fromK: 119, toK: 150.68, maxDeviationPercent: 0.27 },
    ],
  },
  He: {
    source: ORTIZVEGA_2019,
    note: '',
    sets: [
      { A: 1.878886, B: 9.60586, C: 0.8474, fromK: 2.19, toK: 3.21, maxDeviationPercent: 0.21 },
      { A: 2.437373, B: 14.59215, C: 1.7771, fromK: 3.21, toK: 4.2238, maxDeviationPercent: 0.07 },
      { A: 2.774129, B: 18.70923, C: 2.5343, fromK: 4.2238, toK: 4.71, maxDeviationPercent: 0.07 },
      { A: 2.951101, B: 20.79624, C: 2.826, fromK: 4.71, toK: 5.19, maxDeviationPercent: 0.23 },
    ],
  },
  CH4: {
    source: SETZMANN_WAGNER_1991,
    note: '',
    sets: [
      { A: 3.751357, B: 392.36413, C: -6.915, fromK: 90.71, toK: 111.6672, maxDeviationPercent: 0 },
      { A: 3.909391, B: 427.90561, C: -2.0511, fromK: 111.6672, toK: 151.1, maxDeviationPercent: 0.12 },
      { A: 4.683624, B: 696.20468, C: 39.8953, fromK: 151.1, toK: 190.56, maxDeviationPercent: 0.27 },
    ],
  },
  CO: {
    source: LEMMON_SPAN_2006,
    note: '',
    sets: [
      { A: 3.660706, B: 270.36344, C: -7.6671, fromK: 68.17, toK: 81.6382, maxDeviationPercent: 0 },
      { A: 3.814056, B: 294.58671, C: -4.2851, fromK: 81.6382, toK: 107.2, maxDeviationPercent: 0.1 },
      { A: 4.61561, B: 487.6653, C: 25.897, fromK: 107.2, toK: 132.85, maxDeviationPercent: 0.27 },
    ],
  },
  CO2: {
    source: SPAN_WAGNER_1996,
    note: '',
    sets: [
      { A: 4.408594, B: 724.75571, C: -20.4095, fromK: 216.61, toK: 260.4, maxDeviationPercent: 0.05 },
      { A: 5.366308, B: 1269.72827, C: 58.8158, fromK: 260.4, toK: 304.12, maxDeviationPercent: 0.19 },
    ],
  },
  H2O: {
    source: WAGNER_PRUSS_2002,
    note: '',
    sets: [
      { A: 5.206259, B: 1738.13759, C: -38.9019, fromK: 273.18, toK: 373.1243, maxDeviationPercent: 0.19 },
      { A: 5.083076, B: 1665.72778, C: -45.0546, fromK: 373.1243, toK: 510.1, maxDeviationPercent: 0.08 },
      { A: 5.945475, B: 2602.99361, C: 75.5979, fromK: 510.1, toK: 647.09, maxDeviationPercent: 0.46 },
    ],
  },
  CH3OH: {
    source: DE_REUCK_CRAVEN_1993,
    note: '',
    sets: [
      { A: 5.741606, B: 1837.76306, C: -15.4044, fromK: 175.62, toK: 256.6, maxDeviationPercent: 0.34 },
      { A: 5.291358, B: 1630.2626, C: -29.2, fromK: 256.6, toK: 337.6323, maxDeviationPercent: 0.11 },
      { A: 5.162498, B: 1556.69681, C: -35.7586, fromK: 337.6323, toK: 425.1, maxDeviationPercent: 0.03 },
      { A: 5.824916, B: 2145.371, C: 35.2109, fromK: 425.1, toK: 512.5, maxDeviationPercent: 0.46 },
    ],
  },
  C2H5OH: {
    source: SCHROEDER_2014,
    note: '',
    sets: [
      { A: 6.438506, B: 2139.29405, C: -12.2933, fromK: 159.12, toK: 207.2, maxDeviationPercent: 0.16 },
      { A: 5.990996, B: 1969.38914, C: -20.1465, fromK: 207.2, toK: 255.3, maxDeviationPercent: 0.08 },
      { A: 5.440687, B: 1713.25326, C: -36.3427, fromK: 255.3, toK: 351.5704, maxDeviationPercent: 0.3 },
      { A: 4.976923, B: 1437.5854, C: -62.388, fromK: 351.5704, toK: 433.1, maxDeviationPercent: 0.09 },
      { A: 5.282528, B: 1704.58681, C: -25.6461, fromK: 433.1, toK: 514.7, maxDeviationPercent: 0.37 },
    ],
  },
  DME: {
    source: WU_2011,
    note: '',
    sets: [
      { A: 4.527192, B: 1025.09624, C: -20.0261, fromK: 131.67, toK: 190, maxDeviationPercent: 0.42 },
      { A: 4.133178, B: 899.67026, C: -30.396, fromK: 190, toK: 248.3678, maxDeviationPercent: 0.06 },
      { A: 4.163345, B: 917.03322, C: -27.8014, fromK: 248.3678, toK: 324.4, maxDeviationPercent: 0.09 },
      { A: 5.165635, B: 1631.02101, C: 73.9811, fromK: 324.4, toK: 400.37, maxDeviationPercent: 0.36 },
    ],
  },
  MF: {
    source: PERRY_2_8,
    note: '',
    sets: [
      { A: 4.714615, B: 1295.52858, C: -28.2074, fromK: 174.15, toK: 239.5, maxDeviationPercent: 0.31 },
      { A: 4.312153, B: 1134.89557, C: -41.4027, fromK: 239.5, toK: 304.9375, maxDeviationPercent: 0.06 },
      { A: 4.291016, B: 1128.36128, C: -41.6277, fromK: 304.9375, toK: 396.1, maxDeviationPercent: 0.07 },
      { A: 4.856655, B: 1571.93399, C: 23.2107, fromK: 396.1, toK: 487.2, maxDeviationPercent: 0.14 },
    ],
  },
  C2H6: {
    source: BUECKER_WAGNER_2006,
    note: '',
    sets: [
      { A: 4.274286, B: 738.78497, C: -10.2098, fromK: 90.38, toK: 137.5, maxDeviationPercent: 0.44 },
      { A: 3.935501, B: 658.39833, C: -17.028, fromK: 137.5, toK: 184.5686, maxDeviationPercent: 0.04 },
      { A: 4.037771, B: 696.17321, C: -11.9089, fromK: 184.5686, toK: 244.9, maxDeviationPercent: 0.1 },
      { A: 4.846998, B: 1136.24007, C: 54.3303, fromK: 244.9, toK: 305.32, maxDeviationPercent: 0.29 },
    ],
  },
  C2H4: {
    source: SMUKALA_2000,
    note: '',
    sets: [
      { A: 3.977946, B: 613.17301, C: -15.0137, fromK: 104, toK: 169.3786, maxDeviationPercent: 0.45 },
      { A: 4.004702, B: 627.54784, C: -12.4519, fromK: 169.3786, toK: 225.9, maxDeviationPercent: 0.11 },
      { A: 4.791857, B: 1018.91123, C: 47.4715, fromK: 225.9, toK: 282.35, maxDeviationPercent: 0.29 },
    ],
  },
  C3H8: {
    source: LEMMON_2009,
    note: '',
    sets: [
      { A: 4.926778, B: 1053.64537, C: -8.5682, fromK: 85.54, toK: 121.9, maxDeviationPercent: 0.36 },
      { A: 4.376246, B: 934.00526, C: -15.1134, fromK: 121.9, toK: 158.3, maxDeviationPercent: 0.14 },
      { A: 3.988183, B: 825.61322, C: -23.7242, fromK: 158.3, toK: 231.0362, maxDeviationPercent: 0.17 },
      { A: 4.049532, B: 856.4543, C: -19.2426, fromK: 231.0362, toK: 300.5, maxDeviationPercent: 0.09 },
      { A: 4.909131, B: 1424.3242, C: 64.2727, fromK: 300.5, toK: 369.89, maxDeviationPercent: 0.29 },
    ],
  },
  NC4H10: {
    source: BUECKER_WAGNER_2006,
    note: '',
    sets: [
      { A: 4.582015, B: 1148.65068, C: -17.1905, fromK: 134.91, toK: 169.4, maxDeviationPercent: 0.11 },
      { A: 4.224628, B: 1043.28202, C: -24.2805, fromK: 169.4, toK: 203.8, maxDeviationPercent: 0.05 },
      { A: 3.987286, B: 959.60237, C: -31.6488, fromK: 203.8, toK: 272.6599, maxDeviationPercent: 0.06 },
      { A: 4.075038, B: 1006.56472, C: -25.3054, fromK: 272.6599, toK: 348.9, maxDeviationPercent: 0.08 },
      { A: 5.084015, B: 1789.86632, C: 85.581, fromK: 348.9, toK: 425.12, maxDeviationPercent: 0.33 },
    ],
  },
  O2: {
    source: SCHMIDT_WAGNER_1985,
    note: '',
    sets: [
      { A: 3.842539, B: 323.13414, C: -5.9686, fromK: 54.38, toK: 90.1878, maxDeviationPercent: 0.29 },
      { A: 3.941976, B: 342.66247, C: -3.135, fromK: 90.1878, toK: 122.4, maxDeviationPercent: 0.12 },
      { A: 4.692982, B: 550.2431, C: 29.4279, fromK: 122.4, toK: 154.58, maxDeviationPercent: 0.27 },
    ],
  },
  SO2: {
    source: GAO_2016,
    note: '',
    sets: [
      { A: 4.451961, B: 1016.07585, C: -34.6125, fromK: 197.71, toK: 263.137, maxDeviationPercent: 0.11 },
      { A: 4.413503, B: 1003.35555, C: -35.5045, fromK: 263.137, toK: 346.9, maxDeviationPercent: 0.08 },
      { A: 5.233853, B: 1601.13488, C: 49.1778, fromK: 346.9, toK: 430.64, maxDeviationPercent: 0.37 },
    ],
  },
  SO3: {
    source: PERRY_2_8,
    note: '',
    sets: [
      { A: 4.377226, B: 895.6155, C: -112.8238, fromK: 289.95, toK: 317.6994, maxDeviationPercent: 0.04 },
      { A: 3.758571, B: 654.46468, C: -143.3082, fromK: 317.6994, toK: 404.3, maxDeviationPercent: 0.29 },
      { A: 4.185584, B: 910.23011, C: -94.1302, fromK: 404.3, toK: 447.6, maxDeviationPercent: 0.08 },
      { A: 6.929442, B: 3809.24557, C: 268.56, fromK: 447.6, toK: 490.85, maxDeviationPercent: 0.49 },
    ],
  },
  NO: {
    source: PERRY_2_8,
    note: '',
    sets: [
      { A: 4.869353, B: 479.91553, C: -22.6816, fromK: 109.5, toK: 121.3558, maxDeviationPercent: 0.01 },
      { A: 4.69759, B: 446.62328, C: -26.165, fromK: 121.3558, toK: 150.8, maxDeviationPercent: 0.01 },
      { A: 5.451395, B: 661.66216, C: 1.7532, fromK: 150.8, toK: 180.15, maxDeviationPercent: 0.23 },
    ],
  },
  N2O4: {
    source: VDI_2010,
    note: 'pressure over the NO2/N2O4 equilibrium liquid',
    sets: [
      { A: 6.002249, B: 1781.33392, C: 2.6578, fromK: 261.85, toK: 294.4029, maxDeviationPercent: 0.02 },
      { A: 6.902699, B: 2368.01723, C: 48.9382, fromK: 294.4029, toK: 362.7, maxDeviationPercent: 0.17 },
      { A: 8.341332, B: 3681.24432, C: 149.2025, fromK: 362.7, toK: 396.9, maxDeviationPercent: 0.02 },
      { A: 9.53053, B: 5035.95505, C: 238.14, fromK: 396.9, toK: 431, maxDeviationPercent: 0.41 },
    ],
  },
  N2O: {
    source: LEMMON_SPAN_2006,
    note: '',
    sets: [
      { A: 4.148588, B: 660.99649, C: -25.1336, fromK: 182.34, toK: 184.6839, maxDeviationPercent: 0 },
      { A: 4.226455, B: 688.06154, C: -21.6647, fromK: 184.6839, toK: 247.1, maxDeviationPercent: 0.1 },
      { A: 5.04359, B: 1121.31274, C: 42.6987, fromK: 247.1, toK: 309.52, maxDeviationPercent: 0.38 },
    ],
  },
  HNO3: {
    source: LANDOLT_BOERNSTEIN,
    note: 'pure acid; decomposes slowly; only one source, not cross-checked',
    sets: [{ A: 4.6368, B: 1406, C: -52.15, fromK: 274, toK: 376, maxDeviationPercent: null }],
  },
  H2S: {
    source: LEMMON_SPAN_2006,
    note: '',
    sets: [
      { A: 4.168619, B: 786.78302, C: -23.8562, fromK: 187.71, toK: 212.8549, maxDeviationPercent: 0 },
      { A: 4.244092, B: 818.29744, C: -19.7862, fromK: 212.8549, toK: 293, maxDeviationPercent: 0.11 },
      { A: 5.045852, B: 1333.3801, C: 58.1815, fromK: 293, toK: 373.1, maxDeviationPercent: 0.4 },
    ],
  },
  HCHO: {
    source: PERRY_2_8,
    note: '',
    sets: [
      { A: 4.325087, B: 975.3654, C: -28.2034, fromK: 181.15, toK: 254.0153, maxDeviationPercent: 0.04 },
      { A: 4.579926, B: 1099.83032, C: -13.5737, fromK: 254.0153, toK: 331, maxDeviationPercent: 0.16 },
      { A: 5.477665, B: 1745.63404, C: 69.1384, fromK: 331, toK: 408, maxDeviationPercent: 0.15 },
    ],
  },
};
