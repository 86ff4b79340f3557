import type { StreamState } from '../model/stream.ts';
import type { Mixture } from '../properties/mixture.ts';
import { createEnthalpySlopes } from './enthalpy-slopes.ts';
import type { ReactionRun } from './reaction-run.ts';
import type { BlockSlopes } from './slopes.ts';

/** What the derivatives of a bed ask of it, as its last pass left it. */
export interface PassedBed {
  readonly setting: { readonly inlet_temperature?: number | undefined };
  readonly run: ReactionRun;
  /** index of the reactor's inlet that quenches before it; 0 for none */
  readonly shot: number;
  readonly into: StreamState;
  readonly out: StreamState;
}

/**
 * Derivatives of adiabatic beds in series (Unit.slopes), bed by bed. A heat between two beds changes nothing; a
 * quench adds its flows and enthalpy.
 */
export function createBedSlopes(mixture: Mixture, beds: readonly PassedBed[]) {
  const last = beds.at(-1)!;
  const carrying = createEnthalpySlopes(mixture);
  /** the matrices of the inlets that are in the gas of each bed */
  const joined: Float64Array[] = [];

  /** The lower pressure counts; of two that are equal each half the way, which is right when they move together. */
  function joinPressures(before: StreamState, shot: StreamState, joining: Float64Array, width: number): void {
    const gap = before.pressurePa - shot.pressurePa;
    const ofShot = gap > 0 ? 1 : gap < 0 ? 0 : 0.5;
    const at = (width - 1) * width;
    for (const matrix of joined) for (let k = at; k < at + width; k++) matrix[k] *= 1 - ofShot;
    joining[width * width - 1] = ofShot;
  }

  return (inlets: readonly StreamState[], { width, of }: BlockSlopes): boolean => {
    const matrices = of[0];
    joined.length = 0;
    joined.push(matrices[0]);
    if (!carrying.enter(inlets[0], matrices[0])) return false;
    let before = inlets[0];
    for (const { setting, run, shot, into, out } of beds) {
      if (shot > 0) {
        if (!carrying.enter(inlets[shot], matrices[shot])) return false;
        joinPressures(before, inlets[shot], matrices[shot], width);
        joined.push(matrices[shot]);
      } else if (setting.inlet_temperature !== undefined) {
        if (!carrying.setTemperature(into, joined)) return false;
      }
      const step = out === last.out ? carrying.reactAndLeave : carrying.react;
      if (!step(run, out, joined)) return false;
      before = out;
    }
    return true;
  };
}
