import { nearest } from '../diagnostics/nearest.ts';
import type { Aim, Handle } from '../model/flowsheet.ts';
import { formatQuantity, parseQuantity, splitQuantity, unitScale } from '../units/quantity.ts';
import type { Fault, Reading } from './findings.ts';
import { checkPart } from './issues.ts';
import type { NumericSetting } from './numeric-settings.ts';
import { handlesSchema } from './schema-studies.ts';
import { type SettingsWorld, trySetting } from './settings.ts';
import { entriesOf, nodeAt, placeInside, type YamlEntry, type YamlScalar } from './yaml-tree.ts';

/** What a handle is judged by. */
export interface HandleWorld {
  readonly settings: SettingsWorld;
  /** what can be moved; null where parts of the file could not be read: then nothing is judged */
  readonly known: readonly NumericSetting[] | null;
  readonly aims: readonly Aim[];
  /** paths that a case or `--set` has moved: they may stand outside the range of their handle */
  readonly moved: readonly string[];
}

/** The settings that a live page lets its reader move, each with its range, in the order of the file. */
export function readHandles(reading: Reading, world: HandleWorld): readonly Handle[] {
  const node = nodeAt(reading.root, ['handles']);
  if (node === undefined || checkPart(reading, handlesSchema, ['handles']) === undefined) return [];
  return entriesOf(node).flatMap((entry) => readHandle(reading, world, entry));
}

function readHandle(reading: Reading, world: HandleWorld, { key, keyPlace, value }: YamlEntry): Handle[] {
  const node = value as YamlScalar;
  const cannot = (place: YamlScalar['place'], fault: Fault): Handle[] => {
    reading.findings.error(place, fault);
    return [];
  };
  const range = rangeOf(node.text);
  if ('fault' in range) return cannot(node.place, range.fault);
  if (world.known === null) return [];
  const setting = world.known.find((one) => one.path === key);
  if (setting === undefined) return cannot(keyPlace, noSetting(key, world.known));
  const aim = world.aims.find((one) => one.move === key);
  if (aim !== undefined) {
    // No error: who adds an aim to a file with handles shall not have to take the file apart.
    reading.findings.warning(keyPlace, movedByAim(key, aim));
    return [];
  }
  const ends: number[] = [];
  for (const { text, offset, length } of range.ends) {
    const place = placeInside(node, offset, length);
    const read = parseQuantity(text, setting.dimension);
    if (!read.ok)
      return cannot(place, { code: read.code, what: `${key}: ${read.what}`, why: read.why, mend: read.mend });
    // A bare part of a composition is a number to the reader of feeds, not a text.
    const bare = splitQuantity(text)?.unit === '' ? Number(text) : text;
    const scalar = { kind: 'scalar', value: bare, text, place, textPlace: null } as const;
    if (trySetting(reading, world.settings, { path: key, pathPlace: keyPlace, value: scalar }) === undefined)
      return [];
    ends.push(read.value);
  }
  const [low, high] = ends as [number, number];
  if (!(low < high)) return cannot(node.place, notInOrder(key, low === high));
  // A part of a composition or a gauge pressure makes its way through SI and back: not to the last digit.
  const slack = 1e-9 * Math.max(Math.abs(low), Math.abs(high));
  const inside = setting.value >= low - slack && setting.value <= high + slack;
  if (!inside && !world.moved.includes(key)) return cannot(node.place, outside(setting));
  const scale = unitScale(range.unit, setting.dimension)!;
  return [{ path: key, between: [low, high], unit: range.unit, scale, places: range.places }];
}

/** Places of a slider where a range does not say how many. */
const PLACES = 101;
const MOST_PLACES = 10_001;

interface Range {
  readonly ends: readonly { readonly text: string; readonly offset: number; readonly length: number }[];
  readonly unit: string;
  readonly places: number;
}

/** `a..b` or `a..b:n`; an end without a unit takes that of the other. */
function rangeOf(text: string): Range | { readonly fault: Fault } {
  const match = /^(.*?)\.\.(.*?)(?::\s*(\S+)\s*)?$/s.exec(text);
  const places = match?.[3] === undefined ? PLACES : Number(match[3]);
  if (match === null) return { fault: noRange(text) };
  if (!Number.isSafeInteger(places) || places < 2 || places > MOST_PLACES)
    return { fault: badPlaces(match[3]!) };
  const written = [match[1]!, match[2]!];
  const unit = written.map((end) => splitQuantity(end)?.unit ?? '').findLast((one) => one !== '') ?? '';
  const ends = written.map((end, i) => {
    const bare = splitQuantity(end)?.unit === '';
    const offset = (i === 0 ? 0 : match[1]!.length + 2) + end.search(/\S|$/);
    return { text: bare ? `${end.trim()} ${unit}`.trim() : end.trim(), offset, length: end.trim().length };
  });
  return { ends, unit, places };
}

const EXAMPLE = 'write it as in condenser.temperature: -30 degC..15 degC';

function noRange(text: string): Fault {
  return {
    code: 'bad-handle',
    what: `"${text}" is no range.`,
    why: 'the two ends of a handle have .. between them, and may be followed by a colon and the number of places',
    mend: EXAMPLE,
  };
}

function badPlaces(text: string): Fault {
  return {
    code: 'bad-handle',
    what: `a handle cannot have ${text} places.`,
    why: `both ends are among them, so it is a whole number from 2 to ${MOST_PLACES}`,
    mend: 'write it as in -30 degC..15 degC:46, or leave it out',
  };
}

function noSetting(path: string, known: readonly NumericSetting[]): Fault {
  const near = nearest(
    path,
    known.map((one) => one.path),
  );
  const why = 'it is no setting of this file that is a number and has a value';
  return {
    code: 'unknown-setting',
    what: `${path} cannot be a handle.`,
    why: near === null ? why : `${why}; the nearest is ${near}`,
    mend: near === null ? 'write e.g. condenser.temperature or purge.fractions.bleed' : `write ${near}`,
  };
}

function movedByAim(path: string, aim: Aim): Fault {
  return {
    code: 'bad-handle',
    what: `${path} is a handle and moved by the aim ${aim.name}.`,
    why: 'the aim finds its value, whatever the handle says: a page shows no handle for it',
    mend: 'take out the handle, or the aim',
  };
}

function notInOrder(path: string, equal: boolean): Fault {
  return {
    code: 'bad-handle',
    what: `the range of ${path} is ${equal ? 'empty' : 'not in order'}.`,
    why: equal ? 'both ends are the same' : 'the lower end stands first',
    mend: equal ? 'write two different ends' : 'swap the two',
  };
}

function outside({ path, value, dimension }: NumericSetting): Fault {
  return {
    code: 'bad-handle',
    what: `${path} stands outside the range of its handle.`,
    why: `the file sets it to ${formatQuantity(value, dimension)}`,
    mend: 'widen the range, or change the setting',
  };
}
