import type { StreamState } from '../model/stream.ts';
import type { Group, Plant } from './plant.ts';
import type { Finding } from './why.ts';
import type { Facts } from './why-facts.ts';
import { bar, degC, figure, kmolPerHour, perCent } from './why-format.ts';

/** A reactor that takes less than this of every reactant in a pass has gone out [-]. */
const GONE_OUT = 1e-3;
/** A search that ends hotter than this has ended at the upper bound [K]. */
const HOT_K = 1500;

/** A reactor that found no outlet temperature, as the failed pass left it. */
export interface ReactorAtBound {
  readonly block: number;
  readonly inlet: StreamState;
  readonly isHot: boolean;
}

/**
 * The reactor whose outlet temperature was looked for in vain, if that is what stopped a pass. To be asked before
 * anything else passes through the plant: the outlet still stands where the search ended.
 */
export function reactorAtBound(plant: Plant, code: string, name: string | null): ReactorAtBound | null {
  if (code !== 'temperature-bound' && code !== 'duty-too-large') return null;
  const block = plant.blocks.findIndex((b) => b.name === name);
  if (block < 0 || !plant.kinds[block].reactionsIn) return null;
  const inlet = plant.inlets[block][0];
  const copy = {
    ...inlet,
    flowsMolPerS: inlet.flowsMolPerS.slice(),
    liquidMolPerS: inlet.liquidMolPerS.slice(),
  };
  return { block, inlet: copy, isHot: plant.outlets[block][0].temperatureK > HOT_K };
}

/** What brought a reactor to its bound, with the heats that the loop gets set. */
export function reactorBoundFinding(
  plant: Plant,
  group: Group,
  { block, inlet, isHot }: ReactorAtBound,
): Omit<Finding, 'where'> {
  const { name, settings } = plant.blocks[block];
  const duties = group.blocks.flatMap((b) => {
    const duty = plant.blocks[b].settings['duty'];
    return typeof duty === 'number' ? [`${plant.blocks[b].name}.duty ${figure(duty / 1e6)} MW`] : [];
  });
  const duty = settings['duty'];
  const own = typeof duty === 'number' ? `with its duty of ${figure(duty / 1e6)} MW ` : '';
  const inLoop = group.tears.length > 0;
  return {
    code: 'reactor-at-bound',
    what: `${name}: the outlet would be ${isHot ? 'hotter than 3500 K' : 'colder than 20 K'}.`,
    why: `${kmolPerHour(plant.mixture.total(inlet))} enter it at ${degC(inlet.temperatureK)} and ${bar(inlet.pressurePa)}, and ${own}no outlet temperature between 20 and 3500 K closes its heat balance${duties.length > 0 ? `; heat is set in ${inLoop ? 'the loop' : 'it'} by ${duties.join(', ')}` : ''}`,
    mend: isHot
      ? `give the heat a way out: ${duties.length > 0 ? 'less duty, ' : ''}a temperature for ${name}, or a cooler set to a temperature ${inLoop ? 'in the recycle' : 'before it'}`
      : `take out less heat: ${duties.length > 0 ? 'a duty closer to zero, ' : ''}a temperature for ${name}, or a heater set to a temperature before it`,
  };
}

/** All reactors of the loop let their reactants through: what comes in goes round until the other exits take it. */
export function reactorGoneOut({ plant, group, answer, radius }: Facts): Finding | null {
  const reactors = group.blocks.filter((b) => plant.kinds[b].reactionsIn);
  if (reactors.length === 0 || (answer !== null && (radius === null || radius < 0.9))) return null;
  const runs = reactors.map((b) => ({ b, ...largestConversion(plant, b) }));
  if (!runs.every(({ share }) => share < GONE_OUT)) return null;
  const { b, id, share } = runs[0];
  const inlet = plant.inlets[b][0];
  return {
    code: 'reactor-gone-out',
    isOfDirectPasses: true,
    what: `next to nothing reacts in ${plant.blocks[b].name}, so what comes into the loop goes round`,
    why: `it takes ${perCent(share)} of the ${id} in a pass: ${kmolPerHour(plant.mixture.total(inlet))} enter it at ${degC(inlet.temperatureK)} and ${bar(inlet.pressurePa)}`,
    mend: `a hotter inlet of ${plant.blocks[b].name}, more catalyst, or a larger purge that keeps the recycle small`,
    where: plant.flowsheet.placeOf(`blocks.${plant.blocks[b].name}`),
  };
}

/** The reactant of a reactor of which it takes the largest share; an empty reactor takes all. */
function largestConversion(plant: Plant, b: number): { readonly id: string; readonly share: number } {
  let id = '';
  let share = -1;
  for (const [i, component] of plant.mixture.components.entries()) {
    const isReactant = plant.running[b].some(({ coefficients }) => coefficients[i] < 0);
    const enters = plant.inlets[b].reduce((sum, state) => sum + state.flowsMolPerS[i], 0);
    if (!isReactant || !(enters > 0)) continue;
    const leaves = plant.outlets[b].reduce((sum, state) => sum + state.flowsMolPerS[i], 0);
    // Driven backwards it is no reactor gone out.
    const taken = Math.abs(enters - leaves) / enters;
    if (taken <= share) continue;
    share = taken;
    id = component.id;
  }
  return share < 0 ? { id, share: 1 } : { id, share };
}
