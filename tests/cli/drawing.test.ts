import { copyFileSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { commandLine } from './looptally.ts';

const root = fileURLToPath(new URL('../..', import.meta.url));
const { run, folder } = commandLine();

test('looptally sheet writes the drawing that the library makes', () => {
  copyFileSync(join(root, 'flowsheets/ammonia-loop.yaml'), join(folder(), 'loop.yaml'));
  expect(run(['sheet', 'loop.yaml', '--out', 'loop.svg'])).toEqual({
    code: 0,
    out: '',
    err: 'wrote loop.svg\n',
  });
  const golden = join(root, 'tests/sheets/__golden__/drawings/ammonia-loop.svg');
  expect(readFileSync(join(folder(), 'loop.svg'), 'utf8')).toBe(readFileSync(golden, 'utf8'));
});
