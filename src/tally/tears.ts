import type { Plant } from './plant.ts';

/** Numbers of all torn streams: their component flows [mol/s], then temperature [K], then pressure [Pa]. */
export function tearSize(plant: Plant): number {
  const tears = plant.groups.reduce((count, group) => count + group.tears.length, 0);
  return tears * (plant.mixture.size + 2);
}

/** Read the torn streams as their sources left them: of a closed plant, its answer. */
export function readTears(plant: Plant, out: Float64Array): void {
  const { size } = plant.mixture;
  let at = 0;
  for (const { tears } of plant.groups) {
    for (const s of tears) {
      const state = plant.streams[s]!;
      out.set(state.flowsMolPerS, at);
      out[at + size] = state.temperatureK;
      out[at + size + 1] = state.pressurePa;
      at += size + 2;
    }
  }
}

/** Write the torn streams, as the guess that a warm closing starts from (`closePlant`). */
export function writeTears(plant: Plant, values: Float64Array): void {
  const { size } = plant.mixture;
  let at = 0;
  for (const { tears } of plant.groups) {
    for (const s of tears) {
      const state = plant.streams[s]!;
      for (let i = 0; i < size; i++) state.flowsMolPerS[i] = values[at + i]!;
      state.temperatureK = values[at + size]!;
      state.pressurePa = values[at + size + 1]!;
      at += size + 2;
    }
  }
}
