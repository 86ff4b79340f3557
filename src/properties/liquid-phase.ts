import type { Component } from '../model/component.ts';
import { createActivityModel } from './activity.ts';
import type { Role } from './component-roles.ts';
import { R } from './constants.ts';
import type { GasModel } from './gas-model.ts';
import type { HenryConstant } from './henry.ts';
import { henryConstant, lnHenry, lnHenrySlope, partialVolume, partialVolumeSlope } from './henry.ts';
import { createLiquidByAmount } from './liquid-by-amount.ts';
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
  /** true when z holds a condensable below its critical temperature: a liquid may form */
  mayForm(T: number, z: Float64Array): boolean;
  /**
   * May a drop of composition x (any positive scale) exist? Its critical temperature, taken as the mean of its
   * condensables' (Kay's rule), must be above T; and they must outnumber the dissolved gases, because Henry's
   * law knows of no other liquid.
   */
  isLiquid(T: number, x: Float64Array): boolean;
  /**
   * ln(fᵢ/xᵢ), fᵢ in Pa, in a liquid of composition x (any positive scale); +Infinity for what stays out of the liquid.
   */
  lnFugacityPerFraction(x: Float64Array, out: Float64Array): void;
  /** partial molar enthalpy less that of the ideal gas at T [J/mol] */
  enthalpyOverIdealGas(x: Float64Array, out: Float64Array): void;
  /**
   * What composition does in a liquid of amounts x that add up to N:
   * @param lnFugacity  written: N ∂ ln(fᵢ/xᵢ)/∂xⱼ, size rows of size columns, row by row [-]
   * @param enthalpy  written: Σ xᵢ ∂hᵢ/∂xⱼ of `enthalpyOverIdealGas` [J/mol]; 0 where the hᵢ are true partial ones
   */
  byAmount(x: Float64Array, lnFugacity: Float64Array, enthalpy: Float64Array): void;
  /** partial molar volumes [m3/mol] */
  volumes(x: Float64Array, out: Float64Array): void;
}

/**
 * The liquid of `liquid: antoine`:
 *   condensable:  fᵢ = xᵢ γᵢ Psatᵢ φsatᵢ exp(vᵢ (P − Psatᵢ)/RT)
 *   gas:          fᵢ = xᵢ Hᵢ exp(v∞ᵢ (P − Psat_s)/RT)      (Krichevsky and Kasarnovsky)
 * with γ = 1 but for the pairs of activity.ts, read among the condensables; ln H and v∞ in a mixed solvent are
 * averaged over the mole fractions of the solvents that have data for it: O'Connell and Prausnitz's equation with
 * the excess energy of the solvents left out. With an ideal gas pressure does not act on the condensables, so
 * that theirs is Raoult's law, yᵢ P = xᵢ γᵢ Psatᵢ.
 * Enthalpies follow from the same equations by h − h_ig = −R T² ∂ln(f/x)/∂T, which for the condensables is the
 * Clapeyron equation: h − h_ig = ΔH(sat gas) − T Psat′ (v_gas − v) + (v − T v′)(P − Psat), less
 * R T² ∂ln γ/∂T. The volume of the
 * saturated gas is taken from the component's table where there is one (see saturated-gas.ts), so that the heat
 * of vaporisation is right rather than consistent with the error of the gas model.
 *
 * @param gas  vapour model, for φsat and the volume of the saturated vapour
 * @source Krichevsky & Kasarnovsky, J. Am. Chem. Soc. 57 (1935) 2168; Prausnitz, Lichtenthaler & Azevedo,
 *   Molecular Thermodynamics of Fluid-Phase Equilibria, 3rd ed., ch. 3 and 10; mixed solvents:
 *   J. P. O'Connell & J. M. Prausnitz, Ind. Eng. Chem. Fundam. 3 (1964) 347; critical temperature of a
 *   mixture: W. B. Kay, Ind. Eng. Chem. 28 (1936) 1014
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
      .map((s) => ({ s, henry: henryConstant(components[s].id, components[i].id) }))
      .filter((pair): pair is { s: number; henry: HenryConstant } => pair.henry !== undefined),
  );
  const activity = createActivityModel(components, condensables);
  const pressureActs = gas.name !== 'ideal';
  const criticalK = components.map((c) => c.critical?.temperatureK ?? Number.POSITIVE_INFINITY);
  const lnGamma = new Float64Array(size);
  // Of each condensable at the present T and P: ln f of the pure liquid, Psat [Pa], its slope [Pa/K], volume, enthalpy.
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
      const c = components[i];
      const lnPsat = lnVapourPressure(c, T);
      psat[i] = Math.exp(lnPsat);
      const v = liquidVolume(c, T);
      // A user's component may come without any: then pressure does not act on its liquid.
      volume[i] = Number.isNaN(v) ? 0 : v;
      lnPure[i] = lnPsat + gas.pureLnPhi(i, T, psat[i]);
      if (pressureActs) lnPure[i] += (volume[i] * (P - psat[i])) / (R * T);
    }
  }

  function condensableEnthalpies(): void {
    if (enthalpyAtT === T && enthalpyAtP === P) return;
    enthalpyAtT = T;
    enthalpyAtP = P;
    for (const i of condensables) {
      const c = components[i];
      const v = volume[i];
      const p = psat[i];
      psatSlope[i] = p * lnVapourPressureSlope(c, T);
      const Z = saturatedGasCompressibility(c, T) ?? gas.pureCompressibility(i, T, p);
      const vGas = (Z * R * T) / p;
      enthalpy[i] =
        gas.pureEnthalpyDeparture(i, T, p) -
        T * psatSlope[i] * (vGas - v) +
        (v === 0 || !pressureActs ? 0 : (v - T * liquidVolumeSlope(c, T)) * (P - p));
    }
  }

  /**
   * Sum of `term` over the solvents of dissolved gas number d, each with its share among them; `none` where
   * no solvent can be liquid. Above its critical temperature a component dissolves nothing: the Henry
   * constant carried on to there would have all the gas disappear in a trace of it.
   */
  function overSolvents(
    d: number,
    x: Float64Array,
    term: (share: number, s: number, h: HenryConstant) => number,
    none: number,
  ): number {
    const pairs = solvents[d];
    let count = 0;
    let total = 0;
    for (let k = 0; k < pairs.length; k++) {
      const { s } = pairs[k];
      if (T >= criticalK[s]) continue;
      count += 1;
      total += x[s];
    }
    if (count === 0) return none;
    let sum = 0;
    for (let k = 0; k < pairs.length; k++) {
      const { s, henry } = pairs[k];
      if (T >= criticalK[s]) continue;
      const share = total > 0 ? x[s] / total : 1 / count;
      if (share > 0) sum += term(share, s, henry);
    }
    return sum;
  }
  const lnHenryTerm = (share: number, s: number, h: HenryConstant) =>
    share * (lnHenry(h, T) + (partialVolume(h, T) * (P - psat[s])) / (R * T));
  const enthalpyTerm = (share: number, s: number, h: HenryConstant) => {
    const v = partialVolume(h, T);
    return (
      share *
      (-R * T * T * lnHenrySlope(h, T) +
        (v - T * partialVolumeSlope(h, T)) * (P - psat[s]) +
        T * v * psatSlope[s])
    );
  };
  const volumeTerm = (share: number, _s: number, h: HenryConstant) => share * partialVolume(h, T);

  const phase: Omit<LiquidPhase, 'byAmount'> = {
    roles,
    condensables,
    at,
    mayForm(temperatureK, z) {
      for (const i of condensables) if (z[i] > 0 && temperatureK < criticalK[i]) return true;
      return false;
    },
    isLiquid(temperatureK, x) {
      let room = 0;
      let solvent = 0;
      for (const i of condensables) {
        if (x[i] === 0) continue;
        room += x[i] * (criticalK[i] - temperatureK);
        solvent += x[i];
      }
      let solute = 0;
      for (const i of dissolved) solute += x[i];
      return room > 0 && solvent > solute;
    },
    lnFugacityPerFraction(x, out) {
      out.fill(Number.POSITIVE_INFINITY);
      if (activity) activity.lnGamma(T, x, lnGamma);
      for (const i of condensables) out[i] = lnPure[i] + lnGamma[i];
      for (let d = 0; d < dissolved.length; d++)
        out[dissolved[d]] = overSolvents(d, x, lnHenryTerm, Number.POSITIVE_INFINITY);
    },
    enthalpyOverIdealGas(x, out) {
      condensableEnthalpies();
      out.fill(0);
      if (activity) activity.lnGammaSlope(T, x, lnGamma);
      for (const i of condensables) out[i] = enthalpy[i] - R * T * T * lnGamma[i];
      for (let d = 0; d < dissolved.length; d++) out[dissolved[d]] = overSolvents(d, x, enthalpyTerm, 0);
    },
    volumes(x, out) {
      out.fill(0);
      for (const i of condensables) out[i] = volume[i];
      for (let d = 0; d < dissolved.length; d++) out[dissolved[d]] = overSolvents(d, x, volumeTerm, 0);
    },
  };
  return { ...phase, byAmount: createLiquidByAmount(size, condensables, phase) };
}

function indicesOf(roles: readonly Role[], wanted: Role): number[] {
  return roles.flatMap((role, i) => (role === wanted ? [i] : []));
}
