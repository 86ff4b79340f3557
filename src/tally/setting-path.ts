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

/**
 * Move the setting at a path that the reader has checked, e.g. `purge.fractions.bleed`, `makeup.composition.Ar`, or the
 * factor on a constant (flowsheet/constants.ts).
 *
 * @param value  SI; a flow in mol/s, kg/s or normal m3/s as the file counts it
 */
export function moveSetting(path: string, value: number, settings: Settings): void {
  const constant = constantAt(path);
  if (constant !== null) {
    moveConstant(constant, value, settings);
    return;
  }
  const [name, ...rest] = path.split('.');
  const block = settings.blocks.find((b) => b.name === name);
  if (block) {
    const { holder, key } = leaf(block.settings, rest);
    const present = holder[key];
    if (isFlow(present)) holder[key] = { ...present, value };
    else holder[key] = value;
    return;
  }
  const f = settings.feeds.findIndex((feed) => feed.name === name);
  const feed = settings.feeds[f];
  if (!feed) throw new Error(`no block or feed ${name} in setting path ${path}`);
  const [field, id] = rest;
  if (field === 'temperature') settings.feeds[f] = { ...feed, temperatureK: value };
  else if (field === 'pressure') settings.feeds[f] = { ...feed, pressurePa: value };
  else if (field === 'flow' && feed.flow) settings.feeds[f] = { ...feed, flow: { ...feed.flow, value } };
  else feed.parts[settings.ids.indexOf(id!)] = value;
}

/** The number at a path, undefined where the setting is left to its default. */
export function readSetting(path: string, settings: Settings): number | undefined {
  const constant = constantAt(path);
  if (constant !== null) return Math.exp(lnFactorOf(constant, settings));
  const [name, ...rest] = path.split('.');
  const block = settings.blocks.find((b) => b.name === name);
  if (block) {
    const { holder, key } = leaf(block.settings, rest);
    const present = holder[key];
    if (isFlow(present)) return present.value;
    return typeof present === 'number' ? present : undefined;
  }
  const feed = settings.feeds.find((one) => one.name === name);
  const [field, id] = rest;
  if (field === 'temperature') return feed?.temperatureK;
  if (field === 'pressure') return feed?.pressurePa;
  if (field === 'flow') return feed?.flow?.value;
  return feed?.parts[settings.ids.indexOf(id!)];
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
