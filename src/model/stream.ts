export type Phase = 'gas' | 'liquid' | 'mixed';

/**
 * Material passing one point of the plant. The arrays are allocated once per stream and rewritten by every
 * pass; everything handed out in a Result is a copy.
 */
export interface StreamState {
  temperatureK: number;
  pressurePa: number;
  /** all phases together, one per component in declared order [mol/s] */
  readonly flowsMolPerS: Float64Array;
  /** the part of the flows that is liquid (solids included) [mol/s] */
  readonly liquidMolPerS: Float64Array;
  /** mol vapour / mol fluid, 0–1; 1 for an empty stream */
  vapourFraction: number;
  /** elements at 298.15 K, 1 bar are zero [W] */
  enthalpyW: number;
}

/** A stream of zeros with room for a number of components. */
export function emptyStream(size: number): StreamState {
  return {
    temperatureK: 298.15,
    pressurePa: 1e5,
    flowsMolPerS: new Float64Array(size),
    liquidMolPerS: new Float64Array(size),
    vapourFraction: 1,
    enthalpyW: 0,
  };
}

/** Copy every field of a stream into another of the same size. */
export function copyStream(from: StreamState, to: StreamState): void {
  to.temperatureK = from.temperatureK;
  to.pressurePa = from.pressurePa;
  to.flowsMolPerS.set(from.flowsMolPerS);
  to.liquidMolPerS.set(from.liquidMolPerS);
  to.vapourFraction = from.vapourFraction;
  to.enthalpyW = from.enthalpyW;
}
