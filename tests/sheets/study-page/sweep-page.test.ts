import { describe, expect, test } from 'vitest';
import type { Flowsheet } from '../../../src/model/flowsheet.ts';
import { studyCharts } from '../../../src/sheets/study-page/study-charts.ts';
import { sweepPage } from '../../../src/sheets/study-page/sweep-page.ts';
import { sweepCsv } from '../../../src/sheets/sweep.ts';
import { type Axis, readAxis } from '../../../src/study/axis.ts';
import { createGrid } from '../../../src/study/grid.ts';
import type { PathTable } from '../../../src/study/sweep.ts';
import { joinedPaths, limitMargins, limitsToRecord, sweepOfStudy } from '../../../src/study/swept-table.ts';
import { shipped } from '../../study/read-study.ts';
import { HOSTILE, readPage } from './page-checks.ts';

const options = { version: '1.2.3', script: '', csvName: 'sweep.csv' };
const methanol = await shipped('methanol-optimum');
const INERTS = 'figures.inerts.converter';

function axis(path: string, text: string, dimension: 'fraction' | 'pressure' | 'temperature'): Axis {
  const read = readAxis(path, text, dimension);
  if ('code' in read) throw new Error(read.what);
  return read;
}

const bleed = axis('purge.fractions.bleed', '0.5 %..8 %:5 log', 'fraction');
const pressure = axis('makeup_compressor.pressure', '50 bar..110 bar:4', 'pressure');
const cold = axis('condenser.temperature', '10 degC, 20 degC, 40 degC', 'temperature');

/** A table that nobody had to close: every recorded value from the numbers of the axes. */
function swept(
  axes: readonly Axis[],
  record: Readonly<Record<string, (...settings: number[]) => number>>,
  failed: (row: number) => string = () => '',
) {
  const { size } = createGrid(axes);
  const cells: number[] = [];
  const notes = Array.from({ length: size }, (_, row) => failed(row));
  for (let row = 0; row < size; row++) {
    let rest = row;
    const settings = axes.map(() => 0);
    for (let a = axes.length - 1; a >= 0; a--) {
      const { numbers } = axes[a]!;
      settings[a] = numbers[rest % numbers.length]!;
      rest = Math.floor(rest / numbers.length);
    }
    const values = Object.values(record).map((f) => (notes[row] === '' ? f(...settings) : Number.NaN));
    // A table holds 12 digits.
    cells.push(...[...settings, ...values].map((value) => Number(value.toPrecision(12))));
  }
  const path: PathTable = {
    path: 0,
    rows: size,
    cells: Float64Array.from(cells),
    converged: Uint8Array.from(notes, (note) => (note === '' ? 1 : 0)),
    passes: new Int32Array(size).fill(4),
    notes,
  };
  const table = joinedPaths(axes, Object.keys(record), [path]);
  const heads = [
    ...axes.map(({ path: name, unit }) => `${name} [${unit}]`),
    ...table.record,
    'converged',
    'passes',
    'note',
  ];
  return { path, table, heads };
}

function pageOf(parts: ReturnType<typeof swept>, flowsheet: Flowsheet = methanol, reading: string[] = []) {
  const { table, heads } = parts;
  return sweepPage({ flowsheet, swept: table, heads, reading, addedLimits: [] }, options);
}

const one = swept([bleed], { 'figures.recycle_ratio': (p) => 9 / p, [INERTS]: (p) => 0.24 - 0.04 * p });

test('the page of a sweep says what was asked, draws all that is recorded and holds the table', () => {
  const page = readPage(pageOf(one, methanol, ['The purge sets the inerts.']));
  expect(page.headings).toEqual(['What it says', 'Charts', 'Least and greatest', 'Table', 'Data and use']);
  expect(page.text).toContain('purge.fractions.bleed : 0.5 % to 8 %, 5 values');
  expect(page.text).toContain('5, all closed');
  expect(page.text).toContain('The purge sets the inerts.');
  expect(page.elements.filter((name) => name === 'svg')).toHaveLength(2);
  expect(page.text).toMatch(/figures\.recycle_ratio 1\.1250 purge\.fractions\.bleed 8 % 18\.000 purge/);
  expect(page.text).toContain('Looptally 1.2.3');
});

test('the table that is downloaded has the bytes of the one that the command writes', () => {
  const { path, heads } = one;
  expect(readPage(pageOf(one)).csv).toEqual({
    name: 'sweep.csv',
    text: sweepCsv.head(heads) + sweepCsv.rows(path, heads),
  });
});

test('over one setting lines are drawn, with the limits of the objective and where they do not hold', () => {
  const { charts, slice } = studyCharts(methanol, one.table, 'chart');
  expect(slice).toBeNull();
  const [ratio, inerts] = charts as [(typeof charts)[0], (typeof charts)[0]];
  expect(inerts.svg).toContain('class="limit"');
  expect(inerts.svg).toContain('figures.inerts.converter &lt; 20 %');
  expect(ratio.svg).not.toContain('class="limit"');
  for (const { svg, note } of charts) {
    expect(svg).toContain('url(#chart-');
    expect(note).toBe('Hatched: a limit of the objective does not hold.');
  }
  // 0.24 - 0.04 p = 0.20 at 1 %, which is the second of the values 0.5, 1, 2, 4, 8 in equal ratios.
  const [from] = /data-x-axis="([\d.]+) ([\d.]+)/.exec(ratio.svg)!.slice(1).map(Number);
  const [left, width] = /<rect x="([\d.]+)" y="[\d.]+" width="([\d.]+)"/
    .exec(ratio.svg)!
    .slice(1)
    .map(Number);
  const end = Number(/data-x-axis="[\d.]+ ([\d.]+)/.exec(ratio.svg)![1]);
  expect(left).toBeCloseTo(from!, 1);
  expect(width! / (end - from!)).toBeCloseTo(1 / 4, 2);
});

test('over two settings contours are drawn, the setting of the file marked', () => {
  const two = swept([bleed, pressure], { [INERTS]: (p, P) => 0.3 - 0.03 * p - P / 1000 });
  const { charts, slice } = studyCharts(methanol, two.table, 'chart');
  expect(slice).toBeNull();
  expect(charts).toHaveLength(1);
  expect(charts[0]!.svg).toContain('class="contours"');
  expect(charts[0]!.svg).toContain('hatched: a limit does not hold');
  expect(charts[0]!.svg).toContain('as in the file');
  expect(charts[0]!.svg).toMatch(/data-x-axis="[^"]*linear" data-y-axis="[^"]*log"/);
});

test('of three settings two are drawn, and the page says which and where the third is held', () => {
  const three = swept([bleed, pressure, cold], { f: (p, P, t) => p + P + t });
  const { slice, charts } = studyCharts(methanol, three.table, 'chart');
  expect(slice).toBe(
    'The charts show one slice of the sweep: purge.fractions.bleed and makeup_compressor.pressure, with condenser.temperature = 20 degC, the middle of the values taken. All cases are in the table.',
  );
  // 0.5 + 50 + 20 at the lower left node.
  expect(/data-values="([\d.]+) /.exec(charts[0]!.svg)![1]).toBe('70.5');
  expect(readPage(pageOf(three)).text).toContain(slice!);
});

test('a setting with one value is no axis', () => {
  const held = swept([axis('condenser.temperature', '20 degC', 'temperature'), bleed], {
    f: (t, p) => t + p,
  });
  const { charts, slice } = studyCharts(methanol, held.table, 'chart');
  expect(charts[0]!.svg).toContain('class="curve"');
  expect(slice).toBeNull();
});

test('cases that failed are counted by their reasons, and leave a gap', () => {
  const failed = swept([bleed], { f: (p) => p }, (row) => (row > 2 ? `not closed in ${row}0 passes` : ''));
  const page = readPage(pageOf(failed));
  expect(page.text).toContain('5, 2 failed');
  expect(page.headings).toContain('Cases that failed');
  expect(page.text).toContain('2 cases, first in row 4: not closed in 30 passes');
  expect(page.text).toContain('No value at 2 of 5 points: the case failed.');
});

test('a sweep in which nothing closed still makes a page', () => {
  const page = readPage(pageOf(swept([bleed], { f: (p) => p }, () => 'no case closes')));
  expect(page.text).toContain('5, 5 failed');
  expect(page.text).toContain('f no value');
});

test('of many cases the page shows the first and says so; the table has all', () => {
  const many = swept([axis('purge.fractions.bleed', '1 %..10 %:600', 'fraction')], { f: (p) => p });
  const page = readPage(pageOf(many));
  expect(page.text).toContain('The first 400 of 600 cases');
  expect(page.csv.text.trimEnd().split('\r\n')).toHaveLength(601);
});

describe('limits', () => {
  test('whose figures are not recorded are recorded as well, each once', () => {
    expect(limitsToRecord(methanol, ['figures.recycle_ratio']).map(({ text }) => text)).toEqual([
      'figures.inerts.converter < 20 %',
    ]);
    expect(limitsToRecord(methanol, [INERTS])).toEqual([]);
  });

  test('are told by how far each case is from breaking one, against its bound', () => {
    const margins = limitMargins(methanol, one.table)!;
    expect(Array.from(margins, (margin) => Math.round(1e9 * margin) / 1e9 + 0)).toEqual([
      -0.1, 0, 0.2, 0.6, 1.4,
    ]);
    expect(limitMargins(methanol, swept([bleed], { f: (p) => p }).table)).toBeNull();
  });
});

test.each(HOSTILE)('whatever names and notes hold, it is text: %#', (evil) => {
  const flowsheet = { ...methanol, title: evil, file: evil, caseName: evil };
  const parts = swept([{ ...bleed, path: evil }], { [evil]: (p) => p }, (row) => (row === 1 ? evil : ''));
  const html = pageOf(parts, flowsheet, [evil]);
  const page = readPage(html);
  expect(page.elements).not.toContain('img');
  expect(page.elements.filter((name) => name === 'script')).toEqual([]);
  expect(html.match(/<script/g)).toHaveLength(1);
  expect(html.includes('\u202e')).toBe(false);
  for (const line of page.csv.text.split('\r\n')) {
    for (const cell of line.split(',')) expect(cell).not.toMatch(/^"?=/);
  }
});

test('a study in a file becomes a table and its sentences, unless it is too large', async () => {
  const file = await shipped('condenser-study');
  const { swept: found, lines } = sweepOfStudy(file, 400)!;
  expect(found.rows).toBe(10);
  expect(found.record).toHaveLength(6);
  expect(lines[0]).toMatch(/^Between 15 degC and -30 degC the yield goes from 91\.8 % to 94\.3 %/);
  expect(studyCharts(file, found, 'study').charts).toHaveLength(6);
  expect(sweepOfStudy(file, 9)).toBeNull();
  expect(sweepOfStudy(methanol, 400)).toBeNull();
});
