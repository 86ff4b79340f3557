import { expect, test } from 'vitest';
import { compareJson, compareText } from '../../src/sheets/compare.ts';
import { compareCsv, compareMarkdown } from '../../src/sheets/compare-tables.ts';
import { compare } from '../../src/study/compare.ts';
import { read } from '../tally/read.ts';
import { shippedText } from '../tally/shipped.ts';

const text = shippedText('conversion-loop.yaml');

/** Yield of the loop in closed form: one pass converts 25 %, the purge takes a share of the rest. */
function yieldAt(purge: number): number {
  return 0.25 / (1 - 0.75 * (1 - purge));
}

async function compared(...changes: readonly string[]) {
  const members = await Promise.all(
    ['', ...changes].map(async (change) => ({
      name: change || 'base',
      flowsheet: await read(text, { set: change === '' ? [] : [change] }),
    })),
  );
  return compare(members);
}

test('the setting that differs stands alone among the settings, and the figures are held against the first', async () => {
  const found = await compared('purge.fractions.bleed=12 %', 'purge.fractions.bleed=3 %');
  expect(found.settings.map(({ path }) => path)).toEqual(['purge.fractions.bleed']);
  const row = found.figures.find(({ figure }) => figure === 'overall_yield')!;
  const base = row.values[0]!;
  const bleed = (await read(text)).blocks.find((b) => b.name === 'purge')!.settings['fractions'] as {
    bleed: number;
  };
  expect(base).toBeCloseTo(yieldAt(bleed.bleed), 9);
  [0.12, 0.03].forEach((purge, k) => {
    expect(row.values[k + 1]).toBeCloseTo(yieldAt(purge), 9);
    expect(row.differences[k + 1]).toBeCloseTo(yieldAt(purge) - base, 9);
    expect(row.relative[k + 1]).toBeCloseTo(yieldAt(purge) / base - 1, 9);
  });
  expect([row.differences[0], row.relative[0]]).toEqual([null, null]);
});

test('streams are matched by their tags, and those that not all have are counted in one line', async () => {
  const base = await read(text);
  const renamed = await read(text.replaceAll(/\bS2\b/g, 'X2').replaceAll(/\bS3\b/g, 'X3'));
  const found = compare([
    { name: 'A', flowsheet: base },
    { name: 'B', flowsheet: renamed },
  ]);
  expect(found.settings.filter(({ path }) => path.startsWith('streams'))).toEqual([
    {
      path: 'streams (by tag)',
      values: [
        { kind: 'text', text: '8' },
        { kind: 'text', text: '8: 2 new, 2 gone' },
      ],
    },
  ]);
  expect(compareText(found)).toMatch(/streams \(by tag\) +8 +8: 2 new, 2 gone\n/);
});

test('the per cent of a change has the sign of the change where the value is negative', async () => {
  const found = await compared('purge.fractions.bleed=12 %');
  const row = found.figures.find(
    ({ values, differences }) => values[0] !== null && values[0] < 0 && differences[1] !== 0,
  )!;
  expect(row.figure).toMatch(/^duty_kW/);
  expect(Math.sign(row.relative[1]!)).toBe(Math.sign(row.differences[1]!));
  expect(row.relative[1]).toBeCloseTo(row.differences[1]! / -row.values[0]!, 12);
});

test('equal flowsheets have no differing settings and differences of zero', async () => {
  const same = await read(text, { set: ['makeup.temperature=298.15 K'] });
  const twin = await read(text, { set: ['makeup.temperature=25 degC'] });
  const found = compare([
    { name: 'one', flowsheet: same },
    { name: 'other', flowsheet: twin },
  ]);
  expect(found.settings).toEqual([]);
  for (const { differences } of found.figures) expect(differences[1]).toBe(0);
  expect(compareText(found)).toContain('none: all columns are settled alike');
});

test('what closing leaves open is no difference, and a tenth of a per cent is one', async () => {
  const found = compare([
    { name: 'fine', flowsheet: await read(text, { set: ['solve.tolerance=1e-11'] }) },
    { name: 'coarse', flowsheet: await read(text, { set: ['solve.tolerance=1e-9'] }) },
  ]);
  expect(found.figures.filter(({ differences }) => differences[1] !== 0)).toEqual([]);
  const changed = await compared('purge.fractions.bleed=10.01 %');
  expect(changed.figures.find(({ figure }) => figure === 'overall_yield')!.differences[1]).not.toBe(0);
});

test('a column that does not close keeps its place, with its reason and without figures', async () => {
  const flowsheet = await read(shippedText('reference-loop.yaml'));
  const starved = { ...flowsheet, solve: { ...flowsheet.solve, maxPasses: 2 } };
  const found = compare([
    { name: 'base', flowsheet },
    { name: 'starved', flowsheet: starved },
  ]);
  expect(found.columns.map(({ closed }) => closed)).toEqual([true, false]);
  expect(found.columns[1].diagnosis!.code).toBe('too-few-passes');
  for (const { values, differences } of found.figures) {
    expect(values[1]).toBeNull();
    expect(differences[1]).toBeNull();
  }
  expect(compareText(found)).toMatch(/^starved: NOT CLOSED: /m);
  expect(compareMarkdown(found)).toMatch(/^- starved: NOT CLOSED: /m);
  const csv = compareCsv(found).split('\r\n');
  expect(csv[1]).toBe('closed,,,yes,no,,');
  const json = compareJson(found) as { columns: { closed: boolean; reason: { what: string } | null }[] };
  expect(json.columns[0].reason).toBeNull();
  expect(csv[2]).toContain(json.columns[1].reason!.what.slice(0, 20));
});

test('the text has at most 100 characters a line, whatever the columns are called', async () => {
  const flowsheet = await read(text);
  const names = Array.from({ length: 9 }, (_, k) => `a case with a rather long name, number ${k}`);
  const other = await read(text, { set: ['purge.fractions.bleed=3 %'] });
  const found = compare(names.map((name, k) => ({ name, flowsheet: k % 2 === 0 ? flowsheet : other })));
  const lines = compareText(found).split('\n');
  expect(lines.filter((line) => [...line].length > 100)).toEqual([]);
  expect(lines).toContain(`I  ${names[8]}: closed in ${found.columns[8].result!.convergence.passes} passes`);
});
