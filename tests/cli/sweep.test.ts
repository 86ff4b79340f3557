import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { asyncBufferFromFile, parquetReadObjects } from 'hyparquet';
import { beforeAll, describe, expect, test } from 'vitest';
import { run as runHere } from '../../src/cli/program.ts';
import { commandLine } from './looptally.ts';

const { run, folder, program } = commandLine();
const reference = readFileSync(new URL('../../flowsheets/reference-loop.yaml', import.meta.url), 'utf8');
const GRID = [
  '--over',
  'condenser.temperature=-25 degC..10 degC:6',
  '--over',
  'purge.fractions.bleed=0.5 %..10 %:20 log',
];

const at = (name: string) => join(folder(), name);
const read = (name: string) => readFileSync(at(name));
/** A sweep that must go well; its table. */
function table(name: string, ...words: string[]): Buffer {
  const { code, err } = run(['sweep', 'loop.yaml', ...words, '--out', name, '--quiet']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  return read(name);
}

beforeAll(() => writeFileSync(at('loop.yaml'), reference));

test('a sweep of a loop that keeps a component for ever says so, and tells each case as not closed', () => {
  const trapped = reference.replace('bleed: 3 %', 'bleed: 0 %').replace(/^handles:[\s\S]*/m, '');
  writeFileSync(at('trapped.yaml'), trapped);
  const over = ['--over', 'condenser.temperature=-20 degC, 0 degC', '--out', 'trapped.csv'];
  const { code, err } = run(['sweep', 'trapped.yaml', ...over]);
  expect(code).toBe(3);
  expect(err).toContain('warning, first case: Ar can enter the loop of mixer, converter');
  expect(read('trapped.csv').toString().split('\r\n')).toHaveLength(4);
});

describe('the table', () => {
  test('has a column for each setting and expression and says how each case went', () => {
    const text = table(
      't.csv',
      ...GRID,
      '--record',
      'figures.recycle_ratio,max(streams.S2.y.Ar, 0)',
    ).toString();
    const [head, ...rows] = text.trimEnd().split('\r\n');
    expect(head).toBe(
      'condenser.temperature [degC],purge.fractions.bleed [%],figures.recycle_ratio,"max(streams.S2.y.Ar, 0)",converged,passes,note',
    );
    expect(rows).toHaveLength(120);
    const cells = rows.map((row) => row.split(','));
    // The last setting runs fastest, with equal ratios.
    expect(cells.slice(0, 20).every(([T]) => T === '-25')).toBe(true);
    expect(Number(cells[1]![1]) / 0.5).toBeCloseTo(20 ** (1 / 19), 9);
    expect(cells[19]!.slice(0, 2)).toEqual(['-25', '10']);
    expect(
      cells.every(([, , ratio, argon, closed, passes, note]) => {
        return (
          Number(ratio) > 1 && Number(argon) > 0 && closed === 'true' && Number(passes) >= 1 && note === ''
        );
      }),
    ).toBe(true);
  });

  test('holds what a balance with the same settings says', () => {
    const set = ['--set', 'condenser.temperature=3 degC', '--set', 'purge.fractions.bleed=0.02'];
    const { figures } = JSON.parse(run(['balance', 'loop.yaml', ...set, '--json']).out);
    const over = ['--over', 'condenser.temperature=-4,3 degC', '--over', 'purge.fractions.bleed=0.01,0.02'];
    const { columns, rows } = JSON.parse(run(['sweep', 'loop.yaml', ...over, '--json']).out);
    const row = rows.find(([T, bleed]: number[]) => T === 3 && bleed === 0.02);
    const value = (name: string) => row[columns.indexOf(name)];
    for (const [name, expected] of [
      ['figures.production_t_d', figures.production_t_d],
      ['figures.overall_yield.value', figures.overall_yield.value],
      ['figures.recycle_ratio', figures.recycle_ratio],
      ['figures.power_kW.total', figures.power_kW.total],
    ]) {
      expect(Math.abs(value(name) / expected - 1)).toBeLessThan(1e-8);
    }
  });

  test('keeps a case that fails, with its reason', () => {
    const over = ['--over', 'converter.pressure_drop=4 bar,300 bar,5 bar'];
    const { code, out } = run(['sweep', 'loop.yaml', ...over, '--record', 'figures.recycle_ratio', '--json']);
    const { rows, cases, not_converged } = JSON.parse(out);
    expect({ code, cases, not_converged }).toEqual({ code: 0, cases: 3, not_converged: 1 });
    expect(rows[1].slice(0, 3)).toEqual([300, null, false]);
    expect(rows[1][4]).toContain('converter: ');
    expect([rows[0][2], rows[2][2]]).toEqual([true, true]);
  });

  test('where no case closes the exit code is 3', () => {
    const { code } = run(['sweep', 'loop.yaml', '--over', 'converter.pressure_drop=300 bar,400 bar']);
    expect(code).toBe(3);
  });

  test('is aligned for reading on standard output', () => {
    const { out, err } = run([
      'sweep',
      'loop.yaml',
      '--over',
      'condenser.temperature=-20,5 degC',
      '--record',
      'streams.S2.T',
    ]);
    expect({ out, err }).toMatchInlineSnapshot(`
      {
        "err": "warning, first case: condenser: cooling water does not reach -20.0 degC, and the power of the refrigeration is not counted; set cooling, e.g. cooling: {water: 25 degC, approach: 10 K}
      ",
        "out": "condenser.temperature [degC]  streams.S2.T  converged  passes  note
                               -20         271.8        yes       5
                                 5       288.604        yes       4
      ",
      }
    `);
  });

  test('is the same as NDJSON and as Parquet', async () => {
    const words = [...GRID, '--record', 'figures.recycle_ratio,blocks.condenser.duty'];
    const lines = table('t.ndjson', ...words)
      .toString()
      .trimEnd()
      .split('\n')
      .map((line) => JSON.parse(line));
    table('t.parquet', ...words);
    const file = await asyncBufferFromFile(at('t.parquet'));
    expect(await parquetReadObjects({ file })).toEqual(lines);
    const csv = table('t.csv', ...words)
      .toString()
      .trimEnd()
      .split('\r\n');
    expect(Object.keys(lines[0]).join(',')).toBe(csv[0]);
    expect(lines.map((line) => Object.values(line).join(','))).toEqual(csv.slice(1));
  });

  test('has the same bytes for one, two and three workers, and for as many as seems fit', () => {
    const one = table('one.csv', ...GRID, '--workers', '1');
    for (const workers of ['2', '3']) {
      expect(table('more.csv', ...GRID, '--workers', workers).equals(one)).toBe(true);
    }
    expect(table('free.csv', ...GRID).equals(one)).toBe(true);
  });
});

describe('slices', () => {
  let whole: Buffer;
  beforeAll(() => {
    whole = table('whole.csv', ...GRID);
  }, 60_000);

  test('of any partition, in any order, gather to the bytes of the whole', async () => {
    // In this process, from the sources: there are many of them.
    const follow = async (...words: string[]) => {
      await runHere([...words, '--quiet']);
      const code = process.exitCode ?? 0;
      process.exitCode = 0;
      if (code !== 0) throw new Error(`${words.join(' ')} ended with ${code}`);
    };
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom('csv', 'ndjson', 'parquet'),
        fc.integer({ min: 1, max: 6 }),
        fc.gen(),
        async (kind, of, gen) => {
          const names = Array.from({ length: of }, (_, k) => at(`p${k + 1}-${of}.${kind}`));
          const sweep = ['sweep', at('loop.yaml'), ...GRID];
          await follow(...sweep, '--out', at(`w.${kind}`));
          for (const [k, name] of names.entries())
            await follow(...sweep, '--part', `${k + 1}/${of}`, '--out', name);
          const order = gen(() => fc.shuffledSubarray(names, { minLength: of }));
          await follow('gather', ...order, '--out', at(`g.${kind}`));
          return read(`g.${kind}`).equals(read(`w.${kind}`));
        },
      ),
      { numRuns: 8 },
    );
  }, 240_000);

  test('open in a spreadsheet as the whole does: heads first, the mark last', () => {
    const lines = table('p.csv', ...GRID, '--part', '2/3')
      .toString()
      .trimEnd()
      .split('\r\n');
    expect(whole.toString()).toContain(lines.slice(1, -1).join('\r\n'));
    expect(lines[0]).toBe(whole.toString().split('\r\n', 1)[0]);
    expect(lines.at(-1)).toMatch(
      /^# looptally slice 2\/3 rows 41-80 of 120 sweep [0-9a-f]{16} sha256 [0-9a-f]{64}$/,
    );
  });

  test('with a gap, an overlap, of another sweep or changed by hand are refused', () => {
    for (const k of [1, 2, 3]) table(`s${k}.csv`, ...GRID, '--part', `${k}/3`);
    table('half.csv', ...GRID, '--part', '1/2');
    table('other.csv', ...GRID, '--part', '2/3', '--set', 'converter.temperature=455 degC');
    writeFileSync(at('cut.csv'), read('s2.csv').subarray(0, 900));
    writeFileSync(at('hand.csv'), read('s2.csv').toString().replace('true', 'True'));
    rmSync(at('g.csv'), { force: true });
    const said = (...names: string[]) => {
      const { code, err } = run(['gather', ...names, '--out', 'g.csv']);
      expect({ code, made: existsSync(at('g.csv')) }).toEqual({ code: 2, made: false });
      return err;
    };
    expect(said('s1.csv', 's3.csv')).toMatchInlineSnapshot(`
      "command line:1:25 error slices-missing
        No slice holds rows 41 to 80.
         1 | looptally gather s1.csv s3.csv --out g.csv
           |                         ^^^^^^
        why:  a table with a gap would pass for the whole
        mend: name the slice that holds them, or calculate it

      1 error
      "
    `);
    expect(said('half.csv', 's2.csv', 's3.csv')).toMatchInlineSnapshot(`
      "command line:1:27 error slices-overlap
        s2.csv and half.csv overlap.
         1 | looptally gather half.csv s2.csv s3.csv --out g.csv
           |                           ^^^^^^
        why:  rows 41 to 56 are in both
        mend: leave one of them out

      1 error
      "
    `);
    expect(said('s1.csv', 'other.csv', 's3.csv')).toMatchInlineSnapshot(`
      "command line:1:25 error other-sweep
        other.csv and s1.csv are slices of different sweeps.
         1 | looptally gather s1.csv other.csv s3.csv --out g.csv
           |                         ^^^^^^^^^
        why:  they were made from another flowsheet, by other options or by another version
        mend: calculate them again with one command

      1 error
      "
    `);
    expect(said('s1.csv', 'cut.csv', 's3.csv')).toMatchInlineSnapshot(`
      "command line:1:25 error no-slice
        cut.csv is no slice of a sweep, or not all of one.
         1 | looptally gather s1.csv cut.csv s3.csv --out g.csv
           |                         ^^^^^^^
        why:  a slice ends with the rows it holds and the sweep it belongs to; a whole table needs no joining
        mend: make it with looptally sweep ... --part k/n --out NAME

      1 error
      "
    `);
    expect(said('s1.csv', 'hand.csv', 's3.csv')).toMatchInlineSnapshot(`
      "command line:1:25 error no-slice
        hand.csv is not as it was written.
         1 | looptally gather s1.csv hand.csv s3.csv --out g.csv
           |                         ^^^^^^^^
        why:  its rows do not fit its checksum
        mend: calculate this slice again

      1 error
      "
    `);
    expect(said('s1.csv', 'whole.csv')).toMatchInlineSnapshot(`
      "command line:1:25 error no-slice
        whole.csv is no slice of a sweep, or not all of one.
         1 | looptally gather s1.csv whole.csv --out g.csv
           |                         ^^^^^^^^^
        why:  a slice ends with the rows it holds and the sweep it belongs to; a whole table needs no joining
        mend: make it with looptally sweep ... --part k/n --out NAME

      1 error
      "
    `);
    expect(said('nowhere.csv')).toMatchInlineSnapshot(`
      "command line:1:18 error cannot-read
        nowhere.csv cannot be read.
         1 | looptally gather nowhere.csv --out g.csv
           |                  ^^^^^^^^^^^
        why:  there is no such file
        mend: check its name

      1 error
      "
    `);
    expect(said('s1.csv', 's2.ndjson')).toMatchInlineSnapshot(`
      "command line:1:25 error bad-output
        s2.ndjson and g.csv are not of one kind.
         1 | looptally gather s1.csv s2.ndjson --out g.csv
           |                         ^^^^^^^^^
        why:  slices are joined as they are
        mend: give --out the ending .ndjson

      1 error
      "
    `);
  }, 240_000);

  test('are made by GNU parallel and joined', ({ skip }) => {
    if (spawnSync('parallel', ['--version']).status !== 0) skip('GNU parallel is not installed here');
    const script = readFileSync(new URL('../../examples/sweep-parallel.sh', import.meta.url), 'utf8');
    writeFileSync(at('sweep-parallel.sh'), script);
    symlinkSync(program(), at('looptally'));
    const { status, stderr } = spawnSync(
      'sh',
      ['sweep-parallel.sh', 'loop.yaml', '3', 'parallel.csv', ...GRID],
      {
        cwd: folder(),
        env: { PATH: `${folder()}:${process.env['PATH']}`, HOME: folder() },
        encoding: 'utf8',
      },
    );
    expect({ status, stderr }).toMatchObject({ status: 0 });
    expect(read('parallel.csv').equals(whole)).toBe(true);
  });
});
