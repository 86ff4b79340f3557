import type { Place } from '../model/place.ts';
import type { Diagnostic } from './diagnostic.ts';

export interface FormatOptions {
  /** text of the files the places lie in, by file name; a place in any other file is shown without its line */
  readonly texts: Readonly<Record<string, string>>;
  readonly colour?: boolean;
}

/** Lines longer than this are shown cut around the place. */
const WIDEST = 110;

/** The four-part message: where and code, what, the line with carets under the place, why, mend. */
export function formatDiagnostic(diagnostic: Diagnostic, options: FormatOptions): string {
  const { where, severity, code, also } = diagnostic;
  // They quote the file, and an escape sequence of the file must not reach a terminal.
  const [what, why, mend] = [diagnostic.what, diagnostic.why, diagnostic.mend].map(printable);
  const paint = options.colour === true ? colours : plain;
  const head = `${paint.strong(`${where.file}:${where.line}:${where.column}`)} ${paint[severity](severity)} ${code}`;
  const lines = [head, `  ${upperFirst(what)}`, ...excerpt(where, options, paint)];
  if (also !== undefined) {
    lines.push(`  and ${also.file}:${also.line}:${also.column}`, ...excerpt(also, options, paint));
  }
  lines.push(`  why:  ${why}`, `  mend: ${mend}`);
  return lines.join('\n');
}

/** All messages with an empty line between them, and a last line that counts them. */
export function formatDiagnostics(diagnostics: readonly Diagnostic[], options: FormatOptions): string {
  const errors = diagnostics.filter((d) => d.severity === 'error').length;
  const warnings = diagnostics.length - errors;
  const counts = [counted(errors, 'error'), counted(warnings, 'warning')].filter((text) => text !== '');
  return [...diagnostics.map((d) => formatDiagnostic(d, options)), counts.join(', ')].join('\n\n');
}

function counted(n: number, noun: string): string {
  return n === 0 ? '' : `${n} ${noun}${n === 1 ? '' : 's'}`;
}

function excerpt(place: Place, options: FormatOptions, paint: Paint): string[] {
  const text = Object.hasOwn(options.texts, place.file) ? options.texts[place.file] : undefined;
  const line = text?.replace(/^\uFEFF/, '').split(/\r\n|\r|\n/)[place.line - 1];
  if (line === undefined) return [];
  const at = place.column - 1;
  const from = at + Math.min(place.length, 40) > WIDEST ? Math.max(0, at - 40) : 0;
  const shown = printable(line.slice(from, from + WIDEST));
  const number = String(place.line).padStart(4);
  const carets = Math.max(1, Math.min(place.length, line.length - at, from + WIDEST - at));
  const cut = from > 0 ? '...' : '';
  const blank = ' '.repeat(at - from + cut.length);
  return [
    `${number} | ${cut}${shown}${line.length > from + WIDEST ? '...' : ''}`,
    `${' '.repeat(number.length)} | ${blank}${paint.caret('^'.repeat(carets))}`,
  ];
}

/** Tabs and control characters would put the carets in the wrong column, or worse. */
function printable(text: string): string {
  return text.replace(/\t/g, ' ').replace(/\p{Cc}|\p{Cf}/gu, '?');
}

function upperFirst(text: string): string {
  // A name of the file keeps its spelling; only our own words are sentences.
  return /^(the|a|an|no|nothing|this|it|two|here|there|aim|figure|stream|reaction|component) /.test(text)
    ? text.charAt(0).toUpperCase() + text.slice(1)
    : text;
}

interface Paint {
  strong(text: string): string;
  error(text: string): string;
  warning(text: string): string;
  caret(text: string): string;
}
const plain: Paint = { strong: same, error: same, warning: same, caret: same };
const colours: Paint = {
  strong: (text) => `\u001b[1m${text}\u001b[22m`,
  error: (text) => `\u001b[31m${text}\u001b[39m`,
  warning: (text) => `\u001b[33m${text}\u001b[39m`,
  caret: (text) => `\u001b[36m${text}\u001b[39m`,
};

function same(text: string): string {
  return text;
}
