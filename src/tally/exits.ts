import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import type { Group, Plant } from './plant.ts';

/**
 * Components that can enter a recycle and have no way out of it: they would pile up without end, so the loop
 * is refused before solving. A component has a way out where a block of the loop can send it across the
 * loop's edge, or where a reaction of the loop takes it as a reactant.
 *
 * @returns one error per loop and component
 */
export function trappedComponents(plant: Plant): Diagnostic[] {
  return plant.groups
    .filter((group) => group.tears.length > 0)
    .flatMap((group) =>
      plant.mixture.components.flatMap((_, i) =>
        isTrapped(plant, group, i) ? [refusal(plant, group, i)] : [],
      ),
    );
}

function isTrapped(plant: Plant, group: Group, component: number): boolean {
  const inLoop = new Set(group.blocks);
  const streams = plant.flowsheet.streams;
  const blockNamed = (name: string) => plant.blocks.findIndex((b) => b.name === name);
  const reached = new Set(group.blocks.filter((b) => enters(plant, inLoop, b, component)));
  const queue = [...reached];
  for (let b = queue.pop(); b !== undefined; b = queue.pop()) {
    if (reacts(plant, b, component, -1)) return false;
    for (const stream of streams) {
      if (stream.from.name !== plant.blocks[b].name || !passes(plant, b, stream.from.port, component))
        continue;
      const next = stream.to === null ? -1 : blockNamed(stream.to.name);
      if (!inLoop.has(next)) return false;
      if (!reached.has(next)) {
        reached.add(next);
        queue.push(next);
      }
    }
  }
  return reached.size > 0;
}

/** Does a component come into the loop at this block, from a feed or a block outside, or by reaction? */
function enters(plant: Plant, inLoop: ReadonlySet<number>, block: number, component: number): boolean {
  if (reacts(plant, block, component, 1)) return true;
  return plant.flowsheet.streams.some((stream, s) => {
    if (stream.to?.name !== plant.blocks[block].name) return false;
    const from = plant.blocks.findIndex((b) => b.name === stream.from.name);
    if (from < 0) return plant.streams[s].flowsMolPerS[component] > 0;
    return !inLoop.has(from) && isFed(plant, component) && passes(plant, from, stream.from.port, component);
  });
}

function isFed(plant: Plant, component: number): boolean {
  return plant.enters.some((s) => plant.streams[s].flowsMolPerS[component] > 0);
}

function reacts(plant: Plant, block: number, component: number, sign: 1 | -1): boolean {
  const names = plant.kinds[block].reactionsIn?.(plant.blocks[block].settings) ?? [];
  return plant.flowsheet.reactions.some(
    (reaction) => names.includes(reaction.name) && sign * reaction.coefficients[component] > 0,
  );
}

function passes(plant: Plant, block: number, port: string | null, component: number): boolean {
  const kind = plant.kinds[block];
  const settings = plant.blocks[block].settings;
  const outlet = port ?? kind.ports(settings).outlets[0];
  return (
    kind.passes?.(settings, outlet, plant.mixture.components[component], plant.mixture.roles[component]) ??
    true
  );
}

function refusal(plant: Plant, group: Group, component: number): Diagnostic {
  const id = plant.mixture.components[component].id;
  const tag = plant.flowsheet.streams[group.tears[0]].tag;
  const loop = group.blocks.map((b) => plant.blocks[b].name).join(', ');
  return {
    code: 'no-way-out',
    severity: 'error',
    where: plant.flowsheet.placeOf(`streams.${tag}`),
    what: `${id} can enter the loop of ${loop} and has no way out of it.`,
    why: 'no outlet of the loop can carry it, and no reaction of the loop takes it up, so it would pile up without end',
    mend: `put a splitter with a purge into the recycle${plant.flowsheet.dissolvedGases ? '' : ', or set dissolved_gases: true if it dissolves in the condensate'}`,
  };
}
