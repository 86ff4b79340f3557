import { type ConstantPath, constantAt } from '../flowsheet/constants.ts';
import type { BlockSpec, Feed } from '../model/flowsheet.ts';
import type { Reaction } from '../model/reaction.ts';
import type { MovedVapourPressures } from '../properties/liquid-phase.ts';

/** The movable settings of a plant. */
export interface Settings {
  readonly blocks: readonly BlockSpec[];
  readonly feeds: Feed[];
  /** component ids in declared order */
  readonly ids: readonly string[];
  readonly reactions: readonly Reaction[];
  readonly vapourPressures: MovedVapourPressures;
}

/** One setting of a plant, found by its path. */
export interface SettingAt {
  /** the number, undefined where the setting is left to its default */
  read(): number | undefined;
  /** @param value  SI; a flow in mol/s, kg/s or normal m3/s as the file counts it */
  move(value: number): void;
}

/**
 * The setting at a path that the reader has checked, e.g. `purge.fractions.bleed`, `makeup.composition.Ar`, or the factor
 * on a constant (flowsheet/constants.ts).
 */
export function settingAt(path: string, settings: Settings): SettingAt {
  const constant = constantAt(path);
  if (constant !== null) {
    return {
      read: () => Math.exp(lnFactorOf(constant, settings)),
      move: (value) => moveConstant(constant, value, settings),
    };
  }
  const [name, ...rest] = path.split('.');
  const block = settings.blocks.find((b) => b.name === name);
  if (block) return ofBlock(block, rest);
  const f = settings.feeds.findIndex((feed) => feed.name === name);
  if (f < 0) throw new Error(`no block or feed ${name} in setting path ${path}`);
  return ofFeed(settings, f, rest);
}

function ofBlock(block: BlockSpec, keys: readonly string[]): SettingAt {
  const { holder, key } = leaf(block.settings, keys);
  return {
    read() {
      const present = holder[key];
      if (isFlow(present)) return present.value;
      return typeof present === 'number' ? present : undefined;
    },
    move(value) {
      const present = holder[key];
      holder[key] = isFlow(present) ? { ...present, value } : value;
    },
  };
}

function ofFeed({ feeds, ids }: Settings, f: number, [field, id]: readonly string[]): SettingAt {
  switch (field) {
    case 'temperature':
      return {
        read: () => feeds[f]!.temperatureK,
        move(value) {
          feeds[f] = { ...feeds[f]!, temperatureK: value };
        },
      };
    case 'pressure':
      return {
        read: () => feeds[f]!.pressurePa,
        move(value) {
          feeds[f] = { ...feeds[f]!, pressurePa: value };
        },
      };
    case 'flow':
      return {
        read: () => feeds[f]!.flow?.value,
        move(value) {
          const feed = feeds[f]!;
          feeds[f] = { ...feed, flow: { ...feed.flow!, value } };
        },
      };
    default: {
      const i = ids.indexOf(id!);
      return {
        read: () => feeds[f]!.parts[i],
        move(value) {
          feeds[f]!.parts[i] = value;
        },
      };
    }
  }
}

function moveConstant({ of, name }: ConstantPath, value: number, settings: Settings): void {
  if (of === 'reaction') {
    settings.reactions.find((reaction) => reaction.name === name)!.moved!.lnFactor = Math.log(value);
    return;
  }
  settings.vapourPressures.lnFactors[settings.ids.indexOf(name)] = Math.log(value);
  settings.vapourPressures.moves += 1;
}

function lnFactorOf({ of, name }: ConstantPath, { reactions, vapourPressures, ids }: Settings): number {
  return of === 'reaction'
    ? reactions.find((reaction) => reaction.name === name)!.moved!.lnFactor
    : vapourPressures.lnFactors[ids.indexOf(name)];
}

function leaf(root: Readonly<Record<string, unknown>>, keys: readonly string[]) {
  let holder = root as Record<string, unknown>;
  for (const key of keys.slice(0, -1)) holder = holder[key] as Record<string, unknown>;
  return { holder, key: keys.at(-1)! };
}

function isFlow(value: unknown): value is { value: number; per: string } {
  return typeof value === 'object' && value !== null && 'per' in value && 'value' in value;
}
