import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { stateSlopes } from '../properties/state-slopes.ts';
import { along, temperatureAt } from './outlet-slopes.ts';

/** How a stage came from its suction to its discharge. */
export interface StagePath {
  readonly from: StreamState;
  /** the end of the isentrope; of no use with `polytropic` */
  readonly isentropic: StreamState;
  readonly to: StreamState;
  /** work over isentropic work, or the polytropic efficiency that the work has */
  readonly workRatio: number;
  readonly polytropic: number | null;
}

export interface StageSlopes {
  /**
   * Turn the derivatives of the suction into those of the discharge.
   *
   * @param matrix  in the variables of the inlet of the block, changed in place
   * @param pressure  the row of the discharge pressure
   * @returns false where there are none
   */
  carry(path: StagePath, matrix: Float64Array, pressure: Float64Array): boolean;
}

/**
 * Derivatives of one stage of a machine: from s(T₂s, P₂) = s₁ and h₂ = h₁ + (h₂s − h₁) times the ratio of the works, or
 * from the polytropic work, (1 − η)(h₂ − h₁) = (s₂ − s₁) (T₂ − T₁)/ln(T₂/T₁).
 */
export function createStageSlopes(mixture: Mixture): StageSlopes {
  const { size } = mixture;
  const width = size + 2;
  const first = stateSlopes(size);
  const middle = stateSlopes(size);
  const last = stateSlopes(size);
  const entropy = new Float64Array(width);
  const enthalpy = new Float64Array(width);
  const suctionK = new Float64Array(width);
  const value = new Float64Array(width);

  return {
    carry(path, matrix, pressure) {
      const atEnd = path.polytropic === null ? 'enthalpy' : 'all';
      if (!mixture.slopes(path.from, 'all', first) || !mixture.slopes(path.to, atEnd, last)) return false;
      along(first.entropy, matrix, entropy);
      along(first.enthalpy, matrix, enthalpy);
      suctionK.set(matrix.subarray(size * width, (size + 1) * width));
      matrix.set(pressure, (size + 1) * width);
      if (path.polytropic !== null) return polytropicDischarge(path, path.polytropic, matrix);
      if (!mixture.slopes(path.isentropic, 'all', middle)) return false;
      if (!temperatureAt(middle.entropy, entropy, matrix)) return false;
      along(middle.enthalpy, matrix, value);
      for (let c = 0; c < width; c++) value[c] = enthalpy[c] + path.workRatio * (value[c] - enthalpy[c]);
      return temperatureAt(last.enthalpy, value, matrix);
    },
  };

  function polytropicDischarge({ from, to }: StagePath, efficiency: number, matrix: Float64Array): boolean {
    const T1 = from.temperatureK;
    const T2 = to.temperatureK;
    const log = Math.log(T2 / T1);
    if (Math.abs(log) < 1e-6) return false;
    const rise = mixture.entropy(to) - mixture.entropy(from);
    const meanK = (T2 - T1) / log;
    const perT2 = (1 - meanK / T2) / log;
    const perT1 = (meanK / T1 - 1) / log;
    const lost = 1 - efficiency;
    const perKelvin = lost * last.enthalpy[size] - meanK * last.entropy[size] - rise * perT2;
    matrix.fill(0, size * width, (size + 1) * width);
    along(last.enthalpy, matrix, value);
    for (let c = 0; c < width; c++) value[c] = meanK * -entropy[c] - lost * (value[c] - enthalpy[c]);
    for (let r = 0; r < width; r++) {
      for (let c = 0; c < width; c++) value[c] += meanK * last.entropy[r] * matrix[r * width + c];
    }
    for (let c = 0; c < width; c++) {
      matrix[size * width + c] = (value[c] + rise * perT1 * suctionK[c]) / perKelvin;
    }
    return true;
  }
}
