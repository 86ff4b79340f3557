import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { stateSlopes } from '../properties/state-slopes.ts';
import type { ReactionRun } from './reaction-run.ts';

/**
 * Derivatives on their way through adiabatic reactors. As no bed changes it, the enthalpy stands in the place of the
 * temperature: every matrix has rows of the flows, the enthalpy and the pressure, and columns of an inlet's flows,
 * temperature and pressure. Each method is false where there are none.
 */
export interface EnthalpySlopes {
  /** The derivatives of a settled stream in its own variables. */
  enter(stream: StreamState, matrix: Float64Array): boolean;
  /** The stream is brought to a set temperature at which it stands now. */
  setTemperature(stream: StreamState, matrices: readonly Float64Array[]): boolean;
  /** The stream has reacted to `out`, at the enthalpy that it had. */
  react(run: ReactionRun, out: StreamState, matrices: readonly Float64Array[]): boolean;
  /** The same, with the temperature of `out` in the place of its enthalpy. */
  reactAndLeave(run: ReactionRun, out: StreamState, matrices: readonly Float64Array[]): boolean;
}

/** @see EnthalpySlopes; the work space is kept. */
export function createEnthalpySlopes(mixture: Mixture): EnthalpySlopes {
  const { size } = mixture;
  const width = size + 2;
  const state = stateSlopes(size);
  const { enthalpy } = state;
  const reacted = new Float64Array(size * width);
  /** what a mole of feed, a kelvin and a pascal add to the enthalpy of the outlet, its reactions following */
  const held = new Float64Array(width);
  const fed = new Float64Array(width);

  function setHeld(): void {
    for (let j = 0; j < width; j++) {
      let sum = j < size ? 0 : enthalpy[j];
      for (let i = 0; i < size; i++) sum += enthalpy[i] * reacted[i * width + j];
      held[j] = sum;
    }
  }

  function carry(matrix: Float64Array, leaves: boolean): void {
    for (let k = 0; k < width; k++) {
      for (let j = 0; j < width; j++) fed[j] = matrix[j * width + k];
      let missing = fed[size] - held[size + 1] * fed[size + 1];
      for (let j = 0; j < size; j++) missing -= held[j] * fed[j];
      const kelvin = missing / held[size];
      if (leaves) matrix[size * width + k] = kelvin;
      fed[size] = kelvin;
      for (let i = 0; i < size; i++) {
        let sum = 0;
        for (let j = 0; j < width; j++) sum += reacted[i * width + j] * fed[j];
        matrix[i * width + k] = sum;
      }
    }
  }

  function through(
    run: ReactionRun,
    out: StreamState,
    matrices: readonly Float64Array[],
    leaves: boolean,
  ): boolean {
    if (!run.slopes(out.temperatureK, out.pressurePa, reacted)) return false;
    if (!mixture.slopes(out, 'enthalpy', state)) return false;
    setHeld();
    if (!(held[size] > 0)) return false;
    for (const matrix of matrices) carry(matrix, leaves);
    return true;
  }

  return {
    enter(stream, matrix) {
      if (!mixture.slopes(stream, 'enthalpy', state)) return false;
      matrix.fill(0);
      for (let i = 0; i < size; i++) matrix[i * width + i] = 1;
      matrix.set(enthalpy, size * width);
      matrix[width * width - 1] = 1;
      return true;
    },
    setTemperature(stream, matrices) {
      if (!mixture.slopes(stream, 'enthalpy', state)) return false;
      for (const matrix of matrices) {
        for (let k = 0; k < width; k++) {
          let sum = enthalpy[size + 1] * matrix[(size + 1) * width + k];
          for (let j = 0; j < size; j++) sum += enthalpy[j] * matrix[j * width + k];
          matrix[size * width + k] = sum;
        }
      }
      return true;
    },
    react: (run, out, matrices) => through(run, out, matrices, false),
    reactAndLeave: (run, out, matrices) => through(run, out, matrices, true),
  };
}
