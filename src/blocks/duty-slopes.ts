import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { stateSlopes } from '../properties/state-slopes.ts';
import { followPressure, keepFlows, temperatureAt } from './outlet-slopes.ts';

/** What a stream that keeps its flows is settled at. */
export interface Settled {
  /** its temperature is set; otherwise it has the enthalpy of the inlet and a constant duty */
  readonly temperatureIsSet: boolean;
  /** its pressure is set; otherwise it is that of the inlet less a constant drop */
  readonly pressureIsSet: boolean;
}

/** Derivatives of a stream of heaters, valves and vessels in their one inlet. */
export interface DutySlopes {
  /** of the stream's liquid in its own variables, after `fill` for a stream that is to be parted */
  readonly liquid: Float64Array;
  /** @returns false where there are none */
  fill(inlet: StreamState, stream: StreamState, how: Settled, parted: boolean, matrix: Float64Array): boolean;
}

/** @param upstream  the mixture that the inlet was settled with, where it is another */
export function createDutySlopes(mixture: Mixture, upstream = mixture): DutySlopes {
  const { size } = mixture;
  const before = stateSlopes(size);
  const after = stateSlopes(size);
  return {
    liquid: after.liquid,
    fill(inlet, stream, how, parted, matrix) {
      keepFlows(matrix, size);
      if (!how.pressureIsSet) followPressure(matrix, size);
      if (how.temperatureIsSet) return !parted || mixture.slopes(stream, 'liquid', after);
      return (
        upstream.slopes(inlet, 'enthalpy', before) &&
        mixture.slopes(stream, 'enthalpy', after) &&
        temperatureAt(after.enthalpy, before.enthalpy, matrix)
      );
    },
  };
}
