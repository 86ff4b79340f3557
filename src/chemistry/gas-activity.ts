import type { GasModel } from '../properties/gas-model.ts';

/** ln φ of the gas for amounts instead of mole fractions; keeps its own work space. */
export interface GasActivity {
  /** false for the ideal gas, whose ln φ are all 0 */
  readonly real: boolean;
  /** 1 for what is in the gas, 0 for solids */
  readonly inGas: Uint8Array;
  /** total amount of gas */
  total(amounts: Float64Array): number;
  /** ln φ written into `out`, solids 0 */
  lnPhi(T: number, P: number, amounts: Float64Array, total: number, out: Float64Array): void;
  /**
   * Slopes of ln φ, solids 0: total · ∂ln φ_i/∂n_j by rows, ∂ln φ_i/∂T [1/K] and ∂ln φ_i/∂P [1/Pa].
   */
  lnPhiSlopes(
    T: number,
    P: number,
    amounts: Float64Array,
    total: number,
    byAmount: Float64Array,
    perKelvin: Float64Array,
    perPascal: Float64Array,
  ): void;
}

export function createGasActivity(gas: GasModel, solids: readonly boolean[]): GasActivity {
  const size = solids.length;
  const inGas = Uint8Array.from(solids, (solid) => (solid ? 0 : 1));
  const y = new Float64Array(size);
  const real = gas.name !== 'ideal';

  function setFractions(amounts: Float64Array, total: number): void {
    for (let i = 0; i < size; i++) y[i] = inGas[i] === 1 ? amounts[i] / total : 0;
  }

  return {
    real,
    inGas,
    total(amounts) {
      let sum = 0;
      for (let i = 0; i < size; i++) if (inGas[i] === 1) sum += amounts[i];
      return sum;
    },
    lnPhi(T, P, amounts, total, out) {
      if (!real) {
        out.fill(0);
        return;
      }
      setFractions(amounts, total);
      gas.lnPhi(T, P, y, out);
    },
    lnPhiSlopes(T, P, amounts, total, byAmount, perKelvin, perPascal) {
      setFractions(amounts, total);
      gas.lnPhiSlopes(T, P, y, perKelvin, perPascal);
      gas.lnPhiByAmount(T, P, y, byAmount);
    },
  };
}
