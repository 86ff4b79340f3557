import type { GasSlopes } from './gas-slopes.ts';
import type { LiquidSlopes } from './liquid-slopes.ts';
import type { StreamPhases } from './stream-phases.ts';

/** A pivot below this share of 1 is none: a pure component boils at one temperature only. */
const NO_PIVOT = 1e-11;

/**
 * How the liquid of a stream in two phases moves with flows, T and P, by the implicit function theorem on
 *   ln(lᵢ/L) + ln(fᵢ/xᵢ) = ln(gᵢ/G) + ln φᵢ + ln P,  g = n − l,
 * each row multiplied by lᵢ gᵢ/nᵢ, so that a component which does not flow, or is in one phase only, needs no case
 * of its own: its row becomes dlᵢ = θᵢ dnᵢ with the share θᵢ that is liquid.
 *
 * @param gas,liquid  set to the phases
 * @param slopes  written: size rows of size + 2
 * @returns false where the equations have no single answer
 */
export function createSplitSlopes(size: number) {
  const width = size + 2;
  const matrix = new Float64Array(size * size);

  return (
    P: number,
    { flows, solid, g, l, G, L, theta }: StreamPhases,
    gas: GasSlopes,
    liquid: LiquidSlopes,
    slopes: Float64Array,
  ): boolean => {
    matrix.fill(0);
    slopes.fill(0);
    for (let i = 0; i < size; i++) {
      matrix[i * size + i] = 1;
      slopes[i * width + i] = theta[i];
      const weight = flows[i] > 0 ? (l[i] * g[i]) / flows[i] : 0;
      if (weight === 0) continue;
      for (let j = 0; j < size; j++) {
        if (solid[j]) continue;
        const ofGas = (gas.byAmount[i * size + j] - 1) / G;
        matrix[i * size + j] += weight * ((liquid.byAmount[i * size + j] - 1) / L + ofGas);
        slopes[i * width + j] += weight * ofGas;
      }
      slopes[i * width + size] = weight * (gas.perKelvin[i] - liquid.perKelvin[i]);
      slopes[i * width + size + 1] = weight * (gas.perPascal[i] + 1 / P - liquid.perPascal[i]);
    }
    return solveColumns(matrix, slopes, size, width);
  };
}

/** Gaussian elimination with row pivoting; every column of `right` becomes the answer to itself. */
function solveColumns(matrix: Float64Array, right: Float64Array, size: number, columns: number): boolean {
  for (let k = 0; k < size; k++) {
    let pivot = k;
    for (let i = k + 1; i < size; i++) {
      if (Math.abs(matrix[i * size + k]) > Math.abs(matrix[pivot * size + k])) pivot = i;
    }
    if (!(Math.abs(matrix[pivot * size + k]) > NO_PIVOT)) return false;
    if (pivot !== k) {
      swapRows(matrix, size, k, pivot);
      swapRows(right, columns, k, pivot);
    }
    for (let i = k + 1; i < size; i++) {
      const factor = matrix[i * size + k] / matrix[k * size + k];
      if (factor === 0) continue;
      for (let j = k; j < size; j++) matrix[i * size + j] -= factor * matrix[k * size + j];
      for (let j = 0; j < columns; j++) right[i * columns + j] -= factor * right[k * columns + j];
    }
  }
  for (let k = size - 1; k >= 0; k--) {
    for (let j = 0; j < columns; j++) {
      let sum = right[k * columns + j];
      for (let i = k + 1; i < size; i++) sum -= matrix[k * size + i] * right[i * columns + j];
      right[k * columns + j] = sum / matrix[k * size + k];
    }
  }
  return true;
}

function swapRows(rows: Float64Array, width: number, first: number, second: number): void {
  for (let j = 0; j < width; j++) {
    const kept = rows[first * width + j];
    rows[first * width + j] = rows[second * width + j];
    rows[second * width + j] = kept;
  }
}
