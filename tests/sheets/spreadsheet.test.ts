import { spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { strFromU8, strToU8, unzipSync, zipSync } from 'fflate';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { workbook } from '../../src/sheets/workbook.ts';
import { shipped } from '../tally/shipped.ts';
import { closeShipped } from './closed.ts';
import { type ReadBook, readWorkbook } from './read-workbook.ts';

/** A spreadsheet program that works without a screen, where this machine has one. */
const program = ['soffice', 'libreoffice'].find((name) => spawnSync(name, ['--version']).status === 0);

// Where there is none these count as skipped; evaluate-formulas.ts checks the same numbers everywhere.
describe.skipIf(program === undefined)('a spreadsheet program', () => {
  let folder = '';
  const written = new Map<string, ReadBook>();

  beforeAll(async () => {
    folder = mkdtempSync(join(tmpdir(), 'looptally-books-'));
    mkdirSync(join(folder, 'in'));
    for (const name of shipped) {
      const { result, flowsheet } = await closeShipped(name);
      const bytes = workbook(result, flowsheet);
      written.set(name, readWorkbook(bytes));
      writeFileSync(join(folder, 'in', `${name}.xlsx`), withoutValues(bytes));
    }
    const files = shipped.map((name) => join(folder, 'in', `${name}.xlsx`));
    const profile = `-env:UserInstallation=${pathToFileURL(join(folder, 'profile'))}`;
    const { status, stderr } = spawnSync(
      program!,
      [profile, '--headless', '--convert-to', 'xlsx', '--outdir', join(folder, 'out'), ...files],
      { encoding: 'utf8' },
    );
    if (status !== 0) throw new Error(stderr);
  }, 300_000);
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  test.each(shipped)('opens the workbook of %s and works out every number again', (name) => {
    const ours = written.get(name)!;
    const theirs = readWorkbook(readFileSync(join(folder, 'out', `${name}.xlsx`)));
    expect([...theirs.sheets.keys()]).toEqual([...ours.sheets.keys()]);
    let count = 0;
    for (const [at, { value, formula }] of ours.cells) {
      if (formula === null || value === null) continue;
      count++;
      const found = theirs.cells.get(at)?.value ?? Number.NaN;
      const noise = /^(Ledger|Closure)!/.test(at) ? 1e-7 : 0;
      const open = /^Figures!/.test(at) && Math.abs(value) < 1e-9 ? 1e-12 : 0;
      expect(Math.abs(found - value), `${at} ${formula}: ${found}`).toBeLessThanOrEqual(
        1e-9 * Math.abs(value) + noise + open,
      );
    }
    expect(count).toBeGreaterThan(100);
  });

  test.each(shipped)('finds the names and the text of the workbook of %s', (name) => {
    const ours = written.get(name)!;
    const theirs = readWorkbook(readFileSync(join(folder, 'out', `${name}.xlsx`)));
    expect([...theirs.names].sort()).toEqual([...ours.names].sort());
    for (const [at, { text }] of ours.cells) {
      if (text !== null) expect(theirs.cells.get(at)?.text, at).toBe(text);
    }
  });
});

/** The same workbook with nothing beside its formulas, so that every number read back has been worked out. */
function withoutValues(bytes: Uint8Array): Uint8Array {
  const parts = Object.entries(unzipSync(bytes)).map(([name, content]) => [
    name,
    strToU8(strFromU8(content).replace(/<\/f><v>[^<]*<\/v>/g, '</f>')),
  ]);
  return zipSync(Object.fromEntries(parts));
}
