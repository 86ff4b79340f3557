import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { formatDiagnostics } from '../../src/diagnostics/format.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';

const text = readFileSync(new URL('ammonia.yaml', import.meta.url), 'utf8');

/** One slip of an editor or of a disk. */
type Slip = (source: string) => string;
const position = fc.double({ min: 0, max: 1, noNaN: true });
const junk = fc.oneof(
  fc.string({ maxLength: 6 }),
  fc.string({ unit: 'binary', maxLength: 4 }),
  fc.constantFrom(
    '\t',
    '\r',
    ':',
    '- ',
    '{',
    '}',
    '[',
    ']',
    '"',
    "'",
    '&a ',
    '*a',
    '!!x ',
    '#',
    '|',
    '>',
    '%',
    '@',
    '\u0000',
    '\ufeff',
    '---\n',
    '\n\n',
    '->',
    '__proto__: ',
    'null',
    '1e999',
    '.nan',
  ),
);
const deletion = fc.tuple(position, fc.nat(30)).map(
  ([at, n]): Slip =>
    (s) => {
      const i = Math.floor(at * s.length);
      return s.slice(0, i) + s.slice(i + n);
    },
);
const insertion = fc.tuple(position, junk).map(
  ([at, what]): Slip =>
    (s) => {
      const i = Math.floor(at * s.length);
      return s.slice(0, i) + what + s.slice(i);
    },
);
const lineSwap = fc.tuple(position, position).map(
  ([a, b]): Slip =>
    (s) => {
      const lines = s.split('\n');
      const [i, j] = [Math.floor(a * (lines.length - 1)), Math.floor(b * (lines.length - 1))];
      [lines[i], lines[j]] = [lines[j], lines[i]];
      return lines.join('\n');
    },
);
const wordSwap = fc.tuple(position, position).map(
  ([a, b]): Slip =>
    (s) => {
      const words = s.split(/(\b)/);
      const [i, j] = [Math.floor(a * (words.length - 1)), Math.floor(b * (words.length - 1))];
      [words[i], words[j]] = [words[j], words[i]];
      return words.join('');
    },
);
const slips = fc.array(fc.oneof(deletion, insertion, lineSwap, wordSwap), { minLength: 1, maxLength: 4 });

async function readsOrTells(source: string): Promise<void> {
  const { flowsheet, diagnostics } = await readFlowsheet(source, { file: 'f.yaml' });
  expect(flowsheet === null).toBe(diagnostics.length > 0);
  const lines = source.replace(/^\uFEFF/, '').split(/\r\n|\r|\n/);
  for (const { where, what, why, mend } of diagnostics) {
    expect(where.line).toBeGreaterThanOrEqual(1);
    expect(where.line).toBeLessThanOrEqual(lines.length);
    expect(where.column).toBeGreaterThanOrEqual(1);
    expect(where.column).toBeLessThanOrEqual(lines[where.line - 1].length + 1);
    for (const part of [what, why, mend]) expect(part).toMatch(/\S/);
    expect(`${what}${why}${mend}`).not.toMatch(/undefined|\[object|NaN/);
  }
  formatDiagnostics(diagnostics, { texts: { 'f.yaml': source } });
}

test('a mangled file is read or refused with places inside it, and never throws', async () => {
  await fc.assert(
    fc.asyncProperty(slips, (mangle) => readsOrTells(mangle.reduce((s, slip) => slip(s), text))),
    { numRuns: 600 },
  );
});

test('arbitrary text never throws', async () => {
  await fc.assert(
    fc.asyncProperty(fc.string({ unit: 'binary', maxLength: 300 }), (source) => readsOrTells(source)),
    { numRuns: 300 },
  );
});

test('a hostile file is refused quickly', async () => {
  const hostile = [
    `title: ${'['.repeat(100_000)}`,
    `${'a: {'.repeat(2000)}`,
    `title: "${'x'.repeat(2_000_000)}`,
    `a: &a x\n${Array.from({ length: 5000 }, (_, i) => `k${i}: *a`).join('\n')}`,
    Array.from({ length: 20_000 }, (_, i) => `k${i}: 1`).join('\n'),
    `figures: {a: {formula: '${'('.repeat(900)}'}}`,
    `streams:\n${Array.from({ length: 5000 }, (_, i) => `  S${i}: a${i} -> b${i}`).join('\n')}`,
  ];
  for (const source of hostile) {
    const start = performance.now();
    await readsOrTells(source);
    // A human waits this long without noticing on an idle machine in a fifth of it.
    expect(performance.now() - start).toBeLessThan(5000);
  }
});
