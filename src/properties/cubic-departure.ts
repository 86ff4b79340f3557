import { R } from './constants.ts';
import type { CubicState } from './cubic-by-amount.ts';
import { slopeOfRoot } from './cubic-root.ts';
import type { DepartureSlopes } from './gas-model.ts';

/**
 * ∂/∂T and ∂/∂P of the enthalpy departure of the latest mixture,
 *   H − H(ideal) = RT (Z' − 1) + (T da/dT − a) L/b − cP,
 * with Z' and L as T and P move them (see cubic.ts).
 */
export function fillDepartureSlopes(state: CubicState, out: DepartureSlopes): void {
  const { delta1, delta2 } = state;
  const { T, P, memberShare, a, aSlope, b, c, Z, L } = state.now;
  const u = delta1 + delta2;
  const w = delta1 * delta2;
  const RT = R * T;
  const B = (b * P) / RT;
  const A = (a * B) / (b * RT);
  const attraction = (T * aSlope - a) / b;
  const upper = Z + delta1 * B;
  const lower = Z + delta2 * B;
  let slopeZ = slopeOfRoot(A, B, Z, u, w, A * (aSlope / a - 2 / T), -B / T);
  let slopeL =
    ((slopeZ - (delta1 * B) / T) / upper - (slopeZ - (delta2 * B) / T) / lower) / (delta1 - delta2);
  const ofAttraction = (T * attractionCurvature(state) * L) / b + attraction * slopeL;
  out.perKelvin = memberShare * (R * (Z - 1) + RT * slopeZ + ofAttraction);
  slopeZ = slopeOfRoot(A, B, Z, u, w, A / P, B / P);
  slopeL = ((slopeZ + (delta1 * B) / P) / upper - (slopeZ + (delta2 * B) / P) / lower) / (delta1 - delta2);
  out.perPascal = memberShare * (RT * slopeZ + attraction * slopeL - c);
}

/** d²a/dT² of the mixture. */
function attractionCurvature({ attractions, x, first, second }: CubicState): number {
  const { root, rootSlope, rootCurvature, takenCurvature } = attractions;
  let sum = 0;
  let slopeSum = 0;
  let curvatureSum = 0;
  for (let m = 0; m < x.length; m++) {
    sum += x[m] * root[m];
    slopeSum += x[m] * rootSlope[m];
    curvatureSum += x[m] * rootCurvature[m];
  }
  let curvature = 2 * (slopeSum * slopeSum + sum * curvatureSum);
  for (let k = 0; k < first.length; k++) curvature -= 2 * x[first[k]] * x[second[k]] * takenCurvature[k];
  return curvature;
}
