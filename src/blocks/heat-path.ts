import { copyStream, emptyStream, type StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';

/** One stream on its way through an exchanger: its state at any share of the heat, counted from the cold end. */
export interface HeatPath {
  /** the two ends; flows of both are the same. Read, not kept: lay again when they change. */
  lay(coldEnd: StreamState, hotEnd: StreamState): void;
  /**
   * Settle the stream at a share x [0–1] of the heat; enthalpy and pressure run straight from end to end.
   * @returns its temperature [K]
   * @throws PassTrouble where no state has that enthalpy
   */
  at(x: number): number;
  /** the state settled last */
  readonly state: StreamState;
}

export function createHeatPath(mixture: Mixture): HeatPath {
  const cold = emptyStream(mixture.size);
  const hot = emptyStream(mixture.size);
  const state = emptyStream(mixture.size);
  return {
    state,
    lay(coldEnd, hotEnd) {
      copyStream(coldEnd, cold);
      copyStream(hotEnd, hot);
      copyStream(coldEnd, state);
    },
    at(x) {
      if (x <= 0) copyStream(cold, state);
      else if (x >= 1) copyStream(hot, state);
      else {
        state.pressurePa = cold.pressurePa + x * (hot.pressurePa - cold.pressurePa);
        mixture.settleAtEnthalpy(state, cold.enthalpyW + x * (hot.enthalpyW - cold.enthalpyW));
      }
      return state.temperatureK;
    },
  };
}

/** Where the phases of a stream change between samples of its path: where it starts or ends to boil or condense. */
export function phaseChanges(path: HeatPath, samples: readonly number[], tolerance: number): number[] {
  const found: number[] = [];
  const phaseAt = (x: number) => {
    path.at(x);
    return phaseOf(path.state);
  };
  let from = samples[0];
  let phase = phaseAt(from);
  for (const to of samples.slice(1)) {
    const phaseTo = phaseAt(to);
    // A narrow boiling range may lie between two samples as a whole: then two changes are found.
    while (phase !== phaseTo) {
      let [same, other] = [from, to];
      let next = phaseTo;
      while (other - same > tolerance) {
        const middle = 0.5 * (same + other);
        const phaseMiddle = phaseAt(middle);
        if (phaseMiddle === phase) same = middle;
        else [other, next] = [middle, phaseMiddle];
      }
      if (same > 0 && other < 1) found.push(same, other);
      from = other;
      phase = next;
    }
    from = to;
  }
  return found;
}

function phaseOf({ vapourFraction }: StreamState): 'gas' | 'liquid' | 'mixed' {
  if (vapourFraction >= 1) return 'gas';
  return vapourFraction <= 0 ? 'liquid' : 'mixed';
}

/** Shares 0, 1/n, 2/n ... 1. */
export function evenShares(n: number): number[] {
  return Array.from({ length: n + 1 }, (_, k) => k / n);
}

/** Shares from every list in ascending order, each once. */
export function inOrder(...lists: readonly (readonly number[])[]): number[] {
  return [...new Set(lists.flat())].sort((a, b) => a - b);
}
