import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { codes } from '../../src/diagnostics/codes.ts';

const sources = readdirSync(new URL('../../src/', import.meta.url), { recursive: true })
  .map(String)
  .filter((name) => name.endsWith('.ts'))
  .map((name) => readFileSync(new URL(`../../src/${name}`, import.meta.url), 'utf8'));

const written = new Set(
  sources.flatMap((text) =>
    [
      ...text.matchAll(/\bcode: '([a-z-]+)'/g),
      ...text.matchAll(/\b(?:PassTrouble|trouble)\(\s*'([a-z-]+)'/g),
    ].map((match) => match[1]),
  ),
);
// `custom` is zod's own; `missing` becomes `missing-key` before anybody sees it.
written.delete('custom');
written.delete('missing');

test('every code that is written has its meaning listed', () => {
  expect([...written].filter((code) => !Object.hasOwn(codes, code))).toEqual([]);
});

test('a meaning is one short line', () => {
  for (const meaning of Object.values(codes)) expect(meaning).toMatch(/^[a-z].{8,90}[^.]$/);
});
