import type { Component } from '../model/component.ts';
import type { GasModelName, LiquidModelName } from '../model/flowsheet.ts';
import type { StreamState } from '../model/stream.ts';
import { type Caution, cautionsOf } from './cautions.ts';
import type { Role } from './component-roles.ts';
import { componentRoles, equationOfStateRoles } from './component-roles.ts';
import { R, STANDARD_PRESSURE_PA } from './constants.ts';
import { createCubicLiquid } from './cubic-liquid.ts';
import { createCubicSplit } from './cubic-split.ts';
import type { GasModel } from './gas-model.ts';
import { createCubicPhases, createGasModel } from './gas-models.ts';
import type { EnthalpyBasis, IdealGas } from './ideal-gas.ts';
import { createIdealGas } from './ideal-gas.ts';
import { createLiquidPhase, type LiquidPhase, type MovedVapourPressures } from './liquid-phase.ts';
import { createPhaseSplit, type PhaseSplit } from './phase-split.ts';
import { type UseOutside, usesOutside } from './ranges.ts';
import { solveState } from './solve-state.ts';
import { createStateSlopes, type FillStateSlopes } from './state-slopes.ts';

export interface MixtureSpec {
  readonly components: readonly Component[];
  readonly gas: GasModelName;
  /** how the liquid is computed; by vapour pressures and Henry constants where nothing is said */
  readonly liquid?: LiquidModelName;
  readonly dissolvedGases: boolean;
  readonly basis: EnthalpyBasis;
  /** ids that the user declared condensable; null for the rule of component-roles.ts */
  readonly condense?: readonly string[] | null;
  /** factors on the vapour pressures of `liquid: antoine`, shared with every mixture made from this one */
  readonly moved?: MovedVapourPressures;
}

/**
 * The property model of a flowsheet: one set of state functions that every block uses, so that energy closes.
 * Streams are changed in place; nothing is allocated per call.
 */
export interface Mixture {
  readonly spec: MixtureSpec;
  readonly components: readonly Component[];
  readonly size: number;
  readonly gas: GasModel;
  readonly idealGas: IdealGas;
  readonly roles: readonly Role[];
  /** From T, P and flows: the phases and the enthalpy. */
  settle(stream: StreamState): void;
  /** From T, P and flows: the phases alone; the enthalpy stays as it is. */
  settleLiquid(stream: StreamState): void;
  /** From T, P, flows and a given share of liquid: the enthalpy. */
  settlePhases(stream: StreamState): void;
  /** From P, flows and an enthalpy [W]: temperature and phases. An empty stream holds none. @throws PassTrouble outside 20–3500 K */
  settleAtEnthalpy(stream: StreamState, enthalpyW: number): void;
  /** From P, flows and an entropy [W/K]: temperature, phases and enthalpy. @throws PassTrouble as above */
  settleAtEntropy(stream: StreamState, entropyWPerK: number): void;
  /** Entropy of a settled stream; elements have their standard entropies [W/K] */
  entropy(stream: StreamState): number;
  /** Derivatives of a settled stream in its flows, T and P; false where it has none (see state-slopes.ts) */
  readonly slopes: FillStateSlopes;
  /** Volume flow of a settled stream [m3/s], solids left out */
  volume(stream: StreamState): number;
  /** Total flow of all components, solids included [mol/s] */
  total(stream: StreamState): number;
  /** Mass flow [kg/s] */
  mass(stream: StreamState): number;
  /** What a settled stream's liquid or gas asks of the data beyond their range, in plain sentences. */
  cautions(stream: StreamState): Caution[];
  /** The correlations that a settled stream is computed with outside their ranges. */
  usesOutside(stream: StreamState): UseOutside[];
  /** The same mixture with other condensables; the property data are shared. */
  withCondensables(condense: readonly string[]): Mixture;
}

/** Build the property model of a list of components. */
export function createMixture(spec: MixtureSpec): Mixture {
  const { components } = spec;
  const size = components.length;
  const idealGas = createIdealGas(components, spec.basis);
  const { gas, roles, liquidPhase, phases } = spec.liquid === 'eos' ? oneEquation(spec) : twoModels(spec);
  const molarMass = Float64Array.from(components, (c) => c.molarMassKgPerMol);
  const ideal = new Float64Array(size);
  const excess = new Float64Array(size);
  const lnLiquid = new Float64Array(size);
  const y = new Float64Array(size);
  const departure = { perKelvin: 0, perPascal: 0 };

  function total(stream: StreamState): number {
    let sum = 0;
    for (let i = 0; i < size; i++) sum += stream.flowsMolPerS[i];
    return sum;
  }

  /** Gas mole fractions into y; returns the gas flow [mol/s]. */
  function gasFractions(stream: StreamState): number {
    let total = 0;
    for (let i = 0; i < size; i++) {
      // A liquid a rounding error larger than the whole must not make a gas of negative fractions.
      y[i] = Math.max(stream.flowsMolPerS[i] - stream.liquidMolPerS[i], 0);
      total += y[i];
    }
    if (total > 0) for (let i = 0; i < size; i++) y[i] /= total;
    return total;
  }

  function holdsLiquid(stream: StreamState): boolean {
    for (let i = 0; i < size; i++) if (roles[i] !== 'solid' && stream.liquidMolPerS[i] > 0) return true;
    return false;
  }

  function enthalpy(stream: StreamState): number {
    const { temperatureK: T, pressurePa: P, flowsMolPerS, liquidMolPerS } = stream;
    idealGas.enthalpies(T, ideal);
    let sum = 0;
    for (let i = 0; i < size; i++) sum += flowsMolPerS[i] * ideal[i];
    const gasFlow = gasFractions(stream);
    if (gasFlow > 0) sum += gasFlow * gas.enthalpyDeparture(T, P, y);
    if (holdsLiquid(stream)) {
      liquidPhase.at(T, P);
      liquidPhase.enthalpyOverIdealGas(liquidMolPerS, excess);
      for (let i = 0; i < size; i++) if (roles[i] !== 'solid') sum += liquidMolPerS[i] * excess[i];
    }
    return sum;
  }

  function entropy(stream: StreamState): number {
    const { temperatureK: T, pressurePa: P, flowsMolPerS, liquidMolPerS } = stream;
    idealGas.entropies(T, ideal);
    let sum = 0;
    for (let i = 0; i < size; i++) sum += flowsMolPerS[i] * ideal[i];
    const gasFlow = gasFractions(stream);
    if (gasFlow > 0) {
      let mixing = Math.log(P / STANDARD_PRESSURE_PA);
      for (let i = 0; i < size; i++) if (y[i] > 0) mixing += y[i] * Math.log(y[i]);
      sum += gasFlow * (gas.entropyDeparture(T, P, y) - R * mixing);
    }
    if (holdsLiquid(stream)) sum += liquidEntropyOverIdealGas(T, P, liquidMolPerS);
    return sum;
  }

  /** S = (H − G)/T of the liquid, less the ideal gas at 1 bar: Σ nᵢ (Δhᵢ/T − R ln(fᵢ/P°)). */
  function liquidEntropyOverIdealGas(T: number, P: number, liquid: Float64Array): number {
    liquidPhase.at(T, P);
    liquidPhase.enthalpyOverIdealGas(liquid, excess);
    liquidPhase.lnFugacityPerFraction(liquid, lnLiquid);
    let total = 0;
    for (let i = 0; i < size; i++) if (roles[i] !== 'solid') total += liquid[i];
    let sum = 0;
    for (let i = 0; i < size; i++) {
      if (roles[i] === 'solid' || liquid[i] <= 0) continue;
      // A trace of a gas that does not dissolve (phase-split.ts) has no fugacity in the liquid and no weight.
      if (lnLiquid[i] === Number.POSITIVE_INFINITY) continue;
      const lnActivity = lnLiquid[i] + Math.log(liquid[i] / total / STANDARD_PRESSURE_PA);
      sum += liquid[i] * (excess[i] / T - R * lnActivity);
    }
    return sum;
  }

  /** ∂H/∂T of the stream settled last where it is clear gas (see PhaseSplit.isClear) [W/K]; NaN elsewhere. */
  function clearHeatCapacity(stream: StreamState): number {
    if (!phases.isClear()) return Number.NaN;
    const { temperatureK: T, pressurePa: P, flowsMolPerS } = stream;
    idealGas.heatCapacities(T, ideal);
    let sum = 0;
    for (let i = 0; i < size; i++) sum += flowsMolPerS[i] * ideal[i];
    const gasFlow = gasFractions(stream);
    gas.enthalpyDepartureSlopes(T, P, y, departure);
    return sum + gasFlow * departure.perKelvin;
  }

  function settlePhases(stream: StreamState): void {
    stream.enthalpyW = enthalpy(stream);
  }

  function settleLiquid(stream: StreamState): void {
    stream.vapourFraction = phases.split(
      stream.temperatureK,
      stream.pressurePa,
      stream.flowsMolPerS,
      stream.liquidMolPerS,
    );
  }

  function settle(stream: StreamState): void {
    settleLiquid(stream);
    stream.enthalpyW = enthalpy(stream);
  }

  return {
    spec,
    components,
    size,
    gas,
    idealGas,
    roles,
    settle,
    settleLiquid,
    settlePhases,
    settleAtEnthalpy: (stream, enthalpyW) => {
      solveState(stream, enthalpyW, 'enthalpy', settle, enthalpyOf, clearHeatCapacity);
      // The temperature is found to rounding; the enthalpy is what was asked for, so that balances close.
      if (total(stream) > 0) stream.enthalpyW = enthalpyW;
    },
    settleAtEntropy: (stream, entropyWPerK) =>
      solveState(stream, entropyWPerK, 'entropy', settle, entropy, clearHeatCapacity),
    entropy,
    slopes: createStateSlopes(idealGas, gas, liquidPhase),
    volume: (stream) => {
      const { temperatureK: T, pressurePa: P, liquidMolPerS } = stream;
      const gasFlow = gasFractions(stream);
      let sum = gasFlow > 0 ? (gasFlow * gas.compressibility(T, P, y) * R * T) / P : 0;
      if (holdsLiquid(stream)) {
        liquidPhase.at(T, P);
        liquidPhase.volumes(liquidMolPerS, excess);
        for (let i = 0; i < size; i++) if (roles[i] !== 'solid') sum += liquidMolPerS[i] * excess[i];
      }
      return sum;
    },
    total,
    mass: (stream) => {
      let sum = 0;
      for (let i = 0; i < size; i++) sum += stream.flowsMolPerS[i] * molarMass[i];
      return sum;
    },
    usesOutside: (stream) => usesOutside(stream, components, roles, spec.liquid ?? 'antoine'),
    cautions: (stream) => cautionsOf(stream, components, roles, spec.liquid ?? 'antoine'),
    withCondensables: (condense) => createMixture({ ...spec, condense }),
  };
}

function enthalpyOf(stream: StreamState): number {
  return stream.enthalpyW;
}

/** What gas and liquid are computed with. */
interface PhaseModels {
  readonly gas: GasModel;
  readonly roles: readonly Role[];
  readonly liquidPhase: LiquidPhase;
  readonly phases: PhaseSplit;
}

function twoModels({ components, gas: name, dissolvedGases, condense, moved }: MixtureSpec): PhaseModels {
  const gas = createGasModel(name, components);
  const roles = componentRoles(components, dissolvedGases, condense ?? null);
  const liquidPhase = createLiquidPhase(components, roles, gas, moved);
  return { gas, roles, liquidPhase, phases: createPhaseSplit(gas, liquidPhase) };
}

/** One equation of state for both phases. */
function oneEquation({ components, gas: name, dissolvedGases, condense }: MixtureSpec): PhaseModels {
  if (name === 'ideal') throw new Error('an ideal gas has no liquid: the reader refuses it');
  const { gas, liquid } = createCubicPhases(name, components);
  const roles = equationOfStateRoles(components, dissolvedGases, condense ?? null);
  const liquidPhase = createCubicLiquid(components, roles, liquid);
  return { gas, roles, liquidPhase, phases: createCubicSplit(components, gas, liquidPhase) };
}
