import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import type { StreamSpec } from '../model/flowsheet.ts';
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
  const { streams } = plant.flowsheet;
  // Followed by streams, not by blocks: the two sides of an exchanger have their own ways.
  const reached = new Set([
    ...streams.flatMap((_, s) => (bringsIn(plant, inLoop, s, component) ? [s] : [])),
    ...group.blocks
      .filter((b) => reacts(plant, b, component, 1))
      .flatMap((b) => onward(plant, b, null, component)),
  ]);
  const queue = [...reached];
  for (let s = queue.pop(); s !== undefined; s = queue.pop()) {
    const b = blockAt(plant, streams[s].to);
    if (!inLoop.has(b) || reacts(plant, b, component, -1)) return false;
    for (const next of onward(plant, b, streams[s].to, component)) {
      if (!reached.has(next)) queue.push(next);
      reached.add(next);
    }
  }
  return reached.size > 0;
}

/** Does a stream bring a component into the loop, from a feed or from a block outside? */
function bringsIn(plant: Plant, inLoop: ReadonlySet<number>, s: number, component: number): boolean {
  const { from, to } = plant.flowsheet.streams[s];
  if (!inLoop.has(blockAt(plant, to))) return false;
  const source = blockAt(plant, from);
  if (source < 0) return plant.streams[s].flowsMolPerS[component] > 0;
  return !inLoop.has(source) && isFed(plant, component) && passes(plant, source, from.port, component);
}

/** The streams by which a component that has come in by an inlet (null: is formed inside) leaves a block. */
function onward(plant: Plant, block: number, inlet: StreamSpec['to'], component: number): number[] {
  const kind = plant.kinds[block];
  return plant.flowsheet.streams.flatMap((stream, s) => {
    if (stream.from.name !== plant.blocks[block].name) return [];
    const { port } = stream.from;
    if (inlet?.port && port && kind.through && !kind.through(inlet.port, port)) return [];
    return passes(plant, block, port, component) ? [s] : [];
  });
}

/** The block at an end of a stream; −1 for a feed or the battery limit. */
function blockAt(plant: Plant, end: { readonly name: string } | null): number {
  return end === null ? -1 : plant.blocks.findIndex((b) => b.name === end.name);
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
