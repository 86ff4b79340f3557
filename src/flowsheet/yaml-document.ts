import {
  EVENT_ID,
  type Event,
  getScalarValue,
  parseEvents,
  SCALAR_STYLE,
  type ScalarEvent,
  YAMLException,
} from 'js-yaml';
import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import { isTooSmall } from '../units/no-quantity.ts';
import { limits, sizeText } from './limits.ts';
import { createPlacer, type Placer } from './text-places.ts';
import { foreignDirective, isForeign, keyFault, secondDocument, trouble } from './yaml-refusals.ts';
import type { YamlEntry, YamlNode, YamlScalar } from './yaml-tree.ts';
import { syntaxTrouble } from './yaml-trouble.ts';

export interface YamlDocument {
  /** null where the text cannot be read as one YAML document */
  readonly root: YamlNode | null;
  readonly diagnostics: readonly Diagnostic[];
}

/** Read YAML 1.2 (core schema) into a tree that knows its places. Never throws on any text. */
export function readYaml(text: string, file: string, maxBytes: number = limits.bytes): YamlDocument {
  const source = text.replace(/^\uFEFF/, '');
  const bytes = bytesOf(source, maxBytes);
  if (bytes > maxBytes) {
    const where = { file, line: 1, column: 1, length: 1 };
    const what = `the file is larger than ${sizeText(maxBytes)}.`;
    const why = `it has ${bytes} bytes; a plant of 2,000 blocks takes some 0.2 MiB`;
    return failed(
      trouble('file-too-large', where, what, why, 'name the flowsheet itself, or allow a larger file'),
    );
  }
  const places = createPlacer(source, file);
  try {
    return buildTree(parseEvents(source, { maxDepth: limits.depth }), source, places);
  } catch (error) {
    if (!(error instanceof YAMLException)) throw error;
    const found = syntaxTrouble(error.reason, source, error.mark?.position ?? 0);
    return failed({ ...found, severity: 'error', where: places.at(found.position, found.length) });
  }
}

/** Bytes in UTF-8; counted only where they may be too many. */
function bytesOf(source: string, most: number): number {
  return source.length * 3 <= most ? source.length : new TextEncoder().encode(source).length;
}

/** A plain scalar by the YAML 1.2 core schema; what no number can hold stays text, as do hexadecimal and octal. */
function resolvePlain(text: string): string | number | boolean | null {
  if (/^(|~|null|Null|NULL)$/.test(text)) return null;
  if (/^(true|True|TRUE)$/.test(text)) return true;
  if (/^(false|False|FALSE)$/.test(text)) return false;
  if (/^[-+]?(\.\d+|\d+(\.\d*)?)([eE][-+]?\d+)?$/.test(text)) {
    const value = Number(text);
    return Number.isFinite(value) && !isTooSmall(value, text) ? value : text;
  }
  return text;
}

interface Build {
  readonly events: readonly Event[];
  readonly source: string;
  readonly places: Placer;
  readonly diagnostics: Diagnostic[];
  readonly anchors: Map<string, { readonly node: YamlNode; readonly size: number }>;
  next: number;
  /** end of the last scalar, for the place of an empty value behind it */
  scalarEnd: number;
  aliases: number;
  nodes: number;
}

function buildTree(events: readonly Event[], source: string, places: Placer): YamlDocument {
  const starts = events.flatMap((event, i) => (event.type === EVENT_ID.DOCUMENT ? [i] : []));
  const documents = starts.length;
  if (documents > 1) return failed(secondDocument(events[starts[1] + 1], source, places));
  const directive = events.find((event) => event.type === EVENT_ID.DOCUMENT)?.directives.find(isForeign);
  if (directive !== undefined) return failed(foreignDirective(source, places));
  const build: Build = {
    events,
    source,
    places,
    diagnostics: [],
    anchors: new Map(),
    next: 1,
    scalarEnd: 0,
    aliases: 0,
    nodes: 0,
  };
  const empty = documents === 0 || events.length <= 1 || events[1].type === EVENT_ID.POP;
  const root = empty ? null : readNode(build);
  if (root === null) {
    const what = 'the file is empty.';
    return failed(
      trouble(
        'empty-file',
        places.at(0, 1),
        what,
        'there is no flowsheet in it',
        'write one, or start from `looptally new ammonia`',
      ),
    );
  }
  // A lost alias or entry leaves a hole that would only cause further messages.
  const whole = !build.diagnostics.some((d) => d.code === 'yaml-alias' || d.code === 'yaml-key');
  if (whole && build.nodes > limits.values) {
    const what = `the file holds more than ${limits.values} values.`;
    const why = 'a plant of 2,000 blocks has a tenth of that';
    return failed(trouble('file-too-large', places.at(0, 1), what, why, 'divide it into several flowsheets'));
  }
  return { root: whole ? root : null, diagnostics: build.diagnostics };
}

function readNode(build: Build): YamlNode {
  const event = build.events[build.next++];
  build.nodes++;
  if (event.type === EVENT_ID.ALIAS) return readAlias(build, event.anchorStart, event.anchorEnd);
  if (event.type === EVENT_ID.DOCUMENT || event.type === EVENT_ID.POP)
    throw new Error('unexpected YAML event');
  if (event.tagStart >= 0) {
    const place = build.places.between(event.tagStart, event.tagEnd);
    const tag = build.source.slice(event.tagStart, event.tagEnd);
    build.diagnostics.push(
      trouble(
        'yaml-tag',
        place,
        `the tag ${tag} is not known.`,
        'a flowsheet needs no tags',
        `take out ${tag}`,
      ),
    );
  }
  const before = build.nodes;
  const node = event.type === EVENT_ID.SCALAR ? readScalar(build, event) : readCollection(build, event);
  if (event.anchorStart >= 0) {
    const name = build.source.slice(event.anchorStart, event.anchorEnd);
    build.anchors.set(name, { node, size: build.nodes - before + 1 });
  }
  return node;
}

function readScalar(build: Build, event: ScalarEvent): YamlScalar {
  const { source, places } = build;
  if (event.valueStart < 0) {
    const place = places.at(build.scalarEnd, 1);
    return { kind: 'scalar', value: null, text: '', place, textPlace: null };
  }
  build.scalarEnd = event.valueEnd;
  const text = getScalarValue(source, event);
  const plain = event.style === SCALAR_STYLE.PLAIN;
  const quoted = event.style === SCALAR_STYLE.SINGLE_QUOTED || event.style === SCALAR_STYLE.DOUBLE_QUOTED;
  const [start, end] = quoted
    ? [event.valueStart - 1, event.valueEnd + 1]
    : [event.valueStart, event.valueEnd];
  const straight = source.slice(event.valueStart, event.valueEnd) === text;
  return {
    kind: 'scalar',
    value: plain ? resolvePlain(text) : text,
    text,
    place: places.between(start, end),
    textPlace: straight ? places.between(event.valueStart, event.valueEnd) : null,
  };
}

function readCollection(
  build: Build,
  event: Exclude<Event, ScalarEvent> & { readonly start: number },
): YamlNode {
  const isList = event.type === EVENT_ID.SEQUENCE;
  const items: YamlNode[] = [];
  const entries = new Map<string, YamlEntry>();
  while (build.events[build.next].type !== EVENT_ID.POP) {
    if (isList) items.push(readNode(build));
    else readEntry(build, entries);
  }
  build.next++;
  const place = build.places.toLineEnd(event.start);
  return isList ? { kind: 'list', items, place } : { kind: 'mapping', entries: [...entries.values()], place };
}

function readEntry(build: Build, entries: Map<string, YamlEntry>): void {
  const key = readNode(build);
  const value = readNode(build);
  const fault = keyFault(key, value);
  if (fault !== null) {
    build.diagnostics.push(trouble('yaml-key', key.place, ...fault));
    return;
  }
  if (key.kind !== 'scalar') return;
  const first = entries.get(key.text);
  if (first !== undefined) {
    const what = `the key ${key.text} stands here twice.`;
    const why = `line ${first.keyPlace.line} has it already, and only one of the two can count`;
    const found = trouble('duplicate-key', key.place, what, why, `take one out, or give it another name`);
    build.diagnostics.push({ ...found, also: first.keyPlace });
    return;
  }
  entries.set(key.text, { key: key.text, keyPlace: key.place, value });
}

function readAlias(build: Build, start: number, end: number): YamlNode {
  const name = build.source.slice(start, end);
  const place = build.places.between(start - 1, end);
  const target = build.anchors.get(name);
  build.aliases++;
  if (target !== undefined && build.aliases <= limits.aliases && build.nodes + target.size <= limits.values) {
    build.nodes += target.size;
    return target.node;
  }
  const [what, why, mend] =
    target === undefined
      ? [
          `the alias *${name} is not known.`,
          `no part above is marked &${name}; a part cannot hold itself`,
          'write the value itself',
        ]
      : [
          `the alias *${name} is one too many.`,
          `at most ${limits.aliases} aliases and ${limits.values} values are read`,
          'write the values themselves',
        ];
  const said = build.diagnostics.some(
    (d) => d.code === 'yaml-alias' && d.mend === mend && target !== undefined,
  );
  if (!said) build.diagnostics.push(trouble('yaml-alias', place, what, why, mend));
  return { kind: 'scalar', value: null, text: '', place, textPlace: null };
}

function failed(diagnostic: Diagnostic): YamlDocument {
  return { root: null, diagnostics: [diagnostic] };
}
