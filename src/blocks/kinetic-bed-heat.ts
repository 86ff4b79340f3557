import { R } from '../properties/constants.ts';
import type { Mixture } from '../properties/mixture.ts';

/** Coldest and hottest gas looked for inside a bed [K]. */
const COLDEST = 150;
const HOTTEST = 3000;
const MAX_STEPS = 40;

/** Temperature of a gas from its enthalpy, as often as an integrator asks. */
export interface GasHeat {
  /**
   * T at which the amounts, all of them gas, hold an enthalpy, by secants from `start`; held to 150–3000 K.
   * @param P [Pa]  @param amounts [mol/s]  @param enthalpyW formation enthalpies included [W]
   */
  temperature(start: number, P: number, amounts: Float64Array, enthalpyW: number): number;
  /** enthalpy of the amounts as gas [W] */
  enthalpy(T: number, P: number, amounts: Float64Array): number;
}

/** The same enthalpies as those of the mixture's streams, phases left out: nothing condenses in a bed. */
export function createGasHeat(mixture: Mixture): GasHeat {
  const { components, gas, idealGas, size } = mixture;
  const h = new Float64Array(size);
  const y = new Float64Array(size);
  const inGas = Uint8Array.from(components, (c) => (c.solid ? 0 : 1));

  function enthalpy(T: number, P: number, amounts: Float64Array): number {
    idealGas.enthalpies(T, h);
    let total = 0;
    let sum = 0;
    for (let i = 0; i < size; i++) {
      sum += amounts[i] * h[i];
      total += inGas[i] * amounts[i];
    }
    if (!(total > 0)) return sum;
    for (let i = 0; i < size; i++) y[i] = (inGas[i] * amounts[i]) / total;
    return sum + total * gas.enthalpyDeparture(T, P, y);
  }

  return {
    enthalpy,
    temperature(start, P, amounts, enthalpyW) {
      let flow = 0;
      for (let i = 0; i < size; i++) flow += amounts[i];
      if (!(flow > 0)) return start;
      // 1e-13 of the temperature for a gas with the heat capacity of a monatomic one
      const tolerance = 1e-13 * 2.5 * R * flow * start;
      let T = start;
      let error = enthalpy(T, P, amounts) - enthalpyW;
      idealGas.heatCapacities(T, h);
      let slope = 0;
      for (let i = 0; i < size; i++) slope += amounts[i] * h[i];
      for (let step = 0; step < MAX_STEPS && Math.abs(error) > tolerance; step++) {
        const next = Math.min(Math.max(T - error / slope, 0.7 * T, COLDEST), 1.4 * T, HOTTEST);
        if (next === T) break;
        const errorNext = enthalpy(next, P, amounts) - enthalpyW;
        const secant = (errorNext - error) / (next - T);
        // Rounding may spoil the secant of two neighbours; the heat capacity is never far from the last one.
        if (Math.abs(next - T) > 1e-9 * T && secant > 0) slope = secant;
        T = next;
        error = errorNext;
      }
      return T;
    },
  };
}
