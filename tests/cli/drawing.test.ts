import { copyFileSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { commandLine } from './looptally.ts';

const root = fileURLToPath(new URL('../..', import.meta.url));
const { run, folder } = commandLine();

test('looptally sheet writes the drawing that the library makes, and its version on it', () => {
  copyFileSync(join(root, 'flowsheets/ammonia-loop.yaml'), join(folder(), 'loop.yaml'));
  expect(run(['sheet', 'loop.yaml', '--out', 'loop.svg'])).toEqual({
    code: 0,
    out: '',
    err: 'wrote loop.svg\n',
  });
  const golden = join(root, 'tests/sheets/__golden__/drawings/ammonia-loop.svg');
  const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
  const maker = new RegExp(`<text[^>]*>Looptally ${version}</text>`);
  const drawn = readFileSync(join(folder(), 'loop.svg'), 'utf8');
  expect(drawn).toMatch(maker);
  expect(drawn.replace(maker, '')).toBe(readFileSync(golden, 'utf8'));
});
