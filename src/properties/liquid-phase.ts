import type { Component } from '../model/component.ts';
import type { Role } from './component-roles.ts';
import { R } from './constants.ts';
import type { GasModel } from './gas-model.ts';
import type { HenryConstant } from './henry.ts';
import { henryConstant, lnHenry, lnHenrySlope, partialVolume, partialVolumeSlope } from './henry.ts';
import { liquidVolume, liquidVolumeSlope } from './liquid-volume.ts';
import { saturatedGasCompressibility } from './saturated-gas.ts';
import { lnVapourPressure, lnVapourPressureSlope } from './vapour-pressure.ts';

/**
 * The liquid that condenses from a loop's gas: condensables by vapour pressure, gases by Henry's law.
 * `at` fixes temperature and pressure; the rest refers to the last `at`.
 */
export interface LiquidPhase {
  readonly roles: readonly Role[];
  /** indices of the condensables */
  readonly condensables: readonly number[];
  /** set T [K] and P [Pa] */
  at(T: number, P: number): void;
  /** false when every condensable in z is above its critical temperature: no liquid can exist */
  canExist(T: number, z: Float64Array): boolean;
  /**
   * ln(fᵢ/xᵢ), fᵢ in Pa, in a liquid of composition x (any positive scale; only the ratios of the
   * condensables are read); +Infinity for what stays out of the liquid.
   */
  lnFugacityPerFraction(x: Float64Array, out: Float64Array): void;
  /** partial molar enthalpy less that of the ideal gas at T [J/mol] */
  enthalpyOverIdealGas(x: Float64Array, out: Float64Array): void;
  /** partial molar volumes [m3/mol] */
  volumes(x: Float64Array, out: Float64Array): void;
}

/**
 * Liquid with unit activity coefficients:
 *   condensable:  fᵢ = xᵢ Psatᵢ φsatᵢ exp(vᵢ (P − Psatᵢ)/RT)
 *   gas:          fᵢ = xᵢ Hᵢ exp(v∞ᵢ (P − Psat_s)/RT)      (Krichevsky and Kasarnovsky)
 * with ln H and v∞ in a mixed solvent averaged over the mole fractions of the solvents that have data for it.
 * Enthalpies follow from the same equations by h − h_ig = −R T² ∂ln(f/x)/∂T, which for the condensables is the
 * Clapeyron equation: h − h_ig = ΔH(sat gas) − T Psat′ (v_gas − v) + (v − T v′)(P − Psat). The volume of the
 * saturated gas is taken from the component's table where there is one (see saturated-gas.ts), so that the heat
 * of vaporisation is right rather than consistent with the error of the gas model.
 *
 * @param gas  vapour model, for φsat and the volume of the saturated vapour
 * @source Krichevsky & Kasarnovsky, J. Am. Chem. Soc. 57 (1935) 2168; Prausnitz, Lichtenthaler & Azevedo,
 *   Molecular Thermodynamics of Fluid-Phase Equilibria, 3rd ed., ch. 3 and 10
 */
export function createLiquidPhase(
  components: readonly Component[],
  roles: readonly Role[],
  gas: GasModel,
): LiquidPhase {
  const size = components.length;
  const condensables = indicesOf(roles, 'condensable');
  const dissolved = indicesOf(roles, 'dissolved');
  const solvents = dissolved.map((i) =>
    condensables
      .map((s) => ({ s, henry: henryConstant(components[s]!.id, components[i]!.id) }))
      .filter((pair): pair is { s: number; henry: HenryConstant } => pair.henry !== undefined),
  );
  const criticalK = components.map((c) => c.critical?.temperatureK ?? Number.POSITIVE_INFINITY);
  // Of each condensable at the present T and P: ln f/x, Psat [Pa], its slope [Pa/K], volume, enthalpy.
  const lnPure = new Float64Array(size);
  const psat = new Float64Array(size);
  const psatSlope = new Float64Array(size);
  const volume = new Float64Array(size);
  const enthalpy = new Float64Array(size);
  let T = Number.NaN;
  let P = Number.NaN;
  let enthalpyAtT = Number.NaN;
  let enthalpyAtP = Number.NaN;

  function at(temperatureK: number, pressurePa: number): void {
    if (temperatureK === T && pressurePa === P) return;
    T = temperatureK;
    P = pressurePa;
    for (const i of condensables) {
      const c = components[i]!;
      const lnPsat = lnVapourPressure(c, T);
      psat[i] = Math.exp(lnPsat);
      const v = liquidVolume(c, T);
      // A user's component may come without any: then pressure does not act on its liquid.
      volume[i] = Number.isNaN(v) ? 0 : v;
      lnPure[i] = lnPsat + gas.pureLnPhi(i, T, psat[i]!) + (volume[i]! * (P - psat[i]!)) / (R * T);
    }
  }

  function condensableEnthalpies(): void {
    if (enthalpyAtT === T && enthalpyAtP === P) return;
    enthalpyAtT = T;
    enthalpyAtP = P;
    for (const i of condensables) {
      const c = components[i]!;
      const v = volume[i]!;
      const p = psat[i]!;
      psatSlope[i] = p * lnVapourPressureSlope(c, T);
      const Z = saturatedGasCompressibility(c, T) ?? gas.pureCompressibility(i, T, p);
      const vGas = (Z * R * T) / p;
      enthalpy[i] =
        gas.pureEnthalpyDeparture(i, T, p) -
        T * psatSlope[i]! * (vGas - v) +
        (v === 0 ? 0 : (v - T * liquidVolumeSlope(c, T)) * (P - p));
    }
  }

  /** Call `add` with every solvent of dissolved gas number d and its share among those solvents. */
  function overSolvents(d: number, x: Float64Array, add: (share: number, s: number, h: HenryConstant) => number) {
    const pairs = solvents[d]!;
    if (pairs.length === 1) return add(1, pairs[0]!.s, pairs[0]!.henry);
    let total = 0;
    for (const pair of pairs) total += x[pair.s]!;
    let sum = 0;
    for (const pair of pairs) {
      const share = total > 0 ? x[pair.s]! / total : 1 / pairs.length;
      if (share > 0) sum += add(share, pair.s, pair.henry);
    }
    return sum;
  }
  const lnHenryTerm = (share: number, s: number, h: HenryConstant) =>
    share * (lnHenry(h, T) + (partialVolume(h, T) * (P - psat[s]!)) / (R * T));
  const enthalpyTerm = (share: number, s: number, h: HenryConstant) => {
    const v = partialVolume(h, T);
    return (
      share *
      (-R * T * T * lnHenrySlope(h, T) +
        (v - T * partialVolumeSlope(h, T)) * (P - psat[s]!) +
        T * v * psatSlope[s]!)
    );
  };
  const volumeTerm = (share: number, _s: number, h: HenryConstant) => share * partialVolume(h, T);

  return {
    roles,
    condensables,
    at,
    canExist(temperatureK, z) {
      for (const i of condensables) if (z[i]! > 0 && temperatureK < criticalK[i]!) return true;
      return false;
    },
    lnFugacityPerFraction(x, out) {
      out.fill(Number.POSITIVE_INFINITY);
      for (const i of condensables) out[i] = lnPure[i]!;
      for (let d = 0; d < dissolved.length; d++) out[dissolved[d]!] = overSolvents(d, x, lnHenryTerm);
    },
    enthalpyOverIdealGas(x, out) {
      condensableEnthalpies();
      out.fill(0);
      for (const i of condensables) out[i] = enthalpy[i]!;
      for (let d = 0; d < dissolved.length; d++) out[dissolved[d]!] = overSolvents(d, x, enthalpyTerm);
    },
    volumes(x, out) {
      out.fill(0);
      for (const i of condensables) out[i] = volume[i]!;
      for (let d = 0; d < dissolved.length; d++) out[dissolved[d]!] = overSolvents(d, x, volumeTerm);
    },
  };
}

function indicesOf(roles: readonly Role[], wanted: Role): number[] {
  return roles.flatMap((role, i) => (role === wanted ? [i] : []));
}
