import type { Component } from '../model/component.ts';
import { NORMAL_VOLUME_M3_PER_MOL } from '../properties/constants.ts';
import type { Flow } from '../units/schema.ts';
import { type BlockKinds, type Declared, readBlock } from './blocks.ts';
import { applyChanges, type Change, settingPath } from './changes.ts';
import { readFeeds } from './feeds.ts';
import { createFindings, type Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import { feedSchema, headerShape, ledgerSchema } from './schema.ts';
import { solveSchema } from './schema-studies.ts';
import { nodeAt, type Path, type YamlNode } from './yaml-tree.ts';

/** What is needed to try a changed setting. */
export interface SettingsWorld {
  readonly kinds: BlockKinds;
  readonly declared: Declared;
}

/**
 * Would these changes do, made together? Findings go into the reading's list. A part of the file that is at
 * fault as it stands is not judged.
 *
 * @returns the changed tree; null where a change will not do or cannot be judged
 */
export function tryChanges(
  reading: Reading,
  world: SettingsWorld,
  changes: readonly Change[],
): YamlNode | null {
  const findings = createFindings();
  const root = applyChanges(reading.root, changes, findings);
  const owners = new Map<string, Path>();
  for (const change of changes) {
    const target = settingPath(reading.root, change.path);
    if ('fault' in target) continue;
    const owner = target.path.slice(0, target.path.length > 2 ? 2 : 1);
    owners.set(owner.join('.'), owner);
  }
  const judged = [...owners.values()].filter(
    (owner) => faultsOf(reading.root, world, owner).list.length === 0,
  );
  const faults = [...findings.list, ...judged.flatMap((owner) => faultsOf(root, world, owner).list)];
  for (const { where, code, what, why, mend, also } of faults)
    reading.findings.error(where, { code, what, why, mend }, also);
  return faults.length > 0 || judged.length < owners.size ? null : root;
}

/**
 * Would this value do for this setting?
 *
 * @returns the setting in SI where it is a number, null where it is something else, undefined where it will not do
 */
export function trySetting(
  reading: Reading,
  world: SettingsWorld,
  change: Change,
): number | null | undefined {
  const root = tryChanges(reading, world, [change]);
  const target = settingPath(reading.root, change.path);
  if (root === null || 'fault' in target) return undefined;
  return valueAt({ root, findings: createFindings() }, world, target.path);
}

/** The errors of one block, feed or section. */
function faultsOf(root: YamlNode, world: SettingsWorld, owner: Path) {
  const findings = createFindings();
  const reading: Reading = { root, findings };
  const [section, name] = owner;
  if (section === 'blocks') readBlock(reading, world.kinds, world.declared, String(name));
  else if (section === 'feeds') {
    const { components, failedIds } = world.declared;
    readFeeds(onlyFeed(reading, String(name)), components, failedIds);
  } else if (section === 'solve') checkPart(reading, solveSchema, ['solve']);
  else if (section === 'ledger') checkPart(reading, ledgerSchema, ['ledger']);
  else checkPart<unknown>(reading, headerShape[section as keyof typeof headerShape], [section]);
  return { list: findings.list.filter(({ severity }) => severity === 'error') };
}

/** The reading with one feed alone. */
function onlyFeed({ root, findings }: Reading, name: string): Reading {
  if (root.kind !== 'mapping') return { root, findings };
  const entries = root.entries.map((entry) =>
    entry.key === 'feeds' && entry.value.kind === 'mapping'
      ? { ...entry, value: { ...entry.value, entries: entry.value.entries.filter((e) => e.key === name) } }
      : entry,
  );
  return { root: { ...root, entries }, findings };
}

function valueAt(reading: Reading, world: SettingsWorld, path: Path): number | null {
  const [section, name, ...rest] = path;
  let whole: unknown;
  if (section === 'blocks') whole = readBlock(reading, world.kinds, world.declared, String(name)).settings;
  else if (section === 'feeds') whole = checkPart(reading, feedSchema, ['feeds', name]);
  else return numberOrNull(nodeAt(reading.root, path));
  const value = rest.reduce<unknown>((at, key) => (isRecord(at) ? at[key] : undefined), whole);
  if (isRecord(value) && 'per' in value) {
    const flow = value as unknown as Flow;
    // The flows of a feed's components are kept in mol/s, however they are written.
    return section === 'feeds' && rest[0] === 'flows'
      ? molesPerSecond(flow, String(rest[1]), world)
      : flow.value;
  }
  return typeof value === 'number' ? value : null;
}

function molesPerSecond(flow: Flow, id: string, world: SettingsWorld): number {
  if (flow.per === 'molar') return flow.value;
  if (flow.per === 'normalVolume') return flow.value / NORMAL_VOLUME_M3_PER_MOL;
  const component = world.declared.components?.find((c: Component) => c.id === id);
  return component === undefined ? Number.NaN : flow.value / component.molarMassKgPerMol;
}

function numberOrNull(node: YamlNode | undefined): number | null {
  return node?.kind === 'scalar' && typeof node.value === 'number' ? node.value : null;
}

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null;
}
