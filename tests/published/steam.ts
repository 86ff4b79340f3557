/**
 * Check values of water and steam.
 *
 * Official: IAPWS R7-97(2012), Revised Release on the IAPWS Industrial Formulation 1997, tables 5 (region 1), 15
 * (region 2), 35 and 36 (saturation line); nine digits.
 */
export const saturationPressureMPa: readonly (readonly [kelvin: number, MPa: number])[] = [
  [300, 0.353658941e-2],
  [500, 2.63889776],
  [600, 12.3443146],
];

export const saturationTemperatureK: readonly (readonly [MPa: number, kelvin: number])[] = [
  [0.1, 372.755919],
  [1, 453.035632],
  [10, 584.149488],
];

/** h in kJ/kg */
export const liquidEnthalpy: readonly (readonly [kelvin: number, MPa: number, h: number])[] = [
  [300, 3, 115.331273],
  [300, 80, 184.142828],
  [500, 3, 975.542239],
];

export const steamEnthalpy: readonly (readonly [kelvin: number, MPa: number, h: number])[] = [
  [300, 0.0035, 2549.91145],
  [700, 0.0035, 3335.68375],
  [700, 30, 2631.49474],
];

/** cp in kJ/(kg K) at the same points, the same tables; from memory. */
export const liquidHeatCapacity: readonly (readonly [kelvin: number, MPa: number, cp: number])[] = [
  [300, 3, 4.17301218],
  [300, 80, 4.01008987],
  [500, 3, 4.65580682],
];

export const steamHeatCapacity: readonly (readonly [kelvin: number, MPa: number, cp: number])[] = [
  [300, 0.0035, 1.91300162],
  [700, 0.0035, 2.08141274],
  [700, 30, 10.3505092],
];

/**
 * Saturated water and steam, two decimals: computed from the formulation by others, and in agreement with the
 * printed tables (from memory). Columns: bar, degC, kJ/kg of the liquid, kJ/kg of the vapour.
 */
export const saturationTable: readonly (readonly [
  bar: number,
  celsius: number,
  liquid: number,
  vapour: number,
])[] = [
  [1, 99.606, 417.44, 2674.95],
  [2, 120.212, 504.68, 2706.24],
  [3, 133.525, 561.46, 2724.89],
  [5, 151.836, 640.19, 2748.11],
  [6, 158.832, 670.5, 2756.14],
  [8, 170.414, 721.02, 2768.3],
  [10, 179.886, 762.68, 2777.12],
  [15, 198.295, 844.72, 2791.01],
  [20, 212.385, 908.62, 2798.38],
  [25, 223.956, 961.98, 2802.04],
  [29, 231.986, 999.54, 2803.18],
  [30, 233.858, 1008.37, 2803.26],
  [40, 250.358, 1087.43, 2800.9],
  [50, 263.943, 1154.5, 2794.23],
  [60, 275.586, 1213.73, 2784.56],
  [80, 295.009, 1317.08, 2758.61],
  [100, 310.999, 1407.87, 2725.47],
  [110, 318.081, 1450.28, 2706.39],
  [120, 324.678, 1491.33, 2685.58],
  [140, 336.669, 1570.88, 2638.09],
  [160, 347.357, 1649.67, 2580.8],
];
