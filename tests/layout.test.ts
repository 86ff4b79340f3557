import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';

/** The folders of src from the top of the house down: a folder imports only from itself and those above it. */
const folders = [
  'model',
  'units',
  'diagnostics',
  'properties',
  'chemistry',
  'blocks',
  'graph',
  'flowsheet',
  'convergence',
  'tally',
  'study',
  'sheets',
  'live',
  'cli',
];
/** The rim: the only folders that may touch files, the process, a clock or the console. */
const rim = ['live', 'cli'];

const src = new URL('../src/', import.meta.url).pathname;
const files = folders.flatMap((folder) => filesBelow(folder));

test('every folder of src has its place in the order', () => {
  const found = readdirSync(src, { withFileTypes: true }).filter((entry) => entry.isDirectory());
  expect(found.map((entry) => entry.name).filter((name) => !folders.includes(name))).toEqual([]);
});

test('a folder imports only from folders above it', () => {
  const upward = importsBetweenFolders().filter(
    ({ from, to }) => folders.indexOf(to) > folders.indexOf(from),
  );
  expect(upward).toEqual([]);
});

test('no file outside the rim touches files, the process, a clock, chance or the console', () => {
  const forbidden = /from 'node:|\bprocess\.|\bconsole\.|\bDate\b|Math\.random|performance\.|\bfetch\(/;
  const core = files.filter((file) => !rim.includes(file.split('/')[0]));
  expect(core.length).toBeGreaterThan(50);
  expect(core.filter((file) => forbidden.test(withoutComments(read(file))))).toEqual([]);
});

test('no file is longer than one idea, tables of data aside', () => {
  const long = files.filter((file) => !file.includes('/data/') && read(file).split('\n').length > 330);
  expect(long).toEqual([]);
});

test('mathjs is imported in units only', () => {
  const users = files.filter((file) => /from 'mathjs|import\('mathjs/.test(read(file)));
  expect(users.filter((file) => !file.startsWith('units/'))).toEqual([]);
});

function read(file: string): string {
  return readFileSync(join(src, file), 'utf8');
}

function filesBelow(folder: string): string[] {
  let entries: string[];
  try {
    entries = readdirSync(join(src, folder), { recursive: true }) as string[];
  } catch {
    return []; // a folder kept free for later work
  }
  return entries.filter((entry) => entry.endsWith('.ts')).map((entry) => `${folder}/${entry}`);
}

function importsBetweenFolders(): { file: string; from: string; to: string }[] {
  return files.flatMap((file) => {
    const from = file.split('/')[0];
    const code = read(file);
    return [...code.matchAll(/(?:from|import\() ?'((?:\.\.\/)+)([a-z]+)\//g)]
      .map((match) => ({ file, from, to: match[2] }))
      .filter(({ to }) => folders.includes(to) && to !== from);
  });
}

function withoutComments(code: string): string {
  return code.replace(/\/\*[\s\S]*?\*\//g, '').replace(/\/\/.*$/gm, '');
}
