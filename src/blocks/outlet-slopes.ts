/*
 * Pieces of `Unit.slopes`. A matrix holds the derivatives of a stream's variables in those of one inlet (see slopes.ts):
 * rows of the flows, then temperature, then pressure; `size` is the number of components. All come filled with zeros.
 */

/** The flows of the stream are a share of those of the inlet, or all. */
export function keepFlows(matrix: Float64Array, size: number, share = 1): void {
  for (let i = 0; i < size; i++) matrix[i * (size + 2) + i] = share;
}

export function keepTemperature(matrix: Float64Array, size: number): void {
  matrix[size * (size + 2) + size] = 1;
}

/** The pressure follows that of the inlet: 1 behind a pressure drop. */
export function followPressure(matrix: Float64Array, size: number, slope = 1): void {
  matrix[(size + 1) * (size + 2) + size + 1] = slope;
}

/**
 * Derivatives of a state function along a matrix, Σ (∂F/∂uᵣ) (row r of the matrix).
 *
 * @param slopes  of the function in the stream's own variables
 * @param out  written: in the variables of the inlet
 */
export function along(slopes: Float64Array, matrix: Float64Array, out: Float64Array): void {
  const width = slopes.length;
  out.fill(0);
  for (let r = 0; r < width; r++) {
    if (slopes[r] === 0) continue;
    for (let c = 0; c < width; c++) out[c] += slopes[r] * matrix[r * width + c];
  }
}

/**
 * Write the row of the temperature at which a state function F of the stream has a wanted value,
 *   dT = (dF − Σ ∂F/∂nᵢ dnᵢ − ∂F/∂P dP)/(∂F/∂T),
 * when the rows of flows and pressure are there.
 *
 * @param slopes  of F in the stream's own variables
 * @param wanted  of the wanted value in the variables of the inlet
 * @returns false where F does not rise with temperature
 */
export function temperatureAt(slopes: Float64Array, wanted: Float64Array, matrix: Float64Array): boolean {
  const width = slopes.length;
  const size = width - 2;
  if (!(slopes[size] > 0)) return false;
  for (let c = 0; c < width; c++) {
    let left = wanted[c];
    for (let r = 0; r < width; r++) if (r !== size) left -= slopes[r] * matrix[r * width + c];
    matrix[size * width + c] = left / slopes[size];
  }
  return true;
}

/**
 * Part a stream in equilibrium into gas and liquid.
 *
 * @param liquidSlopes  of the liquid in the stream's own variables (StateSlopes.liquid)
 * @param mixed  of the stream; `gas` and `liquid` are written
 */
export function partSlopes(
  liquidSlopes: Float64Array,
  size: number,
  mixed: Float64Array,
  gas: Float64Array,
  liquid: Float64Array,
): void {
  const width = size + 2;
  gas.set(mixed);
  liquid.set(mixed);
  for (let i = 0; i < size; i++) {
    for (let c = 0; c < width; c++) {
      let sum = 0;
      for (let r = 0; r < width; r++) sum += liquidSlopes[i * width + r] * mixed[r * width + c];
      liquid[i * width + c] = sum;
      gas[i * width + c] -= sum;
    }
  }
}
