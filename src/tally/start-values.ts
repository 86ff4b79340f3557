import { PassTrouble } from '../diagnostics/diagnostic.ts';
import type { Group, Plant } from './plant.ts';

/**
 * Start values for the torn streams of a group without the user's help: an empty recycle at the state of the
 * warmest entering stream, one pass through the blocks ("once through"), and what comes back is scaled up
 * component by component as if it came back in that share every time:
 *   x = r/(1 − r) × entering,  r = returned/entering, at most 0.99.
 * Components that react are scaled by the same rule; their share is that of a gas free of product, which errs
 * on the low side. The states found are written into the torn streams; a block that fails at an empty recycle
 * leaves the entering streams' state as the guess.
 */
export function startFromFeeds(plant: Plant, group: Group): void {
  const { mixture, streams, seen } = plant;
  const inside = new Set(group.blocks.flatMap((block) => plant.outlets[block]));
  const entering = [
    ...new Set(group.blocks.flatMap((block) => plant.inlets[block].filter((state) => !inside.has(state)))),
  ].filter((state) => !group.tears.some((s) => seen[s] === state));
  const arriving = new Float64Array(mixture.size);
  let pressurePa = 0;
  let temperatureK = 0;
  for (const state of entering) {
    for (let i = 0; i < mixture.size; i++) arriving[i] += state.flowsMolPerS[i];
    pressurePa = Math.max(pressurePa, state.pressurePa);
    temperatureK = Math.max(temperatureK, state.temperatureK);
  }
  for (const s of group.tears) {
    for (const state of [seen[s], streams[s]]) {
      state.flowsMolPerS.fill(0);
      state.liquidMolPerS.fill(0);
      state.enthalpyW = 0;
      state.vapourFraction = 1;
      state.pressurePa = pressurePa || 1e5;
      state.temperatureK = temperatureK || 298.15;
    }
  }
  try {
    for (const block of group.blocks) plant.passBlock(block);
  } catch (trouble) {
    if (!(trouble instanceof PassTrouble)) throw trouble;
    for (const s of group.tears) streams[s].flowsMolPerS.set(arriving);
    return;
  }
  for (const s of group.tears) {
    const state = streams[s];
    for (let i = 0; i < mixture.size; i++) {
      const returned = state.flowsMolPerS[i];
      if (returned === 0 || arriving[i] === 0) continue;
      const share = Math.min(returned / arriving[i], 0.99);
      state.flowsMolPerS[i] = (share / (1 - share)) * arriving[i];
    }
  }
}
