import type { z } from 'zod';
import { nearest } from '../diagnostics/nearest.ts';
import type { Component } from '../model/component.ts';
import type { Feed } from '../model/flowsheet.ts';
import { NORMAL_VOLUME_M3_PER_MOL } from '../properties/constants.ts';
import { splitQuantity } from '../units/quantity.ts';
import type { Flow } from '../units/schema.ts';
import type { Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import { checkName } from './names.ts';
import { feedSchema } from './schema.ts';
import { requiredEntries } from './section.ts';
import { entriesOf, keyPlaceOfPath, nodeAt, type Path } from './yaml-tree.ts';

/** Per cent may be off by so much of rounding [%]. */
const PER_CENT_OFF = 0.5;

export type FeedEntry = z.infer<typeof feedSchema>;

export interface ReadFeeds {
  readonly feeds: readonly Feed[];
  /** null where there is no list of feeds to speak of */
  readonly names: readonly string[] | null;
  readonly assumptions: readonly string[];
}

/** The feeds, each by total flow and composition, or by the flow of every component. */
export function readFeeds(
  reading: Reading,
  components: readonly Component[] | null,
  failedIds: ReadonlySet<string>,
): ReadFeeds {
  const { root, findings } = reading;
  const example = 'feeds: {makeup: {flow: ..., temperature: ..., pressure: ..., composition: {...}}}';
  const entries = requiredEntries(reading, 'feeds', 'nothing can go round where nothing enters', example);
  const feeds: Feed[] = [];
  const assumptions: string[] = [];
  for (const { key, keyPlace } of entries ?? []) {
    checkName(findings, key, keyPlace, 'a feed');
    const path: Path = ['feeds', key];
    const entry = checkPart(reading, feedSchema, path);
    if (entry === undefined || !isWhole(reading, key, path, entry)) continue;
    if (components === null || !knowsComponents(reading, key, path, entry, components, failedIds)) continue;
    const parts = partsOf(entry, components);
    const sum = parts.reduce((total, value) => total + value, 0);
    if (sum <= 0) {
      const part = entry.flows === undefined ? 'composition' : 'flows';
      const what = `the ${part} of feed ${key} ${part === 'flows' ? 'are' : 'is'} all zero.`;
      const why = part === 'flows' ? 'nothing enters by this feed' : 'parts of nothing cannot be normalised';
      findings.error(keyPlaceOfPath(root, [...path, part]), {
        code: 'empty-feed',
        what,
        why,
        mend: 'give at least one component more than 0',
      });
      continue;
    }
    if (entry.flows === undefined && !isWholeSum(sum)) {
      warnOfPerCent(reading, key, path, sum);
      const unit = entry.basis === 'mass' ? 'mass' : 'mole';
      assumptions.push(
        `The composition of feed ${key} adds up to ${Number(sum.toPrecision(6))} parts by ${unit} and is normalised.`,
      );
    }
    feeds.push({
      name: key,
      temperatureK: entry.temperature,
      pressurePa: entry.pressure,
      flow: entry.flows === undefined ? entry.flow! : null,
      parts,
      basis: entry.basis ?? 'mole',
    });
  }
  return { feeds, names: entries?.map((e) => e.key) ?? null, assumptions };
}

/** Flow and composition, or flows: neither less nor more. */
function isWhole(reading: Reading, name: string, path: Path, entry: FeedEntry): boolean {
  const { root, findings } = reading;
  const { flow, composition, flows, basis } = entry;
  if (flows !== undefined) {
    const extra = ['flow', 'composition', 'basis'].filter(
      (key) => nodeAt(root, [...path, key]) !== undefined,
    );
    if (extra.length === 0) return true;
    findings.error(
      keyPlaceOfPath(root, [...path, extra[0]]),
      {
        code: 'too-many-settings',
        what: `the feed ${name} has both flows and ${extra.join(' and ')}.`,
        why: 'the flows of the components give total and composition already',
        mend: `take out flows, or ${extra.join(' and ')}`,
      },
      keyPlaceOfPath(root, [...path, 'flows']),
    );
    return false;
  }
  if (flow === undefined || composition === undefined) {
    const lacks =
      flow === undefined ? (composition === undefined ? 'flow and no composition' : 'flow') : 'composition';
    findings.error(keyPlaceOfPath(root, path), {
      code: 'missing-key',
      what: `the feed ${name} has no ${lacks}.`,
      why: 'a feed is given by flow and composition, or by the flows of its components',
      mend: lacks === 'composition' ? 'add composition: {H2: 74, N2: 26, ...}' : 'add flow: 6500 kmol/h',
    });
    return false;
  }
  return !mixesPerCent(reading, name, path, basis ?? 'mole');
}

/** {H2: 74 %, N2: 26} would be 0.74 to 26: certainly not meant. */
function mixesPerCent(reading: Reading, name: string, path: Path, basis: string): boolean {
  const node = nodeAt(reading.root, [...path, 'composition']);
  const written = entriesOf(node).map((e) => ({
    ...e,
    bare: e.value.kind === 'scalar' && splitQuantity(e.value.text)?.unit === '',
    zero: e.value.kind === 'scalar' && splitQuantity(e.value.text)?.number === 0,
  }));
  const bare = written.find((e) => e.bare && !e.zero);
  const perCent = written.find((e) => !e.bare);
  if (bare === undefined || perCent === undefined) return false;
  reading.findings.error(
    bare.value.place,
    {
      code: 'mixed-parts',
      what: `the composition of feed ${name} mixes bare parts with per cent or ppm.`,
      why: `parts are shares of their sum by ${basis}; 74 % is 0.74 parts, and 74 beside it is a hundred times as much`,
      mend: 'write all of them in % (or ppm), or all as bare numbers',
    },
    perCent.value.place,
  );
  return true;
}

/** Shares written in per cent that are no whole by more than rounding: a slip, or a component left out. */
function warnOfPerCent({ root, findings }: Reading, name: string, path: Path, sum: number): void {
  const written = entriesOf(nodeAt(root, [...path, 'composition']));
  const inPerCent = written.some(({ value }) => value.kind === 'scalar' && value.text.includes('%'));
  if (!inPerCent || Math.abs(100 * sum - 100) <= PER_CENT_OFF) return;
  findings.warning(keyPlaceOfPath(root, [...path, 'composition']), {
    code: 'composition-sum',
    what: `the composition of feed ${name} adds up to ${Number((100 * sum).toPrecision(5))} %, not to 100 %.`,
    why: 'it is normalised: every share is divided by the sum',
    mend: 'correct the shares, or write bare numbers where parts are meant',
  });
}

function knowsComponents(
  reading: Reading,
  name: string,
  path: Path,
  entry: FeedEntry,
  components: readonly Component[],
  failedIds: ReadonlySet<string>,
): boolean {
  const part = entry.flows === undefined ? 'composition' : 'flows';
  const known = components.map((c) => c.id);
  let all = true;
  for (const id of Object.keys(entry[part] ?? {})) {
    if (known.includes(id)) continue;
    all = false;
    if (failedIds.has(id) || nearest(id, failedIds) !== null) continue; // said already where it is declared
    const near = nearest(id, known);
    reading.findings.error(keyPlaceOfPath(reading.root, [...path, part, id]), {
      code: 'unknown-component',
      what: `the feed ${name} names the unknown component ${id}.`,
      why:
        near === null
          ? `the components of this file are ${known.join(', ')}`
          : `the nearest component is ${near}`,
      mend:
        near === null
          ? `add ${id} to components, or take it out here`
          : `write ${near}, or add ${id} to components`,
    });
  }
  return all;
}

/** Parts in component order: as given, or mol/s where flows are given. */
function partsOf(entry: FeedEntry, components: readonly Component[]): Float64Array {
  return Float64Array.from(components, (component) => {
    const flow = entry.flows?.[component.id];
    if (flow !== undefined) return molesPerSecond(flow, component);
    return entry.composition?.[component.id] ?? 0;
  });
}

function molesPerSecond(flow: Flow, component: Component): number {
  if (flow.per === 'mass') return flow.value / component.molarMassKgPerMol;
  return flow.per === 'molar' ? flow.value : flow.value / NORMAL_VOLUME_M3_PER_MOL;
}

function isWholeSum(sum: number): boolean {
  return Math.abs(sum - 1) < 1e-9 || Math.abs(sum - 100) < 1e-7;
}
