import type { Step } from './calculation-steps.ts';
import type { Group, Plant } from './plant.ts';

/**
 * What can be left out of the passes round a group, because no block in it asks: temperatures, phases and enthalpies that
 * act on nothing that goes round. Behind an isothermal converter and a condenser of set temperature, those of mixer and
 * circulator come to that: half of the work of a pass. They are worked out once, when the flows have closed.
 */
export interface HeatLeft {
  /** by step: flows and pressures are enough (`Unit.passFlows`) */
  readonly flowsOnly: readonly boolean[];
  /** indices of the tears whose heat nobody asks for */
  readonly tears: readonly number[];
  /** those steps whose outlets have the heat of such a tear in them */
  readonly behindTears: readonly Step[];
}

/**
 * Find what can be left out.
 *
 * @returns null where nothing can: every block is asked for the heat of its outlets, or the heat of a tear acts on itself
 *   and so has to be closed with the flows
 */
export function heatLeft(plant: Plant, group: Group): HeatLeft | null {
  const { kinds, blocks, units, inlets, outlets, seen, streams } = plant;
  const asks = (block: number, asked: boolean) =>
    kinds[block].asksForHeat?.(blocks[block].settings, asked) ?? true;
  const source = new Map(seen.map((state, s) => [state, streams[s]]));

  const asked = new Set<object>();
  const isAsked = (block: number) => outlets[block].some((state) => asked.has(state));
  for (let size = -1; size < asked.size; ) {
    size = asked.size;
    for (const block of group.blocks) {
      if (asks(block, isAsked(block))) for (const state of inlets[block]) asked.add(source.get(state)!);
    }
  }
  const flowsOnly = group.steps.map(
    ({ block, ahead }) => ahead === null && units[block].passFlows !== undefined && !isAsked(block),
  );
  if (!flowsOnly.includes(true)) return null;

  const tears = group.tears.filter((s) => !asked.has(streams[s]));
  const moved = new Set<object>(tears.map((s) => seen[s]));
  const behindTears = group.steps.filter(({ block }) => {
    const moves = inlets[block].some((state) => moved.has(state)) && asks(block, true);
    if (moves) for (const state of outlets[block]) moved.add(state);
    return moves;
  });
  if (tears.some((s) => moved.has(streams[s]))) return null;
  return { flowsOnly, tears, behindTears };
}
