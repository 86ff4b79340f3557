import type { GasModel } from './gas-model.ts';

/** Steps of the differences, relative [-]. */
const STEP = 1e-4;

/** A gas and how it moves, after `fugacities` and `departure`. */
export interface GasSlopes {
  readonly lnPhi: Float64Array;
  /** ∂ ln φᵢ/∂T [1/K], ∂ ln φᵢ/∂P [1/Pa], N ∂ ln φᵢ/∂nⱼ (see GasModel) */
  readonly perKelvin: Float64Array;
  readonly perPascal: Float64Array;
  readonly byAmount: Float64Array;
  /** of H − H(ideal gas), per mole [J/(mol K)], [J/(mol Pa)] */
  readonly departure: { perKelvin: number; perPascal: number };
  /** ln φ with its slopes in T and P, and where asked for in the amounts */
  setFugacities(T: number, P: number, y: Float64Array, byAmount: boolean): void;
  setDeparture(T: number, P: number, y: Float64Array): void;
}

/** Derivatives of a gas; those of its enthalpy by differences, whose second derivatives would be long. */
export function createGasSlopes(gas: GasModel): GasSlopes {
  const lnPhi = new Float64Array(gas.size);
  const perKelvin = new Float64Array(gas.size);
  const perPascal = new Float64Array(gas.size);
  const byAmount = new Float64Array(gas.size * gas.size);
  const departure = { perKelvin: 0, perPascal: 0 };
  return {
    lnPhi,
    perKelvin,
    perPascal,
    byAmount,
    departure,
    setFugacities(T, P, y, withAmounts) {
      gas.lnPhi(T, P, y, lnPhi);
      gas.lnPhiSlopes(T, P, y, perKelvin, perPascal);
      if (withAmounts) gas.lnPhiByAmount(T, P, y, byAmount);
    },
    setDeparture(T, P, y) {
      departure.perKelvin = 0;
      departure.perPascal = 0;
      if (gas.name === 'ideal') return;
      const H = gas.enthalpyDeparture;
      departure.perPascal = (H(T, P * (1 + STEP), y) - H(T, P * (1 - STEP), y)) / (2 * STEP * P);
      departure.perKelvin = (H(T * (1 + STEP), P, y) - H(T * (1 - STEP), P, y)) / (2 * STEP * T);
    },
  };
}
