import type { Group, Plant } from './plant.ts';

/** What a loop does with one component in a pass [mol/s]. */
export interface ComponentFlows {
  readonly index: number;
  readonly id: string;
  /** brought in by feeds and by groups closed before */
  readonly enters: number;
  /** made by the reactions of the loop; negative where they take it up */
  readonly formed: number;
  readonly leaves: number;
  /** the largest flow of it in any stream of the loop: what goes round */
  readonly round: number;
  /** where it leaves, the largest way out first; those that carry none of it included */
  readonly exits: readonly { readonly tag: string; readonly flow: number }[];
}

/** Count every component at the edge of a group, as the streams stand after a pass. */
export function componentFlows(plant: Plant, group: Group): ComponentFlows[] {
  const { streams, seen, mixture, flowsheet } = plant;
  const inLoop = new Set(group.blocks.map((b) => plant.blocks[b].name));
  const ends = flowsheet.streams.map(({ from, to }) => ({
    isFrom: inLoop.has(from.name),
    isTo: to !== null && inLoop.has(to.name),
  }));
  return mixture.components.map(({ id }, index) => {
    const flowIn = (s: number) => streams[s].flowsMolPerS[index];
    let enters = 0;
    let leaves = 0;
    let round = 0;
    const exits: { tag: string; flow: number }[] = [];
    ends.forEach(({ isFrom, isTo }, s) => {
      if (isTo && !isFrom) enters += seen[s].flowsMolPerS[index];
      if (isFrom && !isTo) {
        leaves += flowIn(s);
        exits.push({ tag: flowsheet.streams[s].tag, flow: flowIn(s) });
      }
      if (isFrom) round = Math.max(round, flowIn(s));
    });
    let formed = 0;
    for (const b of group.blocks) {
      if (!plant.kinds[b].reactionsIn) continue;
      for (const state of plant.outlets[b]) formed += state.flowsMolPerS[index];
      for (const state of plant.inlets[b]) formed -= state.flowsMolPerS[index];
    }
    // A difference of large flows is no reaction.
    if (Math.abs(formed) < 1e-9 * round) formed = 0;
    exits.sort((a, b) => b.flow - a.flow);
    return { index, id, enters, formed, leaves, round, exits };
  });
}
