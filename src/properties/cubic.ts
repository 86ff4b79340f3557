import type { GasModelName } from '../model/flowsheet.ts';
import type { BinaryInteraction } from './binary-interaction.ts';
import { R } from './constants.ts';
import type { AlphaRoot } from './cubic-alpha.ts';
import { vapourRoot } from './cubic-root.ts';
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
 * The pair attractions of the latest temperature are kept, since callers try many compositions at one.
 *
 * @param entries  per component in declared order, null for solids and components without critical data
 * @param interactions  kᵢⱼ by indices i < j; a pair that is missing has 0
 * @source the equations as in M. L. Michelsen, J. M. Mollerup, Thermodynamic Models, 2nd ed. 2007, ch. 3;
 *   shift: A. Péneloux, E. Rauzy, R. Frèze, Fluid Phase Equilib. 8 (1982) 7
 */
export function createCubic(
  form: CubicForm,
  entries: readonly (CubicComponent | null)[],
  interactions: readonly BinaryInteraction[],
): GasModel {
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
  const pairs = interactions.filter(({ i, j }) => memberOf[i]! >= 0 && memberOf[j]! >= 0);

  // kept for the latest temperature: aᵢⱼ and daᵢⱼ/dT, count × count by rows
  let keptT = Number.NaN;
  const attraction = new Float64Array(count * count);
  const attractionSlope = new Float64Array(count * count);
  const root = new Float64Array(count);
  const rootSlope = new Float64Array(count);

  // of the latest mixture; x are fractions among the members
  const x = new Float64Array(count);
  const rowSum = new Float64Array(count);
  let memberShare = 0;
  let a = 0;
  let aSlope = 0;
  let b = 0;
  let c = 0;
  let Z = 1;
  let L = 0;

  function setTemperature(T: number): void {
    if (T === keptT) return;
    for (let m = 0; m < count; m++) {
      root[m] = criticalRoot[m]! * alphas[m]!.value(T);
      rootSlope[m] = criticalRoot[m]! * alphas[m]!.slope(T);
    }
    for (let m = 0; m < count; m++) {
      for (let n = 0; n < count; n++) {
        attraction[m * count + n] = root[m]! * root[n]!;
        attractionSlope[m * count + n] = rootSlope[m]! * root[n]! + root[m]! * rootSlope[n]!;
      }
    }
    for (let k = 0; k < pairs.length; k++) applyInteraction(pairs[k]!, T);
    keptT = T;
  }

  function applyInteraction(pair: BinaryInteraction, T: number): void {
    const m = memberOf[pair.i]!;
    const n = memberOf[pair.j]!;
    const geometric = root[m]! * root[n]!;
    const geometricSlope = rootSlope[m]! * root[n]! + root[m]! * rootSlope[n]!;
    const k = pair.value(T);
    const value = geometric * (1 - k);
    const slope = geometricSlope * (1 - k) - geometric * pair.slope(T);
    attraction[m * count + n] = value;
    attraction[n * count + m] = value;
    attractionSlope[m * count + n] = slope;
    attractionSlope[n * count + m] = slope;
  }

  /** Solves the state of the members of a mixture; false where it has none. */
  function setMixture(T: number, P: number, y: Float64Array): boolean {
    let total = 0;
    let ofMembers = 0;
    for (let i = 0; i < size; i++) {
      total += y[i]!;
      if (memberOf[i]! >= 0) ofMembers += y[i]!;
    }
    if (!(ofMembers > 0)) return false;
    setTemperature(T);
    memberShare = ofMembers / total;
    a = 0;
    aSlope = 0;
    b = 0;
    c = 0;
    for (let m = 0; m < count; m++) {
      x[m] = y[members[m]!]! / ofMembers;
      b += x[m]! * covolume[m]!;
      c += x[m]! * shift[m]!;
    }
    for (let m = 0; m < count; m++) {
      let sum = 0;
      let slopeSum = 0;
      for (let n = 0; n < count; n++) {
        sum += x[n]! * attraction[m * count + n]!;
        slopeSum += x[n]! * attractionSlope[m * count + n]!;
      }
      rowSum[m] = sum;
      a += x[m]! * sum;
      aSlope += x[m]! * slopeSum;
    }
    solveState(T, P);
    return true;
  }

  function setPure(i: number, T: number, P: number): boolean {
    const m = memberOf[i]!;
    if (m < 0) return false;
    setTemperature(T);
    a = attraction[m * count + m]!;
    aSlope = attractionSlope[m * count + m]!;
    b = covolume[m]!;
    c = shift[m]!;
    solveState(T, P);
    return true;
  }

  function solveState(T: number, P: number): void {
    const B = (b * P) / (R * T);
    Z = vapourRoot((a * P) / (R * T * R * T), B, u, w);
    L = Math.log((Z + delta1 * B) / (Z + delta2 * B)) / (delta1 - delta2);
  }

  function compressibilityNow(T: number, P: number): number {
    return Z - (c * P) / (R * T);
  }

  function enthalpyNow(T: number, P: number): number {
    return R * T * (Z - 1) + ((T * aSlope - a) * L) / b - c * P;
  }

  return {
    name: form.name,
    size,
    lnPhi(T, P, y, out) {
      out.fill(0);
      if (!setMixture(T, P, y)) return;
      const RT = R * T;
      const repulsion = Math.log(Z - (b * P) / RT);
      const perAttraction = L / (b * RT);
      for (let m = 0; m < count; m++) {
        const share = covolume[m]! / b;
        out[members[m]!] =
          share * (Z - 1) - repulsion - (2 * rowSum[m]! - a * share) * perAttraction - (shift[m]! * P) / RT;
      }
    },
    compressibility(T, P, y) {
      if (!setMixture(T, P, y)) return 1;
      return 1 + memberShare * (compressibilityNow(T, P) - 1);
    },
    isLiquidLike(T, P, y) {
      if (!setMixture(T, P, y)) return false;
      // Below the critical temperature a root on the liquid's side of the critical volume is the largest only
      // where it is the single one.
      return a > form.criticalAttraction * b * R * T && Z * R * T < form.criticalVolume * b * P;
    },
    enthalpyDeparture(T, P, y) {
      return setMixture(T, P, y) ? memberShare * enthalpyNow(T, P) : 0;
    },
    entropyDeparture(T, P, y) {
      if (!setMixture(T, P, y)) return 0;
      return memberShare * (R * Math.log(Z - (b * P) / (R * T)) + (aSlope * L) / b);
    },
    pureLnPhi(i, T, P) {
      if (!setPure(i, T, P)) return 0;
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
