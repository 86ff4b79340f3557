import { expect, test } from 'vitest';
import type { Diagnostic } from '../../src/diagnostics/diagnostic.ts';
import { formatDiagnostic, formatDiagnostics } from '../../src/diagnostics/format.ts';
import { toJson } from '../../src/diagnostics/json.ts';

const text = `${'\n'.repeat(8)}  converter: {kind: reacter, temperature: 450 degC}\n`;
const unknownKind: Diagnostic = {
  code: 'unknown-kind',
  severity: 'error',
  where: { file: 'loop.yaml', line: 9, column: 21, length: 7 },
  what: 'Block converter is of kind "reacter".',
  why: 'no block of that kind; the nearest known kind is reactor',
  mend: 'write kind: reactor',
};

test('a message tells what, where with the line and carets, why and how to mend it', () => {
  expect(formatDiagnostic(unknownKind, { texts: { 'loop.yaml': text } })).toBe(
    [
      'loop.yaml:9:21 error unknown-kind',
      '  Block converter is of kind "reacter".',
      '   9 |   converter: {kind: reacter, temperature: 450 degC}',
      '     |                     ^^^^^^^',
      '  why:  no block of that kind; the nearest known kind is reactor',
      '  mend: write kind: reactor',
    ].join('\n'),
  );
});

test('a file whose text is not at hand is named without its line', () => {
  expect(formatDiagnostic(unknownKind, { texts: {} })).toBe(
    [
      'loop.yaml:9:21 error unknown-kind',
      '  Block converter is of kind "reacter".',
      '  why:  no block of that kind; the nearest known kind is reactor',
      '  mend: write kind: reactor',
    ].join('\n'),
  );
});

test('both places are shown where two entries disagree', () => {
  const twice = { ...unknownKind, also: { file: 'loop.yaml', line: 9, column: 3, length: 9 } };
  expect(
    formatDiagnostic(twice, { texts: { 'loop.yaml': text } })
      .split('\n')
      .slice(4, 7),
  ).toEqual([
    '  and loop.yaml:9:3',
    '   9 |   converter: {kind: reacter, temperature: 450 degC}',
    '     |   ^^^^^^^^^',
  ]);
});

test('colour is for those who ask for it, and changes no word', () => {
  const coloured = formatDiagnostic(unknownKind, { texts: { 'loop.yaml': text }, colour: true });
  expect(coloured).toContain('\u001b[31merror\u001b[39m');
  // biome-ignore lint/suspicious/noControlCharactersInRegex: colour codes are control characters
  expect(coloured.replace(/\u001b\[\d+m/g, '')).toBe(
    formatDiagnostic(unknownKind, { texts: { 'loop.yaml': text } }),
  );
});

test('a very long line is cut around the place, the carets still under it', () => {
  const long = `${'x'.repeat(300)}HERE${'y'.repeat(300)}`;
  const at = { ...unknownKind, where: { file: 'f', line: 1, column: 301, length: 4 } };
  const [, , line, carets] = formatDiagnostic(at, { texts: { f: long } }).split('\n');
  expect(line.length).toBeLessThan(130);
  expect(line.slice(carets.indexOf('^'), carets.lastIndexOf('^') + 1)).toBe('HERE');
});

test('control characters of the file do not reach the terminal', () => {
  const at = { ...unknownKind, where: { file: 'f', line: 1, column: 1, length: 1 } };
  expect(formatDiagnostic(at, { texts: { f: 'a\u001b[31mb\u0007\u202e' } })).toContain('   1 | a?[31mb??');
});

test('the messages are counted in the last line', () => {
  const warning = { ...unknownKind, severity: 'warning' as const };
  expect(formatDiagnostics([unknownKind, warning, unknownKind], { texts: {} })).toMatch(
    /2 errors, 1 warning$/,
  );
});

test('JSON has every key, flat, always', () => {
  expect(toJson(unknownKind)).toEqual({
    code: 'unknown-kind',
    severity: 'error',
    file: 'loop.yaml',
    line: 9,
    column: 21,
    length: 7,
    what: 'Block converter is of kind "reacter".',
    why: 'no block of that kind; the nearest known kind is reactor',
    mend: 'write kind: reactor',
    also: null,
  });
});
