import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { createHeatPath, evenShares, inOrder, phaseChanges } from './heat-path.ts';

/** Points of a curve, those where phases change left out. */
const INTERVALS = 12;
/** How closely the share of the heat at which phases change is found for a drawing. */
const DRAWN = 1e-4;

/** A stream's temperature against the heat given off, from its cold end: ready to be plotted. */
export interface HeatCurve {
  readonly heat_kW: readonly number[];
  readonly process_K: readonly number[];
}

/**
 * The heat curve of a stream that is heated or cooled alone, from 0 at its cold end, with the points at which
 * it starts and ends to condense or boil; null where the stream has no curve (nothing flows, no heat, or the
 * plant did not come to an answer).
 *
 * @param inlet,outlet  settled; the outlet all phases together
 */
export function heatCurve(inlet: StreamState, outlet: StreamState, mixture: Mixture): HeatCurve | null {
  const [cold, hot] = inlet.enthalpyW > outlet.enthalpyW ? [outlet, inlet] : [inlet, outlet];
  const heatW = hot.enthalpyW - cold.enthalpyW;
  if (!(heatW > 0) || !haveSameFlows(inlet, outlet)) return null;
  try {
    const path = createHeatPath(mixture);
    path.lay(cold, hot);
    const even = evenShares(INTERVALS);
    const shares = inOrder(even, drawnChanges(phaseChanges(path, even, DRAWN)));
    return {
      heat_kW: shares.map((x) => drawn((x * heatW) / 1e3)),
      process_K: shares.map((x) => drawn(path.at(x))),
    };
  } catch (trouble) {
    if (trouble instanceof PassTrouble) return null;
    throw trouble;
  }
}

/**
 * Temperature of a stream that is heated or cooled alone, at a share of the heat from its cold end; null where
 * the two streams do not belong together.
 */
export function temperatureAlong(
  inlet: StreamState,
  outlet: StreamState,
  mixture: Mixture,
): ((share: number) => number) | null {
  if (!haveSameFlows(inlet, outlet)) return null;
  const path = createHeatPath(mixture);
  if (inlet.enthalpyW > outlet.enthalpyW) path.lay(outlet, inlet);
  else path.lay(inlet, outlet);
  return path.at;
}

/** One point for each change of phases, where the search left one on either side of it. */
export function drawnChanges(changes: readonly number[]): number[] {
  return changes.filter((_, k) => k % 2 === 1);
}

/** A number for a drawing: seven digits. */
export function drawn(value: number): number {
  return Number(value.toPrecision(7));
}

/** Of a plant that did not close, the streams of different passes may stand beside one another. */
export function haveSameFlows(a: StreamState, b: StreamState): boolean {
  return a.flowsMolPerS.every((flow, i) => Math.abs(flow - b.flowsMolPerS[i]) <= 1e-9 * Math.abs(flow));
}
