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
  const loops = plant.groups.filter((group) => group.tears.length > 0);
  if (loops.length === 0) return [];
  const ways = waysOf(plant);
  return loops.flatMap((loop) => {
    const inLoop = new Set(loop.blocks);
    const entering = loop.blocks.flatMap((b) => ways.arriving[b].filter((s) => !inLoop.has(ways.source[s])));
    return plant.mixture.components.flatMap((_, i) =>
      isTrapped(plant, ways, { blocks: loop.blocks, inLoop, entering }, i) ? [refusal(plant, loop, i)] : [],
    );
  });
}

/** How the streams of a plant join its blocks, found once for all its loops. */
interface Ways {
  /** per stream the block that it leaves and the one that it enters; −1 for a feed and the battery limit */
  readonly source: readonly number[];
  readonly target: readonly number[];
  /** per block the streams that enter and leave it */
  readonly arriving: readonly (readonly number[])[];
  readonly leaving: readonly (readonly number[])[];
  /** per component, whether a feed brings it */
  readonly fed: readonly boolean[];
}

interface Loop {
  readonly blocks: readonly number[];
  readonly inLoop: ReadonlySet<number>;
  /** the streams that enter it from feeds and from blocks outside */
  readonly entering: readonly number[];
}

function waysOf({ flowsheet, blocks, enters, streams, mixture }: Plant): Ways {
  const indexOf = new Map(blocks.map((b, i) => [b.name, i]));
  const source = flowsheet.streams.map(({ from }) => indexOf.get(from.name) ?? -1);
  const target = flowsheet.streams.map(({ to }) => (to === null ? -1 : indexOf.get(to.name)!));
  const arriving = blocks.map((): number[] => []);
  const leaving = blocks.map((): number[] => []);
  for (const [s, block] of source.entries()) if (block >= 0) leaving[block].push(s);
  for (const [s, block] of target.entries()) if (block >= 0) arriving[block].push(s);
  const fed = mixture.components.map((_, i) => enters.some((s) => streams[s].flowsMolPerS[i] > 0));
  return { source, target, arriving, leaving, fed };
}

function isTrapped(plant: Plant, ways: Ways, { blocks, inLoop, entering }: Loop, component: number): boolean {
  const { streams } = plant.flowsheet;
  // Followed by streams, not by blocks: the two sides of an exchanger have their own ways.
  const reached = new Set([
    ...entering.filter((s) => bringsIn(plant, ways, s, component)),
    ...blocks
      .filter((b) => reacts(plant, b, component, 1))
      .flatMap((b) => onward(plant, ways, b, null, component)),
  ]);
  const queue = [...reached];
  for (let s = queue.pop(); s !== undefined; s = queue.pop()) {
    const b = ways.target[s];
    if (!inLoop.has(b) || reacts(plant, b, component, -1)) return false;
    for (const next of onward(plant, ways, b, streams[s].to, component)) {
      if (!reached.has(next)) queue.push(next);
      reached.add(next);
    }
  }
  return reached.size > 0;
}

/** Does a stream that enters a loop bring a component, from a feed or from a block outside? */
function bringsIn(plant: Plant, { source, fed }: Ways, s: number, component: number): boolean {
  if (source[s] < 0) return plant.streams[s].flowsMolPerS[component] > 0;
  return fed[component] && passes(plant, source[s], plant.flowsheet.streams[s].from.port, component);
}

/** The streams by which a component that has come in by an inlet (null: is formed inside) leaves a block. */
function onward(
  plant: Plant,
  { leaving }: Ways,
  block: number,
  inlet: StreamSpec['to'],
  component: number,
): number[] {
  const kind = plant.kinds[block];
  return leaving[block].filter((s) => {
    const { port } = plant.flowsheet.streams[s].from;
    if (inlet?.port && port && kind.through && !kind.through(inlet.port, port)) return false;
    return passes(plant, block, port, component);
  });
}

function reacts(plant: Plant, block: number, component: number, sign: 1 | -1): boolean {
  return plant.running[block].some(({ coefficients }) => sign * coefficients[component] > 0);
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
