import { settingPath } from '../flowsheet/changes.ts';
import { readYaml } from '../flowsheet/yaml-document.ts';
import { entriesOf, nodeAt, type YamlNode, type YamlScalar } from '../flowsheet/yaml-tree.ts';
import type { Handle } from '../model/flowsheet.ts';
import { numberOf, withUnit } from '../sheets/page/handle-text.ts';
import type { LiveData } from '../sheets/page/live-data.ts';
import type { Moves } from './moves.ts';

/** A new text of the file, or the setting that has no value in it to be replaced. */
export type SavedFile = { readonly text: string } | { readonly missing: string };

interface Edit {
  readonly start: number;
  readonly end: number;
  readonly text: string;
}

/**
 * The flowsheet file with its values replaced in place: those of the case and of the command line that the page was made
 * with, then those moved in the page. Comments, order and spelling stay. A handle that a value has left is widened, for a
 * file whose setting stands outside its handle is refused.
 *
 * @param at  where the handles stand [SI]
 */
export function savedFile(
  data: LiveData,
  moves: Moves,
  handles: readonly Handle[],
  at: ReadonlyMap<string, number>,
): SavedFile {
  const { root } = readYaml(data.text, data.file);
  if (root === null) throw new Error('the file of a page was read before');
  const offsetOf = offsets(data.text);
  const changes = new Map([...caseTexts(root, data.case), ...data.set.map(pair), ...moves]);
  const edits: Edit[] = [];
  for (const [path, text] of changes) {
    const target = settingPath(root, path);
    const node = 'fault' in target ? undefined : nodeAt(root, target.path);
    if (node?.kind !== 'scalar') return { missing: path };
    edits.push(replaced(node, text, offsetOf));
    const handle = handles.find((one) => one.path === path);
    const range = nodeAt(root, ['handles', path]);
    const value = at.get(path);
    if (handle !== undefined && range?.kind === 'scalar' && value !== undefined) {
      const wide = widened(handle, value);
      if (wide !== null) edits.push(replaced(range, wide, offsetOf));
    }
  }
  let text = data.text;
  for (const { start, end, text: put } of edits.toSorted((a, b) => b.start - a.start))
    text = text.slice(0, start) + put + text.slice(end);
  const mark = text.startsWith('\ufeff') ? '\ufeff' : '';
  return { text: mark + head(data, changes) + text.slice(mark.length) };
}

function head({ file }: LiveData, changes: ReadonlyMap<string, string>): string {
  const words = (text: string) => text.replace(/[\p{Cc}\u2028\u2029]+/gu, ' ');
  return [
    `# Saved from the live page of ${words(file)}; set there:`,
    ...[...changes].map(([path, text]) => `#   ${words(path)}: ${words(text)}`),
    '',
  ].join('\n');
}

function caseTexts(root: YamlNode, name: string | null): [string, string][] {
  if (name === null) return [];
  return entriesOf(nodeAt(root, ['cases', name])).map(({ key, value }) => [
    key,
    value.kind === 'scalar' ? value.text : '',
  ]);
}

function pair(change: string): [string, string] {
  const at = change.indexOf('=');
  return [change.slice(0, at).trim(), change.slice(at + 1).trim()];
}

function replaced({ place }: YamlScalar, text: string, offsetOf: Offsets): Edit {
  const start = offsetOf(place.line, place.column);
  return { start, end: start + place.length, text };
}

/** The range of a handle with a value taken in; null where it lies inside. */
function widened(handle: Handle, value: number): string | null {
  const [low, high] = handle.between;
  if (value >= low && value <= high) return null;
  const ends = [Math.min(low, value), Math.max(high, value)];
  return `${ends.map((end) => withUnit(numberOf(handle, end), handle)).join('..')}:${handle.places}`;
}

type Offsets = (line: number, column: number) => number;

function offsets(text: string): Offsets {
  const starts = [text.startsWith('\ufeff') ? 1 : 0];
  for (const match of text.matchAll(/\r\n|\r|\n/g)) starts.push(match.index + match[0].length);
  return (line, column) => starts[line - 1]! + column - 1;
}
