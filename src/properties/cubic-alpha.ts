/**
 * The temperature function of the attraction, a(T) = a(Tc) α(T), as its root: value √α [-], slope d√α/dT [1/K] and
 * curvature d²√α/dT² [1/K²]. Every form is positive and never rises with temperature, however far above critical.
 */
export interface AlphaRoot {
  value(T: number): number;
  slope(T: number): number;
  curvature(T: number): number;
  /** All three, written into place `at`: numbers handed back one by one would each be allocated. */
  write(T: number, at: number, values: Float64Array, slopes: Float64Array, curvatures: Float64Array): void;
}

/** √α below which the square-root form is continued by an exponential: N2 near 900 K, CH4 near 1500 K */
const CONTINUED_BELOW = 0.1;

/** Where `write` leaves what is asked for by itself. */
const oneValue = new Float64Array(1);
const oneSlope = new Float64Array(1);
const oneCurvature = new Float64Array(1);

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
  function write(
    T: number,
    at: number,
    v: Float64Array,
    slopes: Float64Array,
    curvatures: Float64Array,
  ): void {
    const rootTr = Math.sqrt(T / criticalK);
    const rootSlope = rootTr / (2 * T);
    if (rootTr <= jointRootTr) {
      v[at] = 1 + slope * (1 - rootTr);
      slopes[at] = -slope * rootSlope;
      curvatures[at] = -slopes[at] / (2 * T);
      return;
    }
    v[at] = CONTINUED_BELOW * Math.exp(-rate * (rootTr - jointRootTr));
    slopes[at] = -rate * v[at] * rootSlope;
    curvatures[at] = -slopes[at] * (rate * rootSlope + 1 / (2 * T));
  }
  function written(T: number, which: Float64Array): number {
    write(T, 0, oneValue, oneSlope, oneCurvature);
    return which[0];
  }
  return {
    value: (T) => written(T, oneValue),
    slope: (T) => written(T, oneSlope),
    curvature: (T) => written(T, oneCurvature),
    write,
  };
}

/**
 * Hydrogen in the Soave-Redlich-Kwong equation: α = 1.202 exp(−0.30288 Tr).
 *
 * @source M. S. Graboski, T. E. Daubert, Ind. Eng. Chem. Process Des. Dev. 18 (1979) 300
 */
export function hydrogenAlpha(criticalK: number): AlphaRoot {
  const rate = 0.30288 / (2 * criticalK);
  const atZero = Math.sqrt(1.202);
  const value = (T: number): number => atZero * Math.exp(-rate * T);
  return {
    value,
    slope: (T) => -rate * value(T),
    curvature: (T) => rate * rate * value(T),
    write(T, at, values, slopes, curvatures) {
      values[at] = value(T);
      slopes[at] = -rate * values[at];
      curvatures[at] = -rate * slopes[at];
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
