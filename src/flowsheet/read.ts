import { blockKinds } from '../blocks/registry.ts';
import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { nearest } from '../diagnostics/nearest.ts';
import type { BlockSpec, Flowsheet } from '../model/flowsheet.ts';
import { loadUnitEngine, needsUnitEngine } from '../units/quantity.ts';
import { readAims } from './aims.ts';
import { type Declared, type ReadBlock, readBlocks } from './blocks.ts';
import { checkCases, chosenCase } from './cases.ts';
import { applyChanges, type Change, mendInFull, readSetChanges, SET_FILE } from './changes.ts';
import { readComponents, undeclaredGraphite } from './components.ts';
import { readCorrelations } from './correlations.ts';
import { readFeeds } from './feeds.ts';
import { readFigures } from './figures.ts';
import {
  createFindings,
  type Fault,
  type Findings,
  inOrder,
  type Reading,
  TooManyFaults,
} from './findings.ts';
import { formulaWorld } from './formula-scope.ts';
import { readHandles } from './handles.ts';
import { readHeader } from './header.ts';
import { readLedger } from './ledger.ts';
import { ledgerDefaults } from './ledger-defaults.ts';
import { hasTooManyEntries } from './limits.ts';
import { readObjective } from './objective.ts';
import { createPlaceOf } from './place-of.ts';
import { readPrices } from './prices.ts';
import { readReactions } from './reactions.ts';
import { fileKeys } from './schema.ts';
import { readSolve } from './solve.ts';
import { readSpreads, spreadableSettings } from './spreads.ts';
import { readStudy } from './study.ts';
import { readStreams } from './topology.ts';
import { readYaml } from './yaml-document.ts';
import { child, entriesOf, scalarsOf, type YamlNode, type YamlScalar } from './yaml-tree.ts';

export interface ReadOptions {
  /** name of the file, for messages */
  readonly file: string;
  /** changes `PATH=VALUE`, made after those of the case */
  readonly set?: readonly string[];
  /** name of the case to apply */
  readonly case?: string | null;
  /** largest size of the text in UTF-8 [bytes], 1 MiB if left out */
  readonly maxBytes?: number;
}

export interface ReadResult {
  /** null where there are errors */
  readonly flowsheet: Flowsheet | null;
  /** every finding of the file, in its order */
  readonly diagnostics: readonly Diagnostic[];
}

/** Read a flowsheet file: its text to a checked Flowsheet in SI, or to all that is wrong with it. Never throws on any text. */
export async function readFlowsheet(text: string, options: ReadOptions): Promise<ReadResult> {
  const { file } = options;
  const document = readYaml(text, file, options.maxBytes);
  if (document.root === null) return { flowsheet: null, diagnostics: document.diagnostics };
  const findings = createFindings();
  let flowsheet: Flowsheet | null = null;
  const changes: Change[] = [];
  try {
    flowsheet = await readChanged(document.root, findings, options, changes);
  } catch (error) {
    if (!(error instanceof TooManyFaults)) throw error;
  }
  const told = findings.list.map((finding) => mendInFull(finding, changes));
  const diagnostics = inOrder([...document.diagnostics, ...told], file);
  const sound = diagnostics.every((d) => d.severity === 'warning');
  return { flowsheet: sound ? flowsheet : null, diagnostics };
}

/**
 * The file with the changes of its case and of `--set`, checked.
 *
 * @param changes  written: those changes
 */
async function readChanged(
  written: YamlNode,
  findings: Findings,
  { file, set = [], case: caseName = null }: ReadOptions,
  changes: Change[],
): Promise<Flowsheet | null> {
  if (hasTooManyEntries({ root: written, findings })) return null;
  if (caseName !== null) changes.push(...chosenCase(written, caseName, findings));
  changes.push(...readSetChanges(set, findings));
  const root = applyChanges(written, changes, findings);
  if (scalarsWithUnits(root).some(({ text }) => needsUnitEngine(text))) await loadUnitEngine();
  return readTree({ root, findings }, written, file, caseName, changes);
}

/** Prices are per units of a table of their own. */
function scalarsWithUnits(root: YamlNode): YamlScalar[] {
  return entriesOf(root).flatMap(({ key, value }) => (key === 'prices' ? [] : [...scalarsOf(value)]));
}

function hasErrors({ list }: Reading['findings']): boolean {
  return list.some(({ severity }) => severity === 'error');
}

/** @param written  the file before any change to it */
function readTree(
  reading: Reading,
  written: YamlNode,
  file: string,
  caseName: string | null,
  changes: readonly Change[],
): Flowsheet | null {
  const { root, findings } = reading;
  if (!isFlowsheet(reading)) return null;
  const header = readHeader(reading);
  const read = readComponents(reading);
  const graphite = read === null ? null : undeclaredGraphite(root, read);
  const components =
    read === null ? null : graphite === null ? read.components : [...read.components, graphite];
  const failedIds = read?.failed ?? new Set<string>();
  const { reactions, failed } = readReactions(reading, components, failedIds);
  const feeds = readFeeds(reading, components, failedIds);
  const declared: Declared = { components, reactions, failedIds, failedReactions: failed };
  const blocks = readBlocks(reading, blockKinds, declared);
  const streams = readStreams(reading, feeds.names, blocks);
  const sound = components !== null && !hasErrors(findings);
  const defaults = ledgerDefaults(components ?? [], reactions, streams, blocks ?? []);
  // The ledger, formulas and tears name streams and components: they are judged where those could be read.
  const named =
    components !== null &&
    failedIds.size === 0 &&
    streams.length === entriesOf(child(root, 'streams')).length;
  const ledger = named ? readLedger(reading, components, streams, defaults) : null;
  const world = named
    ? formulaWorld({
        tags: streams.map((s) => s.tag),
        blocks: blocks?.map((b) => b.name) ?? [],
        components: components.map((c) => c.id),
      })
    : null;
  const settings = { kinds: blockKinds, declared };
  const cases = checkCases({ root: written, findings }, settings);
  const figures = readFigures(reading, world);
  const ownFigures = entriesOf(child(root, 'figures')).map((e) => e.key);
  const aims = readAims(reading, world === null ? null : { ...world, figures: ownFigures }, settings);
  // What depends on a part that is at fault would be told of a second time.
  const whole =
    components !== null &&
    failed.size === 0 &&
    blocks !== null &&
    feeds.feeds.length === feeds.names?.length &&
    blocks.every((block) => block.settings !== null);
  const spreadable = whole
    ? spreadableSettings({
        components,
        reactions,
        feeds: feeds.feeds,
        blocks: blocks.map(specOf),
        liquid: header?.values.liquid ?? 'antoine',
      })
    : null;
  const spreads = readSpreads(reading, spreadable, aims);
  const correlations = readCorrelations(reading, spreads);
  // Prices become formulas, and those cannot hold a name with other characters than names have.
  const isWellNamed = !findings.list.some(({ code }) => code === 'bad-name' || code === 'reserved-name');
  const priced =
    world === null || !whole || !isWellNamed
      ? null
      : readPrices(reading, components!, streams, feeds.names, blocks ?? [], ledger?.ledger ?? null);
  const objective =
    world === null || !whole
      ? null
      : readObjective(reading, { ...world, figures: ownFigures }, settings, priced, aims);
  const solve = readSolve(reading, named ? streams : null);
  const study = readStudy(reading, world === null ? null : { ...world, figures: ownFigures });
  const handles = readHandles(reading, {
    settings,
    known: spreadable?.filter(({ path }) => !/^(reactions|components)\./.test(path)) ?? null,
    aims,
    moved: changes.map(({ path }) => path),
  });
  if (
    !sound ||
    hasErrors(findings) ||
    blocks === null ||
    header === null ||
    ledger === null ||
    solve === null
  )
    return null;
  for (const { path, pathPlace } of changes) {
    const aim = aims.find((one) => one.move === path);
    if (aim) findings.warning(pathPlace, setAndAimed(path, aim.name));
  }
  return {
    file,
    caseName,
    ...header.values,
    components,
    reactions,
    feeds: feeds.feeds,
    blocks: blocks.map(specOf),
    streams,
    ledger: ledger.ledger,
    aims,
    cases,
    figures,
    spreads: spreads.spreads,
    correlations,
    prices: priced?.prices ?? null,
    objective,
    solve,
    study,
    handles,
    assumptions: [
      ...changes
        .filter(({ pathPlace }) => pathPlace.file === SET_FILE)
        .map(({ path, value }) => `Changed by --set: ${path} = ${changedTo(value)}.`),
      ...(graphite === null ? [] : ['Graphite (C_gr) is carried as a component, for a reaction names it.']),
      ...header.assumptions,
      ...feeds.assumptions,
      ...ledger.assumptions,
    ],
    placeOf: createPlaceOf(root),
  };
}

function setAndAimed(path: string, aim: string): Fault {
  return {
    code: 'set-and-aimed',
    what: `${path} is set here and moved by the aim ${aim}.`,
    why: 'the aim finds its value, and what is set here is only where it starts',
    mend: `to fix ${path}, take the aim out of the file`,
  };
}

function changedTo(value: YamlNode): string {
  return value.kind === 'scalar' ? value.text : 'another value';
}

/** A mapping with known keys; unknown ones are reported. */
function isFlowsheet({ root, findings }: Reading): boolean {
  if (root.kind !== 'mapping') {
    const what = 'the file is no flowsheet.';
    const why = `it holds ${root.kind === 'list' ? 'a list' : 'a single value'}, where names and their values are needed`;
    findings.error(root.place, {
      code: 'wrong-value',
      what,
      why,
      mend: 'begin with looptally: 1, or start from `looptally new ammonia`',
    });
    return false;
  }
  for (const { key, keyPlace } of root.entries) {
    if (fileKeys.includes(key)) continue;
    const near = nearest(key, fileKeys);
    findings.error(keyPlace, {
      code: 'unknown-key',
      what: `the file has an unknown key ${key}.`,
      why: near === null ? `it takes: ${fileKeys.join(', ')}` : `the nearest known key is ${near}`,
      mend: near === null ? `take ${key} out` : `write ${near}`,
    });
  }
  return true;
}

function specOf({ name, kind, settings }: ReadBlock): BlockSpec {
  if (kind === null || settings === null) throw new Error(`block ${name} was not read`);
  return { name, kind: kind.kind, settings };
}
