import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { runCases } from '../../fuzz/run-cases.ts';
import { nothing, type Summary, withCase } from '../../fuzz/summary.ts';
import { buildFuzz } from '../../scripts/build-fuzz.mjs';

const CASES = 2000;
let folder = '';
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'looptally-fuzz-'));
  await buildFuzz(join(folder, 'built'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

test(`${CASES} mutants of files, words and tables keep the contract, none takes 2 s`, async () => {
  let summary: Summary = nothing;
  await runCases({
    entry: join(folder, 'built', 'worker.mjs'),
    flowsheets: 'flowsheets',
    scratch: folder,
    seed: Number(process.env['SEED'] ?? 20261201),
    from: 0,
    step: 1,
    more: (done) => done < CASES,
    take: (judged) => {
      summary = withCase(summary, judged);
    },
  });
  expect(summary.findings).toEqual([]);
  expect(summary.cases).toBe(CASES);
  // The mutants are neither all nonsense nor all harmless.
  for (const outcome of [
    'structure: closed',
    'structure: refused',
    'set: closed',
    'bytes: closed',
    'journal: cut short',
  ])
    expect(summary.outcomes[outcome] ?? 0).toBeGreaterThan(10);
  for (const outcome of [
    'structure: not closed',
    'over: accepted',
    'formula: accepted',
    'slice: opened',
    'quantity: accepted',
  ])
    expect(summary.outcomes[outcome] ?? 0).toBeGreaterThan(0);
}, 240_000);
