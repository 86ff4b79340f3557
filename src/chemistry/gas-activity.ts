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
}

export function createGasActivity(gas: GasModel, solids: readonly boolean[]): GasActivity {
  const size = solids.length;
  const inGas = Uint8Array.from(solids, (solid) => (solid ? 0 : 1));
  const y = new Float64Array(size);
  const real = gas.name !== 'ideal';
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
      for (let i = 0; i < size; i++) y[i] = inGas[i] === 1 ? amounts[i] / total : 0;
      gas.lnPhi(T, P, y, out);
    },
  };
}
