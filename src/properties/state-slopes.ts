import type { StreamState } from '../model/stream.ts';
import { R, STANDARD_PRESSURE_PA } from './constants.ts';
import type { GasModel } from './gas-model.ts';
import { createGasSlopes } from './gas-slopes.ts';
import type { IdealGas } from './ideal-gas.ts';
import type { LiquidPhase } from './liquid-phase.ts';
import { createLiquidSlopes } from './liquid-slopes.ts';
import { createSplitSlopes } from './split-slopes.ts';
import { createPhaseReader } from './stream-phases.ts';

/** Derivatives of the state functions of a stream in its flows [mol/s], T [K] and P [Pa], in this order. */
export interface StateSlopes {
  /** of the liquid, solids included: a row of size + 2 by component, row by row */
  readonly liquid: Float64Array;
  /** of the enthalpy [J/mol, W/K, W/Pa] */
  readonly enthalpy: Float64Array;
  /** of the entropy [J/(mol K), W/K², W/(K Pa)] */
  readonly entropy: Float64Array;
}

/** Room for the derivatives of a stream of `size` components. */
export function stateSlopes(size: number): StateSlopes {
  return {
    liquid: new Float64Array(size * (size + 2)),
    enthalpy: new Float64Array(size + 2),
    entropy: new Float64Array(size + 2),
  };
}

/** Stands for a fraction of 0 where its logarithm is asked for; it drops out between inlet and outlet. */
const TRACE = 1e-200;
/** Keeps the logarithm of what is in one phase only finite: it is asked for and then has no weight. */
const SMALLEST = 1e-300;

/** Two phases whose fugacities differ by more than this are the mixed sides of a jump (see solve-state.ts) [-]. */
const IN_EQUILIBRIUM = 1e-7;

/** Which derivatives are asked for: those of the liquid alone, with those of the enthalpy, or all. */
export type WantedSlopes = 'liquid' | 'enthalpy' | 'all';

/** Fill in the derivatives of a settled stream that are asked for; false where it has none. */
export type FillStateSlopes = (stream: StreamState, what: WantedSlopes, slopes: StateSlopes) => boolean;

/**
 * Derivatives of phases, enthalpy and entropy of a stream in equilibrium, on the side of a phase boundary on which
 * it stands: gas alone, liquid alone, or both. With g = n − l and dl of split-slopes.ts,
 *   dH = Σ hᵢ(ideal gas) dnᵢ + Cp dT + d(departure of the gas g) + d(departure of the liquid l),
 * and S in the same way. An empty stream has none, nor has a pure component that boils, or two phases that are
 * not in equilibrium.
 */
export function createStateSlopes(
  idealGas: IdealGas,
  gasModel: GasModel,
  liquidPhase: LiquidPhase,
): FillStateSlopes {
  const { size } = idealGas;
  const width = size + 2;
  const gas = createGasSlopes(gasModel);
  const liquid = createLiquidSlopes(liquidPhase);
  const splitSlopes = createSplitSlopes(size);
  const { phases, read } = createPhaseReader(liquidPhase.roles);
  const { solid, flows, g, l, y, theta } = phases;
  const ideal = new Float64Array(size);
  // What one more mole of each brings in the gas and in the liquid, above the ideal gas at 1 bar.
  const inGas = new Float64Array(size);
  const inLiquid = new Float64Array(size);

  return (stream, what, slopes) => {
    if (!read(stream)) return false;
    const { temperatureK: T, pressurePa: P } = stream;
    const both = phases.G > 0 && phases.L > 0;
    const more = what !== 'liquid';
    if (phases.G > 0 && (both || more)) gas.setFugacities(T, P, y, both);
    if (phases.L > 0 && (both || more)) liquid.set(T, P, l);
    if (!fillLiquid(P, both, slopes.liquid)) return false;
    if (!more) return true;
    if (phases.G > 0) gas.setDeparture(T, P, y);
    idealGas.heatCapacities(T, ideal);
    let heatCapacity = 0;
    for (let i = 0; i < size; i++) heatCapacity += flows[i] * ideal[i];
    fillEnthalpy(T, heatCapacity, slopes);
    if (what === 'all') fillEntropy(T, P, heatCapacity, slopes);
    return true;
  };

  function fillLiquid(P: number, both: boolean, out: Float64Array): boolean {
    if (!both) {
      out.fill(0);
      for (let i = 0; i < size; i++) out[i * width + i] = theta[i];
      return true;
    }
    const lnP = Math.log(P);
    for (let i = 0; i < size; i++) {
      if (solid[i]) continue;
      if (flows[i] === 0) {
        const K = Math.exp(liquid.lnFugacity[i] - gas.lnPhi[i] - lnP);
        theta[i] = phases.L / (phases.L + phases.G * K);
      } else if (l[i] > 0 && g[i] > 0) {
        const lnRatio = Math.log((l[i] * phases.G) / (g[i] * phases.L));
        if (!(Math.abs(lnRatio + liquid.lnFugacity[i] - gas.lnPhi[i] - lnP) < IN_EQUILIBRIUM)) return false;
      }
    }
    return splitSlopes(P, phases, gas, liquid, out);
  }

  function fillEnthalpy(T: number, heatCapacity: number, slopes: StateSlopes): void {
    for (let i = 0; i < size; i++) {
      inGas[i] = phases.G > 0 ? -R * T * T * gas.perKelvin[i] : 0;
      inLiquid[i] = phases.L > 0 ? liquid.enthalpies[i] : 0;
    }
    idealGas.enthalpies(T, ideal);
    spread(slopes.liquid, slopes.enthalpy);
    slopes.enthalpy[size] += heatCapacity + phases.G * gas.departure.perKelvin;
    slopes.enthalpy[size + 1] += phases.G * gas.departure.perPascal;
    if (phases.L === 0) return;
    slopes.enthalpy[size] += liquid.total.perKelvin;
    slopes.enthalpy[size + 1] += liquid.total.perPascal;
  }

  function fillEntropy(T: number, P: number, heatCapacity: number, slopes: StateSlopes): void {
    const lnBar = Math.log(P / STANDARD_PRESSURE_PA);
    for (let i = 0; i < size; i++) {
      inGas[i] = phases.G > 0 ? gasEntropy(i, T, lnBar) : 0;
      inLiquid[i] = phases.L > 0 ? liquidEntropy(i, T) : 0;
    }
    idealGas.entropies(T, ideal);
    spread(slopes.liquid, slopes.entropy);
    let perKelvin = (heatCapacity + phases.G * gas.departure.perKelvin) / T;
    let perPascal = 0;
    if (phases.G > 0) {
      let volume = 1 / P;
      for (let i = 0; i < size; i++) volume += y[i] * gas.perPascal[i];
      perPascal += phases.G * (gas.departure.perPascal / T - R * volume);
    }
    if (phases.L > 0) {
      const { total } = liquid;
      perKelvin += total.perKelvin / T - total.enthalpy / (T * T);
      perPascal += total.perPascal / T;
      for (let i = 0; i < size; i++) {
        perKelvin -= R * l[i] * liquid.perKelvin[i];
        perPascal -= R * l[i] * liquid.perPascal[i];
      }
    }
    slopes.entropy[size] += perKelvin;
    slopes.entropy[size + 1] += perPascal;
  }

  /** Partial molar, above the ideal gas at 1 bar [J/(mol K)]; the departure is (h − g)/T. */
  function gasEntropy(i: number, T: number, lnBar: number): number {
    if (solid[i]) return 0;
    const fraction = flows[i] > 0 ? y[i] : (1 - theta[i]) * TRACE * (1 + phases.L / phases.G);
    return -R * (T * gas.perKelvin[i] + gas.lnPhi[i] + lnBar + Math.log(Math.max(fraction, SMALLEST)));
  }

  /** The same of the liquid, where S = Σ lᵢ (hᵢ/T − R ln(fᵢ/P°)). */
  function liquidEntropy(i: number, T: number): number {
    if (solid[i] || liquid.lnFugacity[i] === Number.POSITIVE_INFINITY) return 0;
    const fraction = flows[i] > 0 ? l[i] / phases.L : theta[i] * TRACE * (1 + phases.G / phases.L);
    let composition = 0;
    for (let k = 0; k < size; k++) composition += l[k] * liquid.byAmount[k * size + i];
    const lnActivity = liquid.lnFugacity[i] + Math.log(Math.max(fraction, SMALLEST) / STANDARD_PRESSURE_PA);
    return liquid.enthalpies[i] / T - R * (lnActivity + composition / phases.L);
  }

  /** What one more mole of each, one kelvin and one pascal bring by the ideal gas and by the phases they move. */
  function spread(ofLiquid: Float64Array, out: Float64Array): void {
    for (let j = 0; j < width; j++) {
      let sum = j < size ? ideal[j] + inGas[j] : 0;
      for (let i = 0; i < size; i++) {
        const part = ofLiquid[i * width + j];
        if (part !== 0) sum += part * (inLiquid[i] - inGas[i]);
      }
      out[j] = sum;
    }
  }
}
