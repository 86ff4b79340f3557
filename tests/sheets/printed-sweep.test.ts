import { expect, test } from 'vitest';
import { printedSweep } from '../../src/sheets/printed-sweep.ts';
import type { PathTable } from '../../src/study/sweep.ts';

const heads = ['condenser.temperature [degC]', 'figures.inerts.converter', 'figures.recycle_ratio'];
const closing = ['converged', 'passes', 'note'];
const table: PathTable = {
  path: 0,
  rows: 2,
  cells: Float64Array.from([-25, 0.1, 3.1234567, 10, 0.2, Number.NaN]),
  converged: Uint8Array.from([1, 0]),
  passes: Int32Array.from([6, 200]),
  notes: ['', 'the recycle through S8 did not close'],
};
const printed = (width: number) => {
  const sweep = printedSweep([...heads, ...closing], 1, width);
  return (sweep.before + sweep.rows(table) + sweep.after()).split('\n');
};
const longest = (lines: readonly string[]) =>
  Math.max(...lines.map((line) => line.replace(/ +the recycle.*$/, '').length));

test('a table that fits has its names in the heads', () => {
  expect(printed(200)).toEqual([
    'condenser.temperature [degC]  figures.inerts.converter  figures.recycle_ratio  converged  passes  note',
    '                         -25                       0.1                3.12346        yes       6',
    '                          10                       0.2                      -         no     200  the recycle through S8 did not close',
    '',
  ]);
});

test('in a narrow terminal letters stand for the names', () => {
  const lines = printed(80);
  expect(lines).toEqual([
    'A  condenser.temperature [degC]',
    'B  figures.inerts.converter',
    'C  figures.recycle_ratio',
    '',
    '          A            B            C  converged  passes  note',
    '        -25          0.1      3.12346        yes       6',
    '         10          0.2            -         no     200  the recycle through S8 did not close',
    '',
  ]);
});

test('in a very narrow one the columns stand below each other, the settings in each part', () => {
  const lines = printed(20);
  expect(longest(lines.slice(3))).toBeLessThanOrEqual(20);
  expect(lines.slice(3)).toEqual([
    '',
    '  A    B        C',
    '-25  0.1  3.12346',
    ' 10  0.2        -',
    '',
    '  A  converged',
    '-25        yes',
    ' 10         no',
    '',
    '  A  passes  note',
    '-25       6',
    ' 10     200  the recycle through S8 did not close',
    '',
  ]);
});
