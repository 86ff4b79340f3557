import { invisibleIn } from '../units/invisible.ts';
import { limits } from './limits.ts';
import { openMark } from './open-mark.ts';

/** What the YAML parser could not read, in our words. */
export interface SyntaxTrouble {
  readonly code: 'yaml';
  readonly position: number;
  readonly length: number;
  readonly what: string;
  readonly why: string;
  readonly mend: string;
}

/** Say in plain words why the parser stopped at `position`; its own reason where we have none. */
export function syntaxTrouble(reason: string, source: string, position: number): SyntaxTrouble {
  const tabbed = reason === 'deficient indentation' && lineAt(source, position).includes('\t');
  if (tabbed) {
    const why = 'a tab stands before a bracket on this line, and the columns cannot be told';
    return trouble(source.lastIndexOf('\t', position), why, 'write blanks in place of tabs');
  }
  const open = /indentation|end of the stream|quoted/.test(reason) ? openMark(source, position) : null;
  if (open !== null) {
    const quote = open.mark === '"' || open.mark === "'";
    const noun = quote ? 'quotation mark' : 'bracket';
    const why = `the ${noun} ${open.mark} is opened here and ${quote ? 'not closed on this line' : 'never closed'}`;
    return trouble(open.position, why, `close it with ${closing[open.mark]}`);
  }
  // At the end of the text there is nothing to point at: point at the last thing written.
  const end = source.trimEnd().length;
  const at = position >= end ? Math.max(0, end - 1) : position;
  const [why, mend] = explain(reason, source, position);
  return trouble(at, why, mend);
}

const closing: Readonly<Record<string, string>> = { '[': ']', '{': '}', '"': '"', "'": "'" };

function trouble(position: number, why: string, mend: string): SyntaxTrouble {
  return { code: 'yaml', position, length: 1, what: 'the file cannot be read as YAML.', why, mend };
}

function explain(reason: string, source: string, position: number): readonly [string, string] {
  const before = source.slice(source.lastIndexOf('\n', position - 1) + 1, position);
  const at = source[position] ?? '';
  const invisible = invisibleIn(lineAt(source, position));
  if (reason.includes('tab characters')) {
    return [
      'a tab stands where the line is indented, and tabs have no fixed width',
      'indent with spaces, two for each step',
    ];
  }
  if (reason.includes('maxDepth'))
    return [
      `brackets or indents are nested more than ${limits.depth} deep, and no flowsheet needs that`,
      'flatten the file',
    ];
  if (reason.includes('null byte') || reason.includes('non-printable')) {
    return ['it contains characters that are no text', 'is this the flowsheet? save it as plain text, UTF-8'];
  }
  if (invisible !== null) {
    return [`the line has the invisible character ${invisible.name} in it`, 'type the line anew'];
  }
  if (at === '%' || at === '@' || at === '`') {
    return [`a value cannot begin with ${at}`, `put the value into quotes, or write a number before ${at}`];
  }
  if (reason === 'bad indentation of a mapping entry' && /:\s/.test(before)) {
    return [
      'after the value of a key something more follows on the line, perhaps a second colon or a lost comma',
      'put a value that contains a colon into quotes, and a comma between the entries inside braces',
    ];
  }
  if (reason.includes('indentation') || reason.includes('end of the stream or a document separator')) {
    return [
      `this line is not indented like its neighbours (${lower(reason)})`,
      'begin the entries of one level in one column',
    ];
  }
  return [
    lower(reason),
    'look for a bracket, a quotation mark, a colon or an indent that is wrong here or just above',
  ];
}

function lineAt(source: string, position: number): string {
  const start = Math.max(source.lastIndexOf('\n', position - 1), source.lastIndexOf('\r', position - 1)) + 1;
  const end = source.slice(start).search(/[\r\n]/);
  return end < 0 ? source.slice(start) : source.slice(start, start + end);
}

function lower(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}
