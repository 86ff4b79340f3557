import { expect, test } from 'vitest';
import { createCaseRunner } from '../../src/study/case-runner.ts';
import { balance } from '../../src/tally/balance.ts';
import { formula, shipped, shippedWith } from './read-study.ts';

const record = [
  'figures.overall_yield.value',
  'figures.recycle_ratio',
  'streams.S2.y.Ar',
  'streams.S5.mass',
  'figures.power_kW.total',
  'blocks.condenser.duty',
].map(formula);
const settings = ['condenser.temperature', 'purge.fractions.bleed'];

test('a case reads what a balance of the same settings reads', async () => {
  const runner = createCaseRunner(await shipped('reference-loop'), { settings, record });
  const out = new Float64Array(record.length);
  expect(runner.run([253.15, 0.02], out, { warm: false })).toMatchObject({ converged: true, note: '' });
  const set = ['condenser.temperature=-20 degC', 'purge.fractions.bleed=2 %'];
  const { figures, streams, blocks } = balance(await shipped('reference-loop', set)).result;
  const read = [
    figures.overall_yield!.value,
    figures.recycle_ratio,
    streams['S2']!.mole_fraction['Ar'],
    streams['S5']!.mass_kg_h,
    figures.power_kW['total'],
    blocks['condenser']!.duty_kW,
  ];
  for (const [r, value] of out.entries()) expect(Math.abs(value / read[r]! - 1)).toBeLessThan(1e-10);
});

test('cases along a line, started from one another, agree with cases started from the feeds, in fewer passes', async () => {
  const flowsheet = await shipped('reference-loop');
  const warm = createCaseRunner(flowsheet, { settings, record });
  const cold = createCaseRunner(flowsheet, { settings, record });
  const a = new Float64Array(record.length);
  const b = new Float64Array(record.length);
  let passes = 0;
  for (let k = 0; k < 40; k++) {
    const values = [248.15 + 0.5 * k, 0.01 + 0.002 * k];
    const outcome = warm.run(values, a);
    expect(cold.run(values, b, { warm: false }).converged && outcome.converged).toBe(true);
    passes += outcome.passes;
    for (const [r, value] of a.entries()) expect(Math.abs(value / b[r]! - 1)).toBeLessThan(1e-7);
  }
  expect(passes / 40).toBeLessThan(4);
});

test('a case from the feeds depends on nothing that went before', async () => {
  const flowsheet = await shipped('ammonia-heat-recovery');
  const runner = createCaseRunner(flowsheet, {
    settings: ['condenser.temperature'],
    record: record.slice(0, 2),
  });
  const [first, again] = [new Float64Array(2), new Float64Array(2)];
  runner.run([265], first, { warm: false });
  for (const T of [268, 250, -1e9, 270]) runner.run([T], again);
  runner.run([265], again, { warm: false });
  expect(again).toEqual(first);
});

test('a case that fails says why and does not spoil the next', async () => {
  const flowsheet = await shipped('reference-loop');
  const runner = createCaseRunner(flowsheet, { settings: ['converter.pressure_drop'], record });
  const out = new Float64Array(record.length);
  expect(runner.run([4e5], out).converged).toBe(true);
  const failed = runner.run([3e7], out);
  expect(failed.converged).toBe(false);
  expect(failed.note).not.toBe('');
  expect(out.every(Number.isNaN)).toBe(true);
  expect(runner.run([4.1e5], out)).toMatchObject({ converged: true, note: '' });
  expect(out.every(Number.isFinite)).toBe(true);
});

test('a block that cannot do as it is told makes its case fail with its own words', async () => {
  const flowsheet = await shipped('ammonia-heat-recovery');
  const exchanger = flowsheet.blocks.find((b) => b.kind === 'exchanger')!;
  const path = `${exchanger.name}.cold_temperature`;
  expect(exchanger.settings).toHaveProperty('cold_temperature');
  const runner = createCaseRunner(flowsheet, { settings: [path], record: record.slice(0, 1) });
  const { converged, note } = runner.run([1400], new Float64Array(1));
  expect(converged).toBe(false);
  expect(note).toContain(exchanger.name);
});

test('the aims of the file are reached in every case, from where the last one left them', async () => {
  const text = `aims:
  inert cap: {move: purge.fractions.bleed, between: [0.2 %, 20 %], until: streams.S2.y.Ar + streams.S2.y.CH4 = 12 %}
`;
  const flowsheet = await shippedWith('reference-loop', text);
  const inerts = ['streams.S2.y.Ar + streams.S2.y.CH4', 'streams.S6.flow / streams.S4.flow'].map(formula);
  const runner = createCaseRunner(flowsheet, { settings: ['condenser.temperature'], record: inerts });
  const out = new Float64Array(2);
  for (const T of [250, 251, 252, 253]) {
    expect(runner.run([T], out).note).toBe('');
    expect(out[0]).toBeCloseTo(0.12, 8);
    expect(runner.plant.get('purge.fractions.bleed')).toBeCloseTo(out[1]!, 12);
  }
});

test('an aim out of reach makes its case fail and says so', async () => {
  const text = `aims:
  inert cap: {move: purge.fractions.bleed, between: [0.2 %, 20 %], until: streams.S2.y.Ar + streams.S2.y.CH4 = 60 %}
`;
  const runner = createCaseRunner(await shippedWith('reference-loop', text), {
    settings: ['condenser.temperature'],
    record: record.slice(0, 1),
  });
  const { converged, note } = runner.run([250], new Float64Array(1));
  expect(converged).toBe(false);
  expect(note).toMatch(/^aim inert cap is not reached: /);
});
