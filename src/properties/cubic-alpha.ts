/**
 * The temperature function of the attraction, a(T) = a(Tc) α(T), as its root: value √α [-] and slope
 * d√α/dT [1/K]. Every form is positive and never rises with temperature, however far above critical.
 */
export interface AlphaRoot {
  value(T: number): number;
  slope(T: number): number;
  /** Both, written into place `at`: numbers handed back one by one would each be allocated. */
  write(T: number, at: number, values: Float64Array, slopes: Float64Array): void;
}

/** √α below which the square-root form is continued by an exponential: N2 near 900 K, CH4 near 1500 K */
const CONTINUED_BELOW = 0.1;

/**
 * √α = 1 + m (1 − √Tr). The straight line in √Tr falls through zero far above critical (N2 near 1030 K) and
 * α would rise again behind it; below √α = 0.1 it is continued as 0.1 exp(−(m/0.1)(√Tr − √Tr')), which has
 * the same value and slope at the joint. A negative m (an acentric factor of a quantum gas) is taken as 0.
 *
 * @param criticalK  critical temperature [K]
 * @param m  slope of the form [-], see soaveSlope and pengRobinsonSlope
 * @source G. Soave, Chem. Eng. Sci. 27 (1972) 1197; the continuation is ours
 */
export function squareRootAlpha(criticalK: number, m: number): AlphaRoot {
  const slope = Math.max(m, 0);
  const jointRootTr = slope === 0 ? Number.POSITIVE_INFINITY : 1 + (1 - CONTINUED_BELOW) / slope;
  const rate = slope / CONTINUED_BELOW;
  function value(T: number): number {
    const rootTr = Math.sqrt(T / criticalK);
    if (rootTr <= jointRootTr) return 1 + slope * (1 - rootTr);
    return CONTINUED_BELOW * Math.exp(-rate * (rootTr - jointRootTr));
  }
  function slopeAt(T: number): number {
    const rootTr = Math.sqrt(T / criticalK);
    const perRootTr = rootTr <= jointRootTr ? -slope : -slope * Math.exp(-rate * (rootTr - jointRootTr));
    return perRootTr / (2 * Math.sqrt(T * criticalK));
  }
  return {
    value,
    slope: slopeAt,
    write(T, at, values, slopes) {
      values[at] = value(T);
      slopes[at] = slopeAt(T);
    },
  };
}

/**
 * Hydrogen in the Soave-Redlich-Kwong equation: α = 1.202 exp(−0.30288 Tr).
 *
 * @source M. S. Graboski, T. E. Daubert, Ind. Eng. Chem. Process Des. Dev. 18 (1979) 300
 */
export function hydrogenAlpha(criticalK: number): AlphaRoot {
  const rate = 0.30288 / (2 * criticalK);
  const value = (T: number): number => Math.sqrt(1.202) * Math.exp(-rate * T);
  return {
    value,
    slope: (T) => -rate * value(T),
    write(T, at, values, slopes) {
      values[at] = value(T);
      slopes[at] = -rate * values[at];
    },
  };
}

/** m = 0.480 + 1.574 ω − 0.176 ω². @source G. Soave, Chem. Eng. Sci. 27 (1972) 1197 */
export function soaveSlope(acentricFactor: number): number {
  return 0.48 + 1.574 * acentricFactor - 0.176 * acentricFactor * acentricFactor;
}

/** m = 0.37464 + 1.54226 ω − 0.26992 ω². @source D.-Y. Peng, D. B. Robinson, Ind. Eng. Chem. Fundam. 15 (1976) 59 */
export function pengRobinsonSlope(acentricFactor: number): number {
  return 0.37464 + 1.54226 * acentricFactor - 0.26992 * acentricFactor * acentricFactor;
}
