import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import type { Flowsheet } from '../model/flowsheet.ts';
import { assumptionsOf } from './assumptions.ts';
import { trappedComponents } from './exits.ts';
import { createPlant } from './plant.ts';
import { type Sources, sourcesOf } from './sources.ts';

/** What `check` shows of a flowsheet that has been read without errors: what would be solved, and how. */
export interface Plan {
  readonly blocks: readonly { readonly name: string; readonly kind: string }[];
  readonly loops: readonly { readonly blocks: readonly string[]; readonly tears: readonly string[] }[];
  readonly tears: readonly string[];
  /** true when no smaller number of tears would do, those of `solve: tear` among them; false where that is not proven */
  readonly smallest: boolean;
  /** blocks, and outlets of blocks that are calculated ahead of the rest (exchanger.cold) */
  readonly order: readonly string[];
  /** settings moved by aims, one wanted value each: what is free and what fixes it */
  readonly aims: readonly { readonly name: string; readonly moves: string; readonly until: string }[];
  /** unknowns that the solver guesses: component flows, temperature and pressure of each tear */
  readonly unknowns: number;
  /** models, constants and data, by component and by block */
  readonly sources: Sources;
  readonly assumptions: readonly string[];
  readonly diagnostics: readonly Diagnostic[];
}

/** Plan a flowsheet without solving it. */
export function planFlowsheet(flowsheet: Flowsheet): Plan {
  const plant = createPlant(flowsheet);
  plant.refreshFeeds();
  const tag = (s: number) => flowsheet.streams[s].tag;
  const name = (b: number) => plant.blocks[b].name;
  const tears = plant.groups.flatMap((group) => group.tears.map(tag));
  return {
    blocks: plant.blocks.map((b) => ({ name: b.name, kind: b.kind })),
    loops: plant.groups
      .filter((group) => group.tears.length > 0)
      .map((group) => ({ blocks: group.blocks.map(name), tears: group.tears.map(tag) })),
    tears,
    smallest: plant.smallestTears,
    order: plant.groups.flatMap((group) =>
      group.steps.map(({ block, ahead }) => (ahead === null ? name(block) : `${name(block)}.${ahead}`)),
    ),
    aims: flowsheet.aims.map((aim) => ({ name: aim.name, moves: aim.move, until: aim.until.text })),
    unknowns: tears.length * (flowsheet.components.length + 2),
    sources: sourcesOf(plant),
    assumptions: assumptionsOf(plant, []),
    diagnostics: trappedComponents(plant),
  };
}
