import type { Component } from '../model/component.ts';
import { R } from './constants.ts';
import {
  type ActivityPair,
  activityPairs,
  type NrtlPair,
  type RedlichKisterPair,
} from './data/activity-pairs.ts';

/** Activity coefficients of the condensables of a list of components; mole fractions are those among them. */
export interface ActivityModel {
  /** the pairs that have parameters; every other pair is ideal */
  readonly pairs: readonly ActivityPair[];
  /** ln γ in a liquid of composition x (any positive scale), written for the condensables only */
  lnGamma(T: number, x: Float64Array, out: Float64Array): void;
  /** (∂ ln γ/∂T) at constant composition [1/K], written for the condensables only */
  lnGammaSlope(T: number, x: Float64Array, out: Float64Array): void;
}

/**
 * Activity coefficients from one excess Gibbs energy, which is the sum of
 * - NRTL over all condensables: with Gⱼᵢ = exp(−α τⱼᵢ), Sᵢ = Σ xₖ Gₖᵢ, qᵢ = Σ xₖ τₖᵢ Gₖᵢ/Sᵢ,
 *     ln γᵢ = qᵢ + Σⱼ (xⱼ Gᵢⱼ/Sⱼ)(τᵢⱼ − qⱼ),  τ = 0 for a pair without parameters
 * - Redlich-Kister terms of single pairs: with B = Σ Bₖ dᵏ, B′ = Σ k Bₖ dᵏ⁻¹, d = x1 − x2,
 *     ln γ1 = x2 (1 − x1) B + x1 x2 (1 − d) B′,  ln γ2 = x1 (1 − x2) B − x1 x2 (1 + d) B′,
 *     ln γ = −x1 x2 (B + d B′) of the others.
 *
 * @param condensables  indices of the components that make up the liquid; dissolved gases have no part in it
 * @returns null where no pair among them has parameters: the liquid is ideal
 * @source NRTL: H. Renon & J. M. Prausnitz, AIChE J. 14 (1968) 135; O. Redlich & A. T. Kister, Ind. Eng. Chem.
 *   40 (1948) 345
 */
export function createActivityModel(
  components: readonly Component[],
  condensables: readonly number[],
): ActivityModel | null {
  const pairs = pairsAmong(components, condensables);
  if (pairs.length === 0) return null;
  const count = condensables.length;
  const placeOf = (id: string) => condensables.findIndex((i) => components[i].id === id);
  const nrtl = createNrtl(
    count,
    pairs.filter((pair): pair is NrtlPair => pair.form === 'nrtl'),
    placeOf,
  );
  const kister = pairs
    .filter((pair): pair is RedlichKisterPair => pair.form === 'redlich-kister')
    .map((pair) => createRedlichKister(pair, placeOf(pair.first), placeOf(pair.second)));
  const fractions = new Float64Array(count);
  const sum = new Float64Array(count);

  function fill(T: number, x: Float64Array, out: Float64Array, slope: boolean): void {
    let total = 0;
    for (let m = 0; m < count; m++) total += x[condensables[m]];
    // Of a liquid without condensables only the limit of equal parts can be told.
    for (let m = 0; m < count; m++) fractions[m] = total > 0 ? x[condensables[m]] / total : 1 / count;
    sum.fill(0);
    if (nrtl) nrtl(T, fractions, sum, slope);
    for (let k = 0; k < kister.length; k++) kister[k](T, fractions, sum, slope);
    for (let m = 0; m < count; m++) out[condensables[m]] = sum[m];
  }

  return {
    pairs,
    lnGamma: (T, x, out) => fill(T, x, out, false),
    lnGammaSlope: (T, x, out) => fill(T, x, out, true),
  };
}

/** Adds ln γ, or its slope in T, of the condensables to `sum`. */
type Term = (T: number, x: Float64Array, sum: Float64Array, slope: boolean) => void;

function pairsAmong(components: readonly Component[], condensables: readonly number[]): ActivityPair[] {
  const ids = condensables.filter((i) => !components[i].custom).map((i) => components[i].id);
  return activityPairs.filter(({ first, second }) => ids.includes(first) && ids.includes(second));
}

function createNrtl(count: number, pairs: readonly NrtlPair[], placeOf: (id: string) => number): Term | null {
  if (pairs.length === 0) return null;
  // by [from count·k + i]: b/R [K], α, and at the latest temperature τ and G
  const perR = new Float64Array(count * count);
  const alpha = new Float64Array(count * count);
  for (const { first, second, b12JPerMol, b21JPerMol, alpha: value } of pairs) {
    const [i, j] = [placeOf(first), placeOf(second)];
    perR[count * i + j] = b12JPerMol / R;
    perR[count * j + i] = b21JPerMol / R;
    alpha[count * i + j] = value;
    alpha[count * j + i] = value;
  }
  const tau = new Float64Array(count * count);
  const G = new Float64Array(count * count);
  const S = new Float64Array(count);
  const q = new Float64Array(count);
  const slopeS = new Float64Array(count);
  const slopeQ = new Float64Array(count);
  const kept = { T: Number.NaN };

  function setTemperature(T: number): void {
    if (T === kept.T) return;
    kept.T = T;
    for (let k = 0; k < tau.length; k++) {
      tau[k] = perR[k] / T;
      G[k] = Math.exp(-alpha[k] * tau[k]);
    }
  }

  /** S and q of every component, and their slopes in T: dτ/dT = −τ/T, dG/dT = α τ G/T. */
  function setSums(T: number, x: Float64Array): void {
    for (let i = 0; i < count; i++) {
      let s = 0;
      let c = 0;
      let sSlope = 0;
      let cSlope = 0;
      for (let k = 0; k < count; k++) {
        const p = count * k + i;
        const part = x[k] * G[p];
        const bent = alpha[p] * tau[p];
        s += part;
        c += part * tau[p];
        sSlope += (part * bent) / T;
        cSlope += (part * tau[p] * (bent - 1)) / T;
      }
      S[i] = s;
      q[i] = c / s;
      slopeS[i] = sSlope / s;
      slopeQ[i] = cSlope / s - q[i] * slopeS[i];
    }
  }

  return (T, x, sum, slope) => {
    setTemperature(T);
    setSums(T, x);
    for (let i = 0; i < count; i++) {
      let value = slope ? slopeQ[i] : q[i];
      for (let j = 0; j < count; j++) {
        const p = count * i + j;
        const share = (x[j] * G[p]) / S[j];
        const excess = tau[p] - q[j];
        if (!slope) value += share * excess;
        else {
          const shareSlope = share * ((alpha[p] * tau[p]) / T - slopeS[j]);
          value += shareSlope * excess + share * (-tau[p] / T - slopeQ[j]);
        }
      }
      sum[i] += value;
    }
  };
}

function createRedlichKister({ terms }: RedlichKisterPair, first: number, second: number): Term {
  return (T, x, sum, slope) => {
    const x1 = x[first];
    const x2 = x[second];
    const d = x1 - x2;
    // Horner: B = Σ Bₖ dᵏ and its derivative in d
    let B = 0;
    let derivative = 0;
    for (let k = terms.length - 1; k >= 0; k--) {
      derivative = derivative * d + B;
      B = B * d + (slope ? -terms[k][1] / (T * T) : terms[k][0] + terms[k][1] / T);
    }
    const others = -x1 * x2 * (B + d * derivative);
    for (let i = 0; i < x.length; i++) sum[i] += others;
    sum[first] += x2 * B + x1 * x2 * derivative;
    sum[second] += x1 * B - x1 * x2 * derivative;
  };
}
