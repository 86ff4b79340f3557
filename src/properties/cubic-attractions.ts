import type { BinaryInteraction } from './binary-interaction.ts';
import type { AlphaRoot } from './cubic-alpha.ts';
import { type Kept, keepRecent } from './recent.ts';

/** Temperatures whose attractions are kept. */
const KEPT = 8;

/** What temperature makes of the attractions: by member √aᵢ, by pair kᵢⱼ √(aᵢ aⱼ), with their derivatives in T. */
export interface Attractions {
  readonly root: Float64Array;
  readonly rootSlope: Float64Array;
  readonly rootCurvature: Float64Array;
  readonly taken: Float64Array;
  readonly takenSlope: Float64Array;
  readonly takenCurvature: Float64Array;
}

/**
 * The attractions of a cubic equation of state by temperature; the last ones are kept (see recent.ts).
 *
 * @param criticalRoot  √aᵢ at the critical temperature, by member
 * @param first,second  members of each pair
 * @returns a function of T [K]; what it gives is overwritten some calls later
 */
export function createAttractions(
  criticalRoot: Float64Array,
  alphas: readonly AlphaRoot[],
  pairs: readonly BinaryInteraction[],
  first: Int32Array,
  second: Int32Array,
): (T: number) => Attractions {
  const kij = new Float64Array(pairs.length);
  const kijSlope = new Float64Array(pairs.length);
  const kijCurvature = new Float64Array(pairs.length);

  function fill(at: Attractions & Kept): void {
    const { first: T, root, rootSlope, rootCurvature, taken, takenSlope, takenCurvature } = at;
    for (let m = 0; m < root.length; m++) {
      alphas[m].write(T, m, root, rootSlope, rootCurvature);
      root[m] *= criticalRoot[m];
      rootSlope[m] *= criticalRoot[m];
      rootCurvature[m] *= criticalRoot[m];
    }
    for (let k = 0; k < taken.length; k++) {
      pairs[k].write(T, k, kij, kijSlope, kijCurvature);
      const m = first[k];
      const n = second[k];
      const product = root[m] * root[n];
      const slope = rootSlope[m] * root[n] + root[m] * rootSlope[n];
      const curvature =
        rootCurvature[m] * root[n] + 2 * rootSlope[m] * rootSlope[n] + root[m] * rootCurvature[n];
      taken[k] = kij[k] * product;
      takenSlope[k] = kij[k] * slope + kijSlope[k] * product;
      takenCurvature[k] = kij[k] * curvature + 2 * kijSlope[k] * slope + kijCurvature[k] * product;
    }
  }

  const recent = keepRecent(KEPT, () => room(criticalRoot.length, pairs.length), fill);
  return (T) => recent(T, 0);
}

function room(members: number, pairs: number): Attractions & Kept {
  const array = (length: number) => new Float64Array(length);
  return {
    first: Number.NaN,
    second: Number.NaN,
    spared: false,
    root: array(members),
    rootSlope: array(members),
    rootCurvature: array(members),
    taken: array(pairs),
    takenSlope: array(pairs),
    takenCurvature: array(pairs),
  };
}
