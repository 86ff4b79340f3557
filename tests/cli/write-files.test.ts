import {
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { Refusal } from '../../src/cli/refusal.ts';
import { checkOutputs, writeOutputs } from '../../src/cli/write-files.ts';

let folder = '';
const at = (name: string) => join(folder, name);

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'looptally-write-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

describe('writing sheets', () => {
  test('replaces an old file whole and keeps its permissions', () => {
    writeFileSync(at('a.md'), 'a much longer text of old', { mode: 0o600 });
    writeOutputs([{ path: at('a.md'), content: 'new' }]);
    expect(readFileSync(at('a.md'), 'utf8')).toBe('new');
    expect(statSync(at('a.md')).mode & 0o777).toBe(0o600);
    expect(readdirSync(folder)).toEqual(['a.md']);
  });

  test('writes all or nothing: where one fails the others stay as they were', () => {
    writeFileSync(at('a.md'), 'old');
    expect(() =>
      writeOutputs([
        { path: at('a.md'), content: 'new' },
        { path: at('gone/b.md'), content: 'new' },
      ]),
    ).toThrow(Refusal);
    expect(readFileSync(at('a.md'), 'utf8')).toBe('old');
    expect(readdirSync(folder)).toEqual(['a.md']);
  });

  test('follows a link to the file it stands for', () => {
    mkdirSync(at('real'));
    writeFileSync(at('real/a.md'), 'old');
    symlinkSync(at('real/a.md'), at('link.md'));
    writeOutputs([{ path: at('link.md'), content: 'new' }]);
    expect(readFileSync(at('real/a.md'), 'utf8')).toBe('new');
    expect(readdirSync(folder).sort()).toEqual(['link.md', 'real']);
  });

  test.each([
    ['the flowsheet under another spelling', () => checkOutputs([at('./x/../loop.yaml')], at('loop.yaml'))],
    ['the flowsheet through a link', () => checkOutputs([at('link.yaml')], at('loop.yaml'))],
    ['one file twice', () => checkOutputs([at('a.md'), at('x/../a.md')], null)],
    ['a folder', () => checkOutputs([at('x')], null)],
    ['nothing', () => checkOutputs([''], null)],
  ])('refuses %s', (_, check) => {
    mkdirSync(at('x'));
    writeFileSync(at('loop.yaml'), 'looptally: 1');
    symlinkSync(at('loop.yaml'), at('link.yaml'));
    expect(check).toThrow(Refusal);
  });
});
