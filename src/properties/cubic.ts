import type { GasModelName } from '../model/flowsheet.ts';
import type { BinaryInteraction } from './binary-interaction.ts';
import { R } from './constants.ts';
import type { AlphaRoot } from './cubic-alpha.ts';
import { createAttractions } from './cubic-attractions.ts';
import { fillLnPhiByAmount } from './cubic-by-amount.ts';
import { fillDepartureSlopes } from './cubic-departure.ts';
import { liquidRoot, slopeOfRoot, vapourRoot } from './cubic-root.ts';
import type { GasModel } from './gas-model.ts';

/** What one component brings into a cubic equation of state. */
export interface CubicComponent {
  /** attraction at the critical temperature [Pa m6/mol2] */
  readonly attraction: number;
  /** covolume b [m3/mol] */
  readonly covolume: number;
  /** volume shift c [m3/mol], taken off the volume of the equation; 0 leaves it as it is */
  readonly shift: number;
  readonly alpha: AlphaRoot;
}

/** The two numbers by which one cubic equation differs from another: δ1 = 1, δ2 = 0 is Soave-Redlich-Kwong. */
export interface CubicForm {
  readonly name: GasModelName;
  readonly delta1: number;
  readonly delta2: number;
  /** a/(bRT) at the critical point of a pure fluid [-]; larger below the critical temperature */
  readonly criticalAttraction: number;
  /** v'/b at the critical point of a pure fluid [-] */
  readonly criticalVolume: number;
}

/**
 * Gas model of a cubic equation of state in two constants, with a volume shift,
 *   P = RT/(v' − b) − a/((v' + δ1 b)(v' + δ2 b)),  v' = v + c,
 *   a = Σ Σ yᵢ yⱼ √(aᵢ aⱼ)(1 − kᵢⱼ),  b = Σ yᵢ bᵢ,  c = Σ yᵢ cᵢ.
 * With Z' = Pv'/(RT), A = aP/(RT)², B = bP/(RT), L = ln((Z' + δ1 B)/(Z' + δ2 B))/(δ1 − δ2):
 *   ln φᵢ = (bᵢ/b)(Z' − 1) − ln(Z' − B) − (2 Σ yⱼ aᵢⱼ − a bᵢ/b) L/(bRT) − cᵢ P/(RT)
 *   H − H(ideal) = RT (Z' − 1) + (T da/dT − a) L/b − cP
 *   S − S(ideal) = R ln(Z' − B) + (da/dT) L/b
 *
 * A component without an entry (null) is an ideal gas mixed ideally with the others: its ln φ is 0 and those
 * of the others follow from their fractions among themselves. That keeps one Gibbs energy for the whole.
 *
 * The attractions of the last temperatures are kept, since callers try many compositions at one; so is the state
 * of the latest mixture, since they ask for its fugacities, enthalpy and entropy in turn.
 *
 * @param entries  per component in declared order, null for solids and components without critical data
 * @param interactions  kᵢⱼ by indices i < j; a pair that is missing has 0
 * @param phase  which root is taken where there are three
 * @source the equations as in M. L. Michelsen, J. M. Mollerup, Thermodynamic Models, 2nd ed. 2007, ch. 3;
 *   shift: A. Péneloux, E. Rauzy, R. Frèze, Fluid Phase Equilib. 8 (1982) 7
 */
export function createCubic(
  form: CubicForm,
  entries: readonly (CubicComponent | null)[],
  interactions: readonly BinaryInteraction[],
  phase: 'vapour' | 'liquid' = 'vapour',
): GasModel {
  const rootOf = phase === 'vapour' ? vapourRoot : liquidRoot;
  const size = entries.length;
  const { delta1, delta2 } = form;
  const u = delta1 + delta2;
  const w = delta1 * delta2;
  const members = Int32Array.from(entries.flatMap((entry, i) => (entry ? [i] : [])));
  const count = members.length;
  const covolume = Float64Array.from(members, (i) => entries[i]!.covolume);
  const shift = Float64Array.from(members, (i) => entries[i]!.shift);
  const criticalRoot = Float64Array.from(members, (i) => Math.sqrt(entries[i]!.attraction));
  const alphas = Array.from(members, (i) => entries[i]!.alpha);
  const memberOf = new Int32Array(size).fill(-1);
  members.forEach((i, m) => {
    memberOf[i] = m;
  });
  const pairs = interactions.filter(({ i, j }) => memberOf[i] >= 0 && memberOf[j] >= 0);
  const first = Int32Array.from(pairs, ({ i }) => memberOf[i]);
  const second = Int32Array.from(pairs, ({ j }) => memberOf[j]);

  const attractionsAt = createAttractions(criticalRoot, alphas, pairs, first, second);
  let at = attractionsAt(298.15);

  // of the latest mixture; x are fractions among the members
  const keptY = new Float64Array(size);
  const x = new Float64Array(count);
  const rowSum = new Float64Array(count);
  const rowSlope = new Float64Array(count);
  // Fields, not variables: a number kept in a variable of the closure is allocated anew at each change.
  const now = { T: Number.NaN, P: Number.NaN, memberShare: 0, a: 0, aSlope: 0, b: 0, c: 0, Z: 1, L: 0 };

  const state = { delta1, delta2, members, covolume, x, rowSum, first, second, now, attractions: at };

  /** Solves the state of the members of a mixture; false where it has none. Asked again, it has the answer. */
  function setMixture(T: number, P: number, y: Float64Array): boolean {
    if (isKept(T, P, y)) return true;
    let total = 0;
    let ofMembers = 0;
    for (let i = 0; i < size; i++) {
      total += y[i];
      if (memberOf[i] >= 0) ofMembers += y[i];
    }
    if (!(ofMembers > 0)) return false;
    at = attractionsAt(T);
    const { root, rootSlope, taken, takenSlope } = at;
    let b = 0;
    let c = 0;
    let sum = 0;
    let slopeSum = 0;
    for (let m = 0; m < count; m++) {
      const share = y[members[m]] / ofMembers;
      x[m] = share;
      b += share * covolume[m];
      c += share * shift[m];
      sum += share * root[m];
      slopeSum += share * rootSlope[m];
    }
    // Σ Σ xᵢ xⱼ √(aᵢ aⱼ)(1 − kᵢⱼ) = (Σ xᵢ √aᵢ)² less what the pairs take
    let a = sum * sum;
    let aSlope = 2 * sum * slopeSum;
    for (let m = 0; m < count; m++) rowSum[m] = root[m] * sum;
    for (let k = 0; k < pairs.length; k++) {
      const m = first[k];
      const n = second[k];
      rowSum[m] -= x[n] * taken[k];
      rowSum[n] -= x[m] * taken[k];
      a -= 2 * x[m] * x[n] * taken[k];
      aSlope -= 2 * x[m] * x[n] * takenSlope[k];
    }
    now.a = a;
    now.aSlope = aSlope;
    now.b = b;
    now.c = c;
    solveState(T, P);
    keptY.set(y);
    now.memberShare = ofMembers / total;
    now.P = P;
    now.T = T;
    return true;
  }

  function isKept(T: number, P: number, y: Float64Array): boolean {
    if (T !== now.T || P !== now.P) return false;
    for (let i = 0; i < size; i++) if (y[i] !== keptY[i]) return false;
    return true;
  }

  function setPure(i: number, T: number, P: number): boolean {
    const m = memberOf[i];
    if (m < 0) return false;
    at = attractionsAt(T);
    now.T = Number.NaN;
    now.a = at.root[m] * at.root[m];
    now.aSlope = 2 * at.root[m] * at.rootSlope[m];
    now.b = covolume[m];
    now.c = shift[m];
    solveState(T, P);
    return true;
  }

  /** Z and L of the attraction and covolume in `now`: handed over as arguments, each would be allocated. */
  function solveState(T: number, P: number): void {
    const perRT = 1 / (R * T);
    const B = now.b * P * perRT;
    const Z = rootOf(now.a * P * perRT * perRT, B, u, w);
    now.Z = Z;
    now.L = Math.log((Z + delta1 * B) / (Z + delta2 * B)) / (delta1 - delta2);
  }

  /** Slope of every ln φ in a variable of which A, B, a and the attraction sums have the given slopes. */
  function slopesNow(
    RT: number,
    B: number,
    slopeA: number,
    slopeB: number,
    logSlopeRT: number,
    attractionSlope: number,
    rowSlope: Float64Array | null,
    out: Float64Array,
  ): void {
    const { a, b, Z, L } = now;
    const A = (a * B) / (b * RT);
    const slopeZ = slopeOfRoot(A, B, Z, u, w, slopeA, slopeB);
    const slopeL =
      ((slopeZ + delta1 * slopeB) / (Z + delta1 * B) - (slopeZ + delta2 * slopeB) / (Z + delta2 * B)) /
      (delta1 - delta2);
    const perAttraction = L / (b * RT);
    const perAttractionSlope = slopeL / (b * RT) - perAttraction * logSlopeRT;
    const repulsion = (slopeZ - slopeB) / (Z - B);
    out.fill(0);
    for (let m = 0; m < count; m++) {
      const share = covolume[m] / b;
      out[members[m]] =
        share * slopeZ -
        repulsion -
        (2 * (rowSlope ? rowSlope[m] : 0) - attractionSlope * share) * perAttraction -
        (2 * rowSum[m] - a * share) * perAttractionSlope;
    }
  }

  /** ∂(Σ xⱼ aᵢⱼ)/∂T of the latest mixture. */
  function setRowSlopes(): void {
    const { root, rootSlope, takenSlope } = at;
    let sum = 0;
    let slopeSum = 0;
    for (let m = 0; m < count; m++) {
      sum += x[m] * root[m];
      slopeSum += x[m] * rootSlope[m];
    }
    for (let m = 0; m < count; m++) rowSlope[m] = rootSlope[m] * sum + root[m] * slopeSum;
    for (let k = 0; k < pairs.length; k++) {
      rowSlope[first[k]] -= x[second[k]] * takenSlope[k];
      rowSlope[second[k]] -= x[first[k]] * takenSlope[k];
    }
  }

  function compressibilityNow(T: number, P: number): number {
    return now.Z - (now.c * P) / (R * T);
  }

  function enthalpyNow(T: number, P: number): number {
    const { a, aSlope, b, c, Z, L } = now;
    return R * T * (Z - 1) + ((T * aSlope - a) * L) / b - c * P;
  }

  return {
    name: form.name,
    size,
    lnPhi(T, P, y, out) {
      out.fill(0);
      if (!setMixture(T, P, y)) return;
      const { a, b, Z, L } = now;
      const RT = R * T;
      const repulsion = Math.log(Z - (b * P) / RT);
      const perAttraction = L / (b * RT);
      for (let m = 0; m < count; m++) {
        const share = covolume[m] / b;
        out[members[m]] =
          share * (Z - 1) - repulsion - (2 * rowSum[m] - a * share) * perAttraction - (shift[m] * P) / RT;
      }
    },
    lnPhiSlopes(T, P, y, perKelvin, perPascal) {
      perKelvin.fill(0);
      perPascal.fill(0);
      if (!setMixture(T, P, y)) return;
      const { a, aSlope, b } = now;
      const RT = R * T;
      const B = (b * P) / RT;
      const A = (a * B) / (b * RT);
      setRowSlopes();
      slopesNow(RT, B, A * (aSlope / a - 2 / T), -B / T, 1 / T, aSlope, rowSlope, perKelvin);
      slopesNow(RT, B, A / P, B / P, 0, 0, null, perPascal);
      for (let m = 0; m < count; m++) {
        perKelvin[members[m]] += (shift[m] * P) / (RT * T);
        perPascal[members[m]] -= shift[m] / RT;
      }
    },
    lnPhiByAmount(T, P, y, out) {
      out.fill(0);
      if (!setMixture(T, P, y)) return;
      state.attractions = at;
      fillLnPhiByAmount(state, size, out);
    },
    compressibility(T, P, y) {
      if (!setMixture(T, P, y)) return 1;
      return 1 + now.memberShare * (compressibilityNow(T, P) - 1);
    },
    isLiquidLike(T, P, y) {
      if (!setMixture(T, P, y)) return false;
      const { a, b, Z } = now;
      // Below the critical temperature a root on the liquid's side of the critical volume is the largest only
      // where it is the single one.
      return a > form.criticalAttraction * b * R * T && Z * R * T < form.criticalVolume * b * P;
    },
    enthalpyDeparture(T, P, y) {
      return setMixture(T, P, y) ? now.memberShare * enthalpyNow(T, P) : 0;
    },
    enthalpyDepartureSlopes(T, P, y, out) {
      if (setMixture(T, P, y)) {
        state.attractions = at;
        fillDepartureSlopes(state, out);
      } else {
        out.perKelvin = 0;
        out.perPascal = 0;
      }
    },
    entropyDeparture(T, P, y) {
      if (!setMixture(T, P, y)) return 0;
      const { aSlope, b, memberShare, Z, L } = now;
      return memberShare * (R * Math.log(Z - (b * P) / (R * T)) + (aSlope * L) / b);
    },
    pureLnPhi(i, T, P) {
      if (!setPure(i, T, P)) return 0;
      const { a, b, c, Z, L } = now;
      const RT = R * T;
      return Z - 1 - Math.log(Z - (b * P) / RT) - (a * L) / (b * RT) - (c * P) / RT;
    },
    pureCompressibility(i, T, P) {
      return setPure(i, T, P) ? compressibilityNow(T, P) : 1;
    },
    pureEnthalpyDeparture(i, T, P) {
      return setPure(i, T, P) ? enthalpyNow(T, P) : 0;
    },
  };
}
