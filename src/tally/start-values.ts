import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { copyStream, type StreamState } from '../model/stream.ts';
import type { HeatLeft } from './heat-left.ts';
import type { Group, Plant } from './plant.ts';

/** Passes at most before the guess is scaled up: the second mends what the first could not do yet. */
const FIRST_PASSES = 3;
/** A block with a set duty may need more than once through: so many times t₀ is tried. */
const MULTIPLES = [4, 16] as const;
/** A share that comes back above this would scale a guess out of all proportion. */
const LARGEST_SHARE = 0.99;

/**
 * Start values for the torn streams of a group without the user's help.
 *
 * The first pass has empty tears at the state of the warmest entering stream, so that each tear finds out what
 * reaches it when nothing has come round (t₀). A second pass with that finds what reaches it then (t₁), and the
 * difference is scaled up component by component as if the same share came back every time:
 *   t = t₀/(1 − r),  r = (t₁ − t₀)/t₀, held in 0…0.99.
 * Where the tears feed one another (a feed/effluent exchanger with a set approach), the first pass leaves some
 * of them empty: then as many passes as it takes to fill them all stand for each of the two.
 * A block that cannot work yet (nothing flows, no pressure) is passed over and leaves its outlets empty; a third
 * pass is made where that was so in the second, and where it is so still, multiples of t₀ are tried as the guess.
 *
 * @param left  what the passes leave to the closing
 * @returns passes made
 */
export function startFromFeeds(plant: Plant, group: Group, left: HeatLeft | null): number {
  const { mixture, streams, seen } = plant;
  const arriving = new Float64Array(mixture.size);
  let pressurePa = 0;
  let temperatureK = 0;
  for (const state of enteringStates(plant, group)) {
    for (let i = 0; i < mixture.size; i++) arriving[i] += state.flowsMolPerS[i];
    pressurePa = Math.max(pressurePa, state.pressurePa);
    temperatureK = Math.max(temperatureK, state.temperatureK);
  }
  for (const block of group.blocks) for (const state of plant.outlets[block]) empty(state);
  for (const s of group.tears) empty(seen[s]);

  function empty(state: StreamState): void {
    state.flowsMolPerS.fill(0);
    state.liquidMolPerS.fill(0);
    state.enthalpyW = 0;
    state.vapourFraction = 1;
    state.pressurePa = pressurePa || 1e5;
    state.temperatureK = temperatureK || 298.15;
  }

  /** Let the tears hold so many times what reached them the last time. */
  function holdMultiple(multiple: number): void {
    for (const [t, s] of group.tears.entries()) {
      for (let i = 0; i < mixture.size; i++) streams[s].flowsMolPerS[i] = multiple * before[t][i];
      mixture.settle(streams[s]);
    }
  }

  let passes = 0;
  let complete = false;
  const pass = () => {
    if (passes > 0) for (const s of group.tears) copyStream(streams[s], seen[s]);
    complete = passLeniently(plant, group, left);
    passes++;
  };
  do pass();
  while (passes < group.tears.length && group.tears.some((s) => mixture.total(streams[s]) === 0));
  const round = passes;
  const before = group.tears.map((s) => streams[s].flowsMolPerS.slice());
  while (passes < 2 * round || (!complete && passes < FIRST_PASSES)) {
    if (passes >= 2 * round)
      for (const [t, s] of group.tears.entries()) before[t].set(streams[s].flowsMolPerS);
    pass();
  }
  for (let k = 0; !complete && k < MULTIPLES.length; k++) {
    holdMultiple(MULTIPLES[k]);
    pass();
    if (!complete) continue;
    for (const s of group.tears) copyStream(seen[s], streams[s]);
    return passes;
  }
  if (!complete) holdMultiple(1);
  group.tears.forEach((s, t) => {
    const { flowsMolPerS } = streams[s];
    const total = mixture.total(streams[s]);
    for (let i = 0; i < mixture.size; i++) {
      if (total === 0) flowsMolPerS[i] = arriving[i];
      else if (complete) flowsMolPerS[i] = scaledUp(before[t][i], flowsMolPerS[i]);
    }
  });
  return passes;
}

/** t₀/(1 − r), r = (t₁ − t₀)/t₀; t₁ where nothing came the first time or less the second. */
function scaledUp(first: number, second: number): number {
  if (first <= 0 || second <= first) return second;
  return first / (1 - Math.min((second - first) / first, LARGEST_SHARE));
}

const entering = new WeakMap<Group, readonly StreamState[]>();

/** The streams that enter a group from feeds and from groups closed before it. */
function enteringStates(plant: Plant, group: Group): readonly StreamState[] {
  let states = entering.get(group);
  if (states === undefined) {
    states = findEnteringStates(plant, group);
    entering.set(group, states);
  }
  return states;
}

function findEnteringStates(plant: Plant, group: Group): StreamState[] {
  const inside = new Set(group.blocks.flatMap((block) => plant.outlets[block]));
  const torn = new Set(group.tears.map((s) => plant.seen[s]));
  const all = new Set(group.blocks.flatMap((block) => plant.inlets[block]));
  return [...all].filter((state) => !inside.has(state) && !torn.has(state));
}

/** Take every step; false when one of them could not. */
function passLeniently(plant: Plant, group: Group, left: HeatLeft | null): boolean {
  let complete = true;
  for (let k = 0; k < group.steps.length; k++) {
    try {
      if (left?.flowsOnly[k]) plant.passFlows(group.steps[k]);
      else plant.pass(group.steps[k]);
    } catch (trouble) {
      if (!(trouble instanceof PassTrouble)) throw trouble;
      complete = false;
    }
  }
  return complete;
}
