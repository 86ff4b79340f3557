import { R } from './constants.ts';
import type { Attractions } from './cubic-attractions.ts';
import { slopeOfRoot } from './cubic-root.ts';

/** What a cubic equation of state knows of its latest mixture; arrays by member unless said otherwise. */
export interface CubicState {
  readonly delta1: number;
  readonly delta2: number;
  /** component index of each member */
  readonly members: Int32Array;
  readonly covolume: Float64Array;
  /** fractions among the members */
  readonly x: Float64Array;
  /** Σ xⱼ aᵢⱼ */
  readonly rowSum: Float64Array;
  /** members of each pair with a kᵢⱼ */
  readonly first: Int32Array;
  readonly second: Int32Array;
  /** at the temperature */
  readonly attractions: Attractions;
  readonly now: {
    readonly T: number;
    readonly P: number;
    readonly memberShare: number;
    readonly a: number;
    readonly aSlope: number;
    readonly b: number;
    readonly c: number;
    readonly Z: number;
    readonly L: number;
  };
}

/**
 * N ∂ ln φᵢ/∂nⱼ of the latest mixture, row by row (see GasModel.lnPhiByAmount). Per mole of j in one mole of members
 *   ∂b = bⱼ − b,  ∂a = 2 (Σ xₖ aⱼₖ − a),  ∂(Σ xₖ aᵢₖ) = aᵢⱼ − Σ xₖ aᵢₖ,
 * and Z follows through the cubic. What is no member neither moves the others nor is moved by them; a mole of a member
 * moves the fractions among them the more, the smaller their share of the whole is. The shift cᵢP/(RT) does not depend
 * on composition.
 */
export function fillLnPhiByAmount(state: CubicState, size: number, out: Float64Array): void {
  const { delta1, delta2, members, covolume, rowSum, first, second } = state;
  const { root, taken } = state.attractions;
  const { T, P, memberShare, a, b, Z, L } = state.now;
  const count = members.length;
  const RT = R * T;
  const B = (b * P) / RT;
  const A = (a * B) / (b * RT);
  const perAttraction = L / (b * RT);
  for (let j = 0; j < count; j++) {
    const slopeB = B * (covolume[j] / b - 1);
    const attractionSlope = 2 * (rowSum[j] - a);
    const slopeZ = slopeOfRoot(A, B, Z, delta1 + delta2, delta1 * delta2, (A * attractionSlope) / a, slopeB);
    const slopeL =
      ((slopeZ + delta1 * slopeB) / (Z + delta1 * B) - (slopeZ + delta2 * slopeB) / (Z + delta2 * B)) /
      (delta1 - delta2);
    const logSlopeB = covolume[j] / b - 1;
    const perAttractionSlope = slopeL / (b * RT) - perAttraction * logSlopeB;
    const repulsion = (slopeZ - slopeB) / (Z - B);
    for (let i = 0; i < count; i++) {
      const share = covolume[i] / b;
      const shareSlope = -share * logSlopeB;
      out[members[i] * size + members[j]] =
        (shareSlope * (Z - 1) +
          share * slopeZ -
          repulsion -
          (2 * (root[i] * root[j] - rowSum[i]) - attractionSlope * share - a * shareSlope) * perAttraction -
          (2 * rowSum[i] - a * share) * perAttractionSlope) /
        memberShare;
    }
  }
  const perPair = (2 * perAttraction) / memberShare;
  for (let k = 0; k < taken.length; k++) {
    const i = members[first[k]];
    const j = members[second[k]];
    out[i * size + j] += taken[k] * perPair;
    out[j * size + i] += taken[k] * perPair;
  }
}
