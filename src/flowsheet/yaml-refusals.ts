import { type DocumentDirective, EVENT_ID, type Event } from 'js-yaml';
import type { Diagnostic } from '../diagnostics/diagnostic.ts';
import type { Place } from '../model/place.ts';
import { invisibleIn } from '../units/invisible.ts';
import { limits } from './limits.ts';
import type { Placer } from './text-places.ts';
import { readable } from './wording.ts';
import type { YamlNode } from './yaml-tree.ts';

/** A finding in the text of the file. */
export function trouble(code: string, where: Place, what: string, why: string, mend: string): Diagnostic {
  return { code, severity: 'error', where, what: readable(what), why: readable(why), mend: readable(mend) };
}

/** %YAML 1.2 says what is so anyway; every other directive asks for another reading of the file. */
export function isForeign(directive: DocumentDirective): boolean {
  return directive.kind !== 'yaml' || directive.version !== '1.2';
}

export function foreignDirective(source: string, places: Placer): Diagnostic {
  const [line] = /^%(?!YAML 1\.2).*/m.exec(source) ?? ['%'];
  const why = 'the file is read as YAML 1.2: no, on and 12:30 are text there, and 010 is ten';
  const where = places.at(source.indexOf(line), line.trimEnd().length);
  return trouble(
    'yaml-directive',
    where,
    `the directive ${cut(line.trim())} is not followed.`,
    why,
    'take the line out',
  );
}

/** @param event  the first of the second document */
export function secondDocument(event: Event | undefined, source: string, places: Placer): Diagnostic {
  const start = event === undefined ? source.length : startOf(event, source);
  const before = source.slice(0, start);
  const marks = [...before.matchAll(/^(---|\.\.\.)(?=\s|$)/gm)];
  const mark = marks.at(-1);
  const what = 'the file holds more than one document.';
  const why = `a line ${mark?.[0] ?? '---'} ${mark?.[0] === '...' ? 'ends the first' : 'begins a new one'}`;
  const mend = `keep one flowsheet in one file: take out the lines ${mark?.[0] ?? '---'} and what follows the first document`;
  return trouble('two-documents', places.at(mark?.index ?? 0, 3), what, why, mend);
}

function startOf(event: Event, source: string): number {
  if (event.type === EVENT_ID.SCALAR && event.valueStart >= 0) return event.valueStart;
  return event.type === EVENT_ID.SEQUENCE || event.type === EVENT_ID.MAPPING ? event.start : source.length;
}

/** What, why and mend of a key that cannot be one; null where it can. */
export function keyFault(key: YamlNode, value: YamlNode): readonly [string, string, string] | null {
  if (key.kind !== 'scalar' || key.text === '') {
    const why = 'every entry is written name: value';
    return ['a key is not a plain word.', why, 'write a name before the colon'];
  }
  if (key.text === '__proto__') {
    const why = 'it has a meaning of its own in JavaScript';
    return ['the key __proto__ is refused.', why, 'choose another name'];
  }
  if (key.text === '<<') {
    const why = 'merging is not part of YAML 1.2, and the part would lack what it was to bring in';
    return ['the key << is refused.', why, 'write the settings themselves'];
  }
  if (key.text.length > limits.key) {
    const why = `a key has at most ${limits.key} characters, and this one has ${key.text.length}`;
    return [
      `the key ${cut(key.text)} is too long.`,
      why,
      'choose a shorter name; a long text stands behind notes:',
    ];
  }
  if (typeof key.value === 'number' && value.kind === 'scalar' && value.text === '') {
    const why = 'inside braces a comma begins the next entry, as it would in 3,5';
    return [`the number ${key.text} stands where a name is needed.`, why, 'write a decimal point: 3.5'];
  }
  const invisible = invisibleIn(key.text);
  if (invisible === null) return null;
  const why = `it has the invisible character ${invisible.name} in it`;
  return [
    `the key ${cut(key.text.replaceAll(invisible.character, '?'))} is not plain text.`,
    why,
    'type the line anew',
  ];
}

/** Enough of a long text to know it by. */
function cut(text: string): string {
  return text.length > 60 ? `${text.slice(0, 60)}...` : text;
}
