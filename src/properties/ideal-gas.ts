import type { Component, Nasa9Interval } from '../model/component.ts';
import type { Reaction } from '../model/reaction.ts';
import { R_NASA } from './constants.ts';

/** Formation enthalpies the components are referred to: Active Thermochemical Tables, or NASA's own. */
export type EnthalpyBasis = 'atct' | 'nasa';

/** Ideal-gas properties of a fixed list of components; nothing allocates. */
export interface IdealGas {
  readonly size: number;
  /** H [J/mol] with the enthalpy of formation: elements at 298.15 K are 0 */
  enthalpies(T: number, out: Float64Array): void;
  /** S at 1 bar [J/(mol K)] */
  entropies(T: number, out: Float64Array): void;
  /** Cp [J/(mol K)] */
  heatCapacities(T: number, out: Float64Array): void;
}

/** Numbers per interval and property: the coefficients and the constant of integration. */
const STRIDE = 8;
/** Marks a component whose range of validity ends above or below the temperature asked for. */
const BELOW = -1;
const ABOVE = -2;

/**
 * Ideal gas by NASA nine-coefficient polynomials (solids: the solid itself):
 *   Cp/R = a1/T² + a2/T + a3 + a4 T + a5 T² + a6 T³ + a7 T⁴
 *   H/R  = −a1/T + a2 ln T + a3 T + a4 T²/2 + a5 T³/3 + a6 T⁴/4 + a7 T⁵/5 + b1
 *   S/R  = −a1/(2T²) − a2/T + a3 ln T + a4 T + a5 T²/2 + a6 T³/3 + a7 T⁴/4 + b2
 *
 * Outside its range a component goes on with the heat capacity of the range's end, so that H and S stay
 * smooth and rising. At the seams the printed coefficients leave steps of up to 0.001 J/mol; they are closed
 * by moving b1 and b2 of the outer interval, because a solver that looks for a temperature cannot land
 * inside a step. A component without coefficients gives NaN.
 *
 * @source B. J. McBride, M. J. Zehe & S. Gordon, NASA/TP-2002-211556
 */
export function createIdealGas(components: readonly Component[], basis: EnthalpyBasis): IdealGas {
  const size = components.length;
  const intervals = components.reduce((sum, c) => sum + c.idealGas.length, 0);
  const first = new Int32Array(size + 1);
  const upTo = new Float64Array(intervals);
  const h = new Float64Array(STRIDE * intervals);
  const s = new Float64Array(STRIDE * intervals);
  const cp = new Float64Array(STRIDE * intervals);
  const low = new Float64Array(4 * size).fill(Number.NaN);
  const high = new Float64Array(4 * size).fill(Number.NaN);
  const segment = new Int32Array(size);
  const located = { T: Number.NaN };

  components.forEach((c, i) => {
    first[i + 1] = first[i] + c.idealGas.length;
    c.idealGas.forEach((interval, k) => {
      const at = first[i] + k;
      upTo[at] = interval.toK;
      setCoefficients(interval, basis, h, s, cp, STRIDE * at);
    });
    closeSeams(c.idealGas, first[i]);
    setEnd(low, i, c.idealGas[0]?.fromK, first[i]);
    setEnd(high, i, c.idealGas.at(-1)?.toK, first[i + 1] - 1);
  });

  /** Interval of every component at T, kept for the next call at the same temperature. */
  function locate(T: number): void {
    if (T === located.T) return;
    located.T = T;
    for (let i = 0; i < size; i++) {
      const last = first[i + 1] - 1;
      if (!(T >= low[4 * i])) segment[i] = BELOW;
      else if (T > high[4 * i]) segment[i] = ABOVE;
      else {
        let at = first[i];
        while (at < last && T > upTo[at]) at++;
        segment[i] = at;
      }
    }
  }

  function closeSeams(own: readonly Nasa9Interval[], start: number): void {
    const anchor = Math.max(
      own.findIndex((interval) => interval.fromK <= 298.15 && 298.15 <= interval.toK),
      0,
    );
    for (let k = anchor + 1; k < own.length; k++) join(own[k].fromK, start + k - 1, start + k);
    for (let k = anchor - 1; k >= 0; k--) join(own[k].toK, start + k + 1, start + k);
  }

  function join(T: number, inner: number, outer: number): void {
    const lnT = Math.log(T);
    h[STRIDE * outer + 7] += enthalpyAt(h, STRIDE * inner, T, lnT) - enthalpyAt(h, STRIDE * outer, T, lnT);
    s[STRIDE * outer + 7] += entropyAt(s, STRIDE * inner, T, lnT) - entropyAt(s, STRIDE * outer, T, lnT);
  }

  function setEnd(end: Float64Array, i: number, T: number | undefined, at: number): void {
    if (T === undefined) return;
    end[4 * i] = T;
    end[4 * i + 1] = enthalpyAt(h, STRIDE * at, T, Math.log(T));
    end[4 * i + 2] = entropyAt(s, STRIDE * at, T, Math.log(T));
    end[4 * i + 3] = heatCapacityAt(cp, STRIDE * at, T);
  }

  return {
    size,
    enthalpies(T, out) {
      locate(T);
      const lnT = Math.log(T);
      for (let i = 0; i < size; i++) {
        const at = segment[i];
        if (at >= 0) out[i] = enthalpyAt(h, STRIDE * at, T, lnT);
        else {
          const end = at === BELOW ? low : high;
          out[i] = end[4 * i + 1] + end[4 * i + 3] * (T - end[4 * i]);
        }
      }
    },
    entropies(T, out) {
      locate(T);
      const lnT = Math.log(T);
      for (let i = 0; i < size; i++) {
        const at = segment[i];
        if (at >= 0) out[i] = entropyAt(s, STRIDE * at, T, lnT);
        else {
          const end = at === BELOW ? low : high;
          out[i] = end[4 * i + 2] + end[4 * i + 3] * Math.log(T / end[4 * i]);
        }
      }
    },
    heatCapacities(T, out) {
      locate(T);
      for (let i = 0; i < size; i++) {
        const at = segment[i];
        if (at >= 0) out[i] = heatCapacityAt(cp, STRIDE * at, T);
        else out[i] = (at === BELOW ? low : high)[4 * i + 3];
      }
    },
  };
}

/**
 * The formation enthalpies that suit a set of reactions: those of the Active Thermochemical Tables, unless a
 * reaction joins a component they have no entry for with one whose value they moved. Mixing the two in one
 * reaction would put the shift into its heat.
 *
 * @param reactions  coefficients in the order of `components`
 */
export function enthalpyBasisFor(
  components: readonly Component[],
  reactions: readonly Reaction[],
): EnthalpyBasis {
  const mixes = (reaction: Reaction) => {
    const taking = components.filter((_, i) => reaction.coefficients[i] !== 0);
    return taking.some(lacksAtct) && taking.some(movedByAtct);
  };
  return reactions.some(mixes) ? 'nasa' : 'atct';
}

function lacksAtct(c: Component): boolean {
  return c.idealGas.some((interval) => interval.b1Atct === null);
}

function movedByAtct(c: Component): boolean {
  return c.idealGas.some((interval) => interval.b1Atct !== null && interval.b1Atct !== interval.b1);
}

/** Coefficients times R, with the divisors of the integration worked in: Horner needs no more divisions. */
function setCoefficients(
  { a, b1, b1Atct, b2 }: Nasa9Interval,
  basis: EnthalpyBasis,
  h: Float64Array,
  s: Float64Array,
  cp: Float64Array,
  at: number,
): void {
  for (let k = 0; k < a.length; k++) {
    // Cp/R has T to the power k − 2; its integrals over T and ln T have logarithms where the power would be 0.
    cp[at + k] = a[k] * R_NASA;
    h[at + k] = (k === 1 ? a[k] : a[k] / (k - 1)) * R_NASA;
    s[at + k] = (k === 2 ? a[k] : a[k] / (k - 2)) * R_NASA;
  }
  h[at + 7] = (basis === 'atct' && b1Atct !== null ? b1Atct : b1) * R_NASA;
  s[at + 7] = b2 * R_NASA;
}

function enthalpyAt(h: Float64Array, k: number, T: number, lnT: number): number {
  const power = h[k + 2] + T * (h[k + 3] + T * (h[k + 4] + T * (h[k + 5] + T * h[k + 6])));
  return h[k] / T + h[k + 1] * lnT + T * power + h[k + 7];
}

function entropyAt(s: Float64Array, k: number, T: number, lnT: number): number {
  const power = s[k + 3] + T * (s[k + 4] + T * (s[k + 5] + T * s[k + 6]));
  return (s[k] / T + s[k + 1]) / T + s[k + 2] * lnT + T * power + s[k + 7];
}

function heatCapacityAt(cp: Float64Array, k: number, T: number): number {
  const power = cp[k + 3] + T * (cp[k + 4] + T * (cp[k + 5] + T * cp[k + 6]));
  return (cp[k] / T + cp[k + 1]) / T + cp[k + 2] + T * power;
}
