import type { BlockKind, Unit } from '../blocks/block.ts';
import { blockKinds } from '../blocks/registry.ts';
import { PassTrouble } from '../diagnostics/diagnostic.ts';
import { planCalculation } from '../graph/calculation-order.ts';
import type { BlockSpec, Feed, Flowsheet } from '../model/flowsheet.ts';
import type { Reaction } from '../model/reaction.ts';
import { emptyStream, type StreamState } from '../model/stream.ts';
import { enthalpyBasisFor } from '../properties/ideal-gas.ts';
import { createMixture, type Mixture } from '../properties/mixture.ts';
import { type Step, stepGraph } from './calculation-steps.ts';
import { feedFlows } from './feed-flows.ts';
import { type SettingAt, settingAt } from './setting-path.ts';
import { type Wiring, wire } from './wiring.ts';

/** Blocks that are closed together: those of one recycle system, or a single block. */
export interface Group {
  /** what a pass does, in calculation order */
  readonly steps: readonly Step[];
  /** indices of the blocks, each once, in the order in which they are first needed */
  readonly blocks: readonly number[];
  /** indices of the streams torn; empty where nothing goes round */
  readonly tears: readonly number[];
}

/** A flowsheet made ready to be calculated pass after pass. Its settings can be moved. */
export interface Plant {
  readonly flowsheet: Flowsheet;
  readonly mixture: Mixture;
  readonly blocks: readonly BlockSpec[];
  readonly kinds: readonly BlockKind[];
  /** by block: the reactions that run in it; no setting that can be moved changes which */
  readonly running: readonly (readonly Reaction[])[];
  readonly units: readonly Unit[];
  /** state of every stream as its source left it, in the order of the file */
  readonly streams: readonly StreamState[];
  /** state of every stream as its destination sees it: the guess for a torn stream, else the same object */
  readonly seen: readonly StreamState[];
  /** states per block in port order */
  readonly inlets: readonly (readonly StreamState[])[];
  readonly outlets: readonly (readonly StreamState[])[];
  readonly groups: readonly Group[];
  /** true when no smaller number of tears would do, those that the file names among them */
  readonly smallestTears: boolean;
  /** feeds, with the settings that were moved */
  readonly feeds: readonly Feed[];
  /** indices of the streams that enter and leave across the battery limit */
  readonly enters: readonly number[];
  readonly leaves: readonly number[];
  /** all feeds together as they were written last: flows, and the sizes of their enthalpies */
  readonly entering: { readonly flowsMolPerS: Float64Array; readonly enthalpyW: number };
  /** write the feeds' flows and states into their streams */
  refreshFeeds(): void;
  /**
   * Evaluate one block from its inlets, or one outlet of it ahead of the rest.
   * @throws PassTrouble with the block's name
   */
  pass(step: Step): void;
  /** The same for flows and pressures alone (`Unit.passFlows`). */
  passFlows(step: Step): void;
  /**
   * move a setting by its path, e.g. condenser.temperature; value in SI. Factors on constants count as settings here:
   * reactions.synthesis.K, components.NH3.vapour_pressure, 1 as the data say
   */
  set(path: string, value: number): void;
  /** the number a path stands for, undefined where it is left to its default */
  get(path: string): number | undefined;
  /**
   * A plant as `createPlant` makes it, its settings those of the flowsheet; property model and calculation order are
   * taken over, so this one is of no use any more.
   */
  renewed(): Plant;
}

/** Wire up a checked flowsheet: property model, units, streams, calculation order. */
export function createPlant(flowsheet: Flowsheet): Plant {
  return equip(frameOf(flowsheet));
}

/** What a plant is built on: nothing in it is left by a pass but what is worked out again to the same bytes. */
interface Frame {
  readonly flowsheet: Flowsheet;
  readonly mixture: Mixture;
  readonly vapourPressures: { readonly lnFactors: Float64Array; moves: number };
  readonly kinds: readonly BlockKind[];
  readonly running: readonly (readonly Reaction[])[];
  readonly wiring: Wiring;
  readonly groups: readonly Group[];
  readonly smallestTears: boolean;
}

function frameOf(flowsheet: Flowsheet): Frame {
  const { components, blocks } = flowsheet;
  const vapourPressures = { lnFactors: new Float64Array(components.length), moves: 0 };
  const mixture = createMixture({
    components,
    gas: flowsheet.gas,
    liquid: flowsheet.liquid,
    dissolvedGases: flowsheet.dissolvedGases,
    basis: enthalpyBasisFor(components, flowsheet.reactions),
    moved: vapourPressures,
  });
  const kinds = blocks.map((b) => blockKinds.get(b.kind)!);
  const running = blocks.map(({ settings }, b) => {
    const names = kinds[b].reactionsIn?.(settings) ?? [];
    return flowsheet.reactions.filter((reaction) => names.includes(reaction.name));
  });
  const wiring = wire(flowsheet, blocks, kinds);
  const graph = stepGraph(flowsheet, blocks, kinds);
  const plan = planCalculation(
    graph.steps.length,
    graph.edgeFrom,
    graph.edgeTo,
    flowsheet.solve.tear.map((tag) => graph.edgeStreams.indexOf(wiring.streamOf(tag))),
    // Among equally small tear sets the stream called the recycle is the one an engineer would guess.
    Float64Array.from(graph.edgeStreams, (s, edge) => {
      if (graph.inner[edge]) return 0;
      return flowsheet.streams[s].tag === flowsheet.ledger.recycle ? 2 : 1;
    }),
  );
  const groups = plan.groups.map((group): Group => {
    const steps = Array.from(group.nodes, (node) => graph.steps[node]);
    return {
      steps,
      blocks: [...new Set(steps.map((step) => step.block))],
      tears: [...new Set(Array.from(group.tears, (edge) => graph.edgeStreams[edge]))],
    };
  });
  return { flowsheet, mixture, vapourPressures, kinds, running, wiring, groups, smallestTears: plan.exact };
}

/** Units, streams and settings of their own for a frame. */
function equip(frame: Frame): Plant {
  const { flowsheet, mixture, vapourPressures, kinds, wiring } = frame;
  const { components } = flowsheet;
  const reactions = flowsheet.reactions.map((reaction) => ({ ...reaction, moved: { lnFactor: 0 } }));
  const blocks = flowsheet.blocks.map((b) => ({ ...b, settings: structuredClone(b.settings) }));
  const feeds = flowsheet.feeds.map((feed) => ({ ...feed, parts: feed.parts.slice() }));
  const units = blocks.map((b, i) => kinds[i].create(b.settings, { name: b.name, mixture, reactions }));
  // Copies: what is kept with a group belongs to one plant.
  const groups = frame.groups.map((group) => ({ ...group }));
  const streams = flowsheet.streams.map(() => emptyStream(components.length));
  const torn = new Set(groups.flatMap((group) => group.tears));
  const seen = streams.map((state, s) => (torn.has(s) ? emptyStream(components.length) : state));
  const inlets = wiring.inlets.map((list) => list.map((s) => seen[s]));
  const outlets = wiring.outlets.map((list) => list.map((s) => streams[s]));
  const feedNumber = new Map(feeds.map(({ name }, f) => [name, f]));
  const feedOf = wiring.enters.map((s) => feedNumber.get(flowsheet.streams[s].from.name)!);
  const settings = { blocks, feeds, ids: components.map((c) => c.id), reactions, vapourPressures };
  const bySettingPath = new Map<string, SettingAt>();
  const entering = { flowsMolPerS: new Float64Array(components.length), enthalpyW: 0 };

  return {
    flowsheet,
    mixture,
    blocks,
    kinds,
    running: frame.running,
    units,
    streams,
    seen,
    inlets,
    outlets,
    groups,
    smallestTears: frame.smallestTears,
    feeds,
    enters: wiring.enters,
    leaves: wiring.leaves,
    entering,
    refreshFeeds() {
      entering.flowsMolPerS.fill(0);
      entering.enthalpyW = 0;
      for (const [k, s] of wiring.enters.entries()) {
        const feed = feeds[feedOf[k]];
        const state = streams[s];
        feedFlows(feed, components, state.flowsMolPerS);
        state.temperatureK = feed.temperatureK;
        state.pressurePa = feed.pressurePa;
        mixture.settle(state);
        for (let i = 0; i < components.length; i++) entering.flowsMolPerS[i] += state.flowsMolPerS[i];
        entering.enthalpyW += Math.abs(state.enthalpyW);
      }
    },
    pass({ block, ahead }) {
      try {
        if (ahead === null) units[block].pass(inlets[block], outlets[block]);
        else units[block].passAhead!(ahead, inlets[block], outlets[block]);
      } catch (trouble) {
        throw named(trouble, block);
      }
    },
    passFlows({ block }) {
      try {
        units[block].passFlows!(inlets[block], outlets[block]);
      } catch (trouble) {
        throw named(trouble, block);
      }
    },
    set: (path, value) => found(path).move(value),
    get: (path) => found(path).read(),
    renewed() {
      if (vapourPressures.lnFactors.some((factor) => factor !== 0)) {
        vapourPressures.lnFactors.fill(0);
        vapourPressures.moves++;
      }
      return equip(frame);
    },
  };

  function found(path: string): SettingAt {
    let setting = bySettingPath.get(path);
    if (setting === undefined) {
      setting = settingAt(path, settings);
      bySettingPath.set(path, setting);
    }
    return setting;
  }

  function named(trouble: unknown, block: number): unknown {
    if (trouble instanceof PassTrouble) trouble.block ??= blocks[block].name;
    return trouble;
  }
}
