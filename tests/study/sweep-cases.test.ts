import { expect, test } from 'vitest';
import { InputError } from '../../src/diagnostics/diagnostic.ts';
import { type SweptCase, sweepCases } from '../../src/study/sweep-cases.ts';
import { balance } from '../../src/tally/balance.ts';
import { shipped } from './read-study.ts';

const over = { 'purge.fractions.bleed': '1 %..5 %:3', 'condenser.temperature': '-20 degC, 0 degC' };
const record = ['figures.recycle_ratio', 'streams.S6.flow'];

async function all(cases: AsyncIterable<SweptCase>): Promise<SweptCase[]> {
  const list: SweptCase[] = [];
  for await (const one of cases) list.push(one);
  return list;
}

test('cases come in the order of the table, the last setting fastest, with the numbers of a balance', async () => {
  const cases = await all(sweepCases(await shipped('reference-loop'), { over, record }));
  expect(cases.map(({ settings }) => Object.values(settings))).toEqual([
    [1, -20],
    [1, 0],
    [3, -20],
    [3, 0],
    [5, -20],
    [5, 0],
  ]);
  for (const { settings, recorded } of cases.slice(2, 4)) {
    const set = [
      `purge.fractions.bleed=${settings['purge.fractions.bleed']} %`,
      `condenser.temperature=${settings['condenser.temperature']} degC`,
    ];
    const { result } = balance(await shipped('reference-loop', set));
    expect(recorded['figures.recycle_ratio']! / result.figures.recycle_ratio! - 1).toBeCloseTo(0, 8);
    expect(recorded['streams.S6.flow']! / result.streams['S6']!.flow_kmol_h - 1).toBeCloseTo(0, 8);
  }
});

test('a signal stops it, and nothing is worked out that nobody asks for', async () => {
  const control = new AbortController();
  const seen: number[] = [];
  const cases = sweepCases(await shipped('reference-loop'), {
    over: { 'purge.fractions.bleed': '1 %..20 %:100' },
    record,
    signal: control.signal,
  });
  const run = (async () => {
    for await (const { passes } of cases) {
      seen.push(passes);
      if (seen.length === 3) control.abort(new Error('enough'));
    }
  })();
  await expect(run).rejects.toThrow('enough');
  expect(seen.length).toBeLessThan(100);
});

test('all that is not known is told at once', async () => {
  const flowsheet = await shipped('reference-loop');
  const cases = sweepCases(flowsheet, {
    over: { 'purge.fraction.bleed': '1 %,2 %', 'condenser.temperature': '1 bar, 2 bar' },
    record: ['figures.recycle_ration', 'streams.S6.flow +'],
  });
  const refused = await all(cases).catch((error) => error);
  expect(refused).toBeInstanceOf(InputError);
  expect((refused as InputError).diagnostics.map(({ what }) => what)).toEqual([
    'over: There is no setting purge.fraction.bleed that holds a number.',
    expect.stringContaining('over condenser.temperature: '),
    expect.stringContaining('record: figures.recycle_ration is not known.'),
    expect.stringContaining('record: '),
  ]);
});
