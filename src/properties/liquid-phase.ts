import type { Component } from '../model/component.ts';
import { createActivityModel } from './activity.ts';
import type { Role } from './component-roles.ts';
import { R } from './constants.ts';
import type { GasModel } from './gas-model.ts';
import type { HenryConstant } from './henry.ts';
import { henryConstant, lnHenry, lnHenrySlope, partialVolume, partialVolumeSlope } from './henry.ts';
import { createLiquidByAmount } from './liquid-by-amount.ts';
import { liquidVolume, liquidVolumeSlope } from './liquid-volume.ts';
import { type Kept, keepRecent } from './recent.ts';
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
  /** false where fugacities per fraction are the same at every composition */
  readonly compositionActs: boolean;
  /** index of the one component that a liquid can hold; -1 where there may be several */
  readonly pureCondensate: number;
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

/** Factors on the vapour pressures that a study moves. */
export interface MovedVapourPressures {
  /** ln of the factor of every component, 0 as the data say */
  readonly lnFactors: Float64Array;
  /** how often they were moved; what was worked out before the last move no longer holds */
  moves: number;
}

/** States that are kept: those of a pass, and those beside one that its derivatives are taken from. */
const KEPT = 8;

/** What a temperature and a pressure make of each condensable and of each Henry constant. */
interface LiquidState {
  /** saturation pressure [Pa] and its slope [Pa/K]; of the pure liquid volume, ln f at P, enthalpy over the ideal gas */
  readonly psat: Float64Array;
  readonly psatSlope: Float64Array;
  readonly volume: Float64Array;
  readonly lnPure: Float64Array;
  readonly enthalpy: Float64Array;
  /** ln H at P, partial volume, enthalpy over that of the ideal gas */
  readonly lnHenryAtP: Float64Array;
  readonly gasVolume: Float64Array;
  readonly gasEnthalpy: Float64Array;
  /** the slopes and enthalpies are filled in */
  enthalpiesKnown: boolean;
}

function room(size: number, constants: number): LiquidState & Kept {
  const array = (length: number) => new Float64Array(length);
  return {
    first: Number.NaN,
    second: Number.NaN,
    spared: false,
    psat: array(size),
    psatSlope: array(size),
    volume: array(size),
    lnPure: array(size),
    enthalpy: array(size),
    lnHenryAtP: array(constants),
    gasVolume: array(constants),
    gasEnthalpy: array(constants),
    enthalpiesKnown: false,
  };
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
 * @param moved  factors on the vapour pressures; being constants they leave the heat of vaporisation as it is
 * @source Krichevsky & Kasarnovsky, J. Am. Chem. Soc. 57 (1935) 2168; Prausnitz, Lichtenthaler & Azevedo,
 *   Molecular Thermodynamics of Fluid-Phase Equilibria, 3rd ed., ch. 3 and 10; mixed solvents:
 *   J. P. O'Connell & J. M. Prausnitz, Ind. Eng. Chem. Fundam. 3 (1964) 347; critical temperature of a
 *   mixture: W. B. Kay, Ind. Eng. Chem. 28 (1936) 1014
 */
export function createLiquidPhase(
  components: readonly Component[],
  roles: readonly Role[],
  gas: GasModel,
  moved: MovedVapourPressures | null = null,
): LiquidPhase {
  const size = components.length;
  // Typed arrays and fields instead of lists, closures and variables: a pass asks for all this some twenty times.
  const condensables = indicesOf(roles, 'condensable');
  const dissolved = Int32Array.from(indicesOf(roles, 'dissolved'));
  const known = Array.from(dissolved, (i) =>
    condensables
      .map((s) => ({ s, henry: henryConstant(components[s].id, components[i].id) }))
      .filter((pair): pair is { s: number; henry: HenryConstant } => pair.henry !== undefined),
  );
  // The Henry constants of dissolved gas number d are firstPair[d] to firstPair[d + 1] − 1.
  const pairs = known.flat();
  const solvent = Int32Array.from(pairs, ({ s }) => s);
  const firstPair = Int32Array.of(0, ...known.map((_, d) => known.slice(0, d + 1).flat().length));
  const activity = createActivityModel(components, condensables);
  const pressureActs = gas.name !== 'ideal';
  const criticalK = Float64Array.from(
    components,
    (c) => c.critical?.temperatureK ?? Number.POSITIVE_INFINITY,
  );
  const lnGamma = new Float64Array(size);
  const keep = () => keepRecent(KEPT, () => room(size, pairs.length), setState);
  let states = keep();
  let moves = 0;
  let now = states(298.15, 1e5);

  function setState(state: LiquidState & Kept): void {
    const { first: T, second: P, psat, volume, lnPure, lnHenryAtP, gasVolume } = state;
    state.enthalpiesKnown = false;
    for (let c = 0; c < condensables.length; c++) {
      const i = condensables[c];
      const lnPsat = lnVapourPressure(components[i], T) + (moved === null ? 0 : moved.lnFactors[i]);
      psat[i] = Math.exp(lnPsat);
      const v = liquidVolume(components[i], T);
      // A user's component may come without any: then pressure does not act on its liquid.
      volume[i] = Number.isNaN(v) ? 0 : v;
      lnPure[i] = lnPsat + gas.pureLnPhi(i, T, psat[i]);
      if (pressureActs) lnPure[i] += (volume[i] * (P - psat[i])) / (R * T);
    }
    const lnT = Math.log(T);
    for (let k = 0; k < pairs.length; k++) {
      gasVolume[k] = partialVolume(pairs[k].henry, T);
      lnHenryAtP[k] = lnHenry(pairs[k].henry, T, lnT) + (gasVolume[k] * (P - psat[solvent[k]])) / (R * T);
    }
  }

  function setEnthalpies(): void {
    if (now.enthalpiesKnown) return;
    now.enthalpiesKnown = true;
    const { first: T, second: P, psat, psatSlope, volume, enthalpy, gasVolume, gasEnthalpy } = now;
    for (let n = 0; n < condensables.length; n++) {
      const i = condensables[n];
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
    for (let k = 0; k < pairs.length; k++) {
      const { henry } = pairs[k];
      const s = solvent[k];
      const v = gasVolume[k];
      gasEnthalpy[k] =
        -R * T * T * lnHenrySlope(henry, T) +
        (v - T * partialVolumeSlope(henry, T)) * (P - psat[s]) +
        T * v * psatSlope[s];
    }
  }

  /**
   * Writes for each dissolved gas the mean of what its Henry constants say (`of`), each with the share of its solvent
   * among them; `none` where no solvent can be liquid. Above its critical temperature a component dissolves
   * nothing: the Henry constant carried on to there would have all the gas disappear in a trace of it.
   */
  function overSolvents(x: Float64Array, of: Float64Array, none: number, out: Float64Array): void {
    for (let d = 0; d < dissolved.length; d++) {
      let count = 0;
      let total = 0;
      for (let k = firstPair[d]; k < firstPair[d + 1]; k++) {
        if (now.first >= criticalK[solvent[k]]) continue;
        count += 1;
        total += x[solvent[k]];
      }
      let sum = count === 0 ? none : 0;
      for (let k = firstPair[d]; k < firstPair[d + 1]; k++) {
        if (now.first >= criticalK[solvent[k]]) continue;
        const share = total > 0 ? x[solvent[k]] / total : 1 / count;
        if (share > 0) sum += share * of[k];
      }
      out[dissolved[d]] = sum;
    }
  }

  const phase: Omit<LiquidPhase, 'byAmount'> = {
    roles,
    condensables,
    pureCondensate: condensables.length === 1 && dissolved.length === 0 ? condensables[0] : -1,
    compositionActs: activity !== null || (condensables.length > 1 && dissolved.length > 0),
    at(T, P) {
      if (moved !== null && moved.moves !== moves) {
        moves = moved.moves;
        states = keep();
      }
      now = states(T, P);
    },
    mayForm(T, z) {
      for (let c = 0; c < condensables.length; c++) {
        const i = condensables[c];
        if (z[i] > 0 && T < criticalK[i]) return true;
      }
      return false;
    },
    isLiquid(T, x) {
      let room = 0;
      let ofSolvents = 0;
      for (let c = 0; c < condensables.length; c++) {
        const i = condensables[c];
        if (x[i] === 0) continue;
        room += x[i] * (criticalK[i] - T);
        ofSolvents += x[i];
      }
      let ofSolutes = 0;
      for (let d = 0; d < dissolved.length; d++) ofSolutes += x[dissolved[d]];
      return room > 0 && ofSolvents > ofSolutes;
    },
    lnFugacityPerFraction(x, out) {
      out.fill(Number.POSITIVE_INFINITY);
      if (activity) activity.lnGamma(now.first, x, lnGamma);
      for (let c = 0; c < condensables.length; c++) {
        const i = condensables[c];
        out[i] = now.lnPure[i] + lnGamma[i];
      }
      overSolvents(x, now.lnHenryAtP, Number.POSITIVE_INFINITY, out);
    },
    enthalpyOverIdealGas(x, out) {
      setEnthalpies();
      out.fill(0);
      const T = now.first;
      if (activity) activity.lnGammaSlope(T, x, lnGamma);
      for (let c = 0; c < condensables.length; c++) {
        const i = condensables[c];
        out[i] = now.enthalpy[i] - R * T * T * lnGamma[i];
      }
      overSolvents(x, now.gasEnthalpy, 0, out);
    },
    volumes(x, out) {
      out.fill(0);
      for (let c = 0; c < condensables.length; c++) out[condensables[c]] = now.volume[condensables[c]];
      overSolvents(x, now.gasVolume, 0, out);
    },
  };
  return { ...phase, byAmount: createLiquidByAmount(size, condensables, phase) };
}

function indicesOf(roles: readonly Role[], wanted: Role): number[] {
  return roles.flatMap((role, i) => (role === wanted ? [i] : []));
}
