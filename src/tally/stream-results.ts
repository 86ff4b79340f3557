import type { StreamResult } from '../model/result.ts';
import type { Phase, StreamState } from '../model/stream.ts';
import { NORMAL_VOLUME_M3_PER_MOL } from '../properties/constants.ts';
import type { Plant } from './plant.ts';

/** mol/s → kmol/h */
export const KMOL_H = 3.6;

/** Every stream in the units of the result, by tag. */
export function streamResults(plant: Plant): Record<string, StreamResult> {
  return Object.fromEntries(
    plant.flowsheet.streams.map((spec, s) => [
      spec.tag,
      {
        from: endName(spec.from),
        to: spec.to === null ? 'out' : endName(spec.to),
        ...stateResult(plant, plant.streams[s]),
      },
    ]),
  );
}

function endName(end: { readonly name: string; readonly port: string | null }): string {
  return end.port === null ? end.name : `${end.name}.${end.port}`;
}

function stateResult(plant: Plant, state: StreamState): Omit<StreamResult, 'from' | 'to'> {
  const { mixture } = plant;
  const total = mixture.total(state);
  const massKgPerS = mixture.mass(state);
  const volumeM3PerS = mixture.volume(state);
  const byComponent = (value: (i: number) => number) =>
    Object.fromEntries(mixture.components.map((c, i) => [c.id, value(i)]));
  return {
    temperature_K: state.temperatureK,
    pressure_bar: state.pressurePa / 1e5,
    phase: phaseOf(state),
    vapour_fraction: state.vapourFraction,
    flow_kmol_h: total * KMOL_H,
    mass_kg_h: massKgPerS * 3600,
    normal_m3_h: total * NORMAL_VOLUME_M3_PER_MOL * 3600,
    enthalpy_kW: state.enthalpyW / 1e3,
    entropy_kW_K: total > 0 ? mixture.entropy(state) / 1e3 : 0,
    density_kg_m3: volumeM3PerS > 0 ? massKgPerS / volumeM3PerS : null,
    components_kmol_h: byComponent((i) => state.flowsMolPerS[i] * KMOL_H),
    mole_fraction: byComponent((i) => (total > 0 ? state.flowsMolPerS[i] / total : 0)),
  };
}

function phaseOf(state: StreamState): Phase {
  if (state.vapourFraction >= 1) return 'gas';
  return state.vapourFraction <= 0 ? 'liquid' : 'mixed';
}
