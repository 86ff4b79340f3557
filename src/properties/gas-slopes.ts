import type { DepartureSlopes, GasModel } from './gas-model.ts';

/** A gas and how it moves, after `fugacities` and `departure`. */
export interface GasSlopes {
  readonly lnPhi: Float64Array;
  /** ∂ ln φᵢ/∂T [1/K], ∂ ln φᵢ/∂P [1/Pa], N ∂ ln φᵢ/∂nⱼ (see GasModel) */
  readonly perKelvin: Float64Array;
  readonly perPascal: Float64Array;
  readonly byAmount: Float64Array;
  /** of H − H(ideal gas), per mole [J/(mol K)], [J/(mol Pa)] */
  readonly departure: Readonly<DepartureSlopes>;
  /** ln φ with its slopes in T and P, and where asked for in the amounts */
  setFugacities(T: number, P: number, y: Float64Array, byAmount: boolean): void;
  setDeparture(T: number, P: number, y: Float64Array): void;
}

/** Derivatives of a gas, with room of their own. */
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
      gas.enthalpyDepartureSlopes(T, P, y, departure);
    },
  };
}
