import { expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { createPlant } from '../../src/tally/plant.ts';
import { startFromFeeds } from '../../src/tally/start-values.ts';
import { read } from './read.ts';
import { shippedText } from './shipped.ts';

/** A loop whose pass is linear: a share of the inert comes back each time, all reactants are taken out. */
const loop = (purge: string, tear: string) => `
looptally: 1
title: Linear loop
components: [H2, N2, Ar]
gas: ideal
feeds:
  makeup: {temperature: 40 degC, pressure: 20 bar, flows: {H2: 75 kmol/h, N2: 25 kmol/h, Ar: 1 kmol/h}}
blocks:
  mixer: {kind: mixer}
  taken: {kind: separator, recover: {product: {H2: 80 %, N2: 60 %}}}
  purge: {kind: splitter, fractions: {bleed: ${purge}}}
streams:
  S1: makeup -> mixer
  S2: mixer -> taken
  S3: taken.product -> out
  S4: taken.rest -> purge
  S5: purge.bleed -> out
  S6: purge.rest -> mixer
solve: {tear: [${tear}]}
`;

async function startOf(text: string, tag: string): Promise<{ flows: number[]; passes: number }> {
  const flowsheet = await read(text);
  const plant = createPlant(flowsheet);
  plant.refreshFeeds();
  const group = plant.groups.find((one) => one.tears.length > 0)!;
  const passes = startFromFeeds(plant, group, null);
  const state = plant.streams[flowsheet.streams.findIndex((s) => s.tag === tag)]!;
  return { flows: [...state.flowsMolPerS].map((flow) => flow * 3.6), passes };
}

test.each(['S2', 'S6'])('a linear loop starts at its answer after two passes, torn at %s', async (tear) => {
  const { flows, passes } = await startOf(loop('4 %', tear), tear);
  expect(passes).toBe(2);
  const { result } = balance(await read(loop('4 %', tear)), { tolerance: 1e-12 });
  Object.values(result.streams[tear]!.components_kmol_h).forEach((flow, i) => {
    expect(Math.abs(flows[i]! - flow)).toBeLessThan(1e-9 * (1 + flow));
  });
});

test('a tiny purge does not scale the guess out of all proportion', async () => {
  const { flows } = await startOf(loop('0.01 %', 'S2'), 'S2');
  expect(flows[2]).toBeLessThanOrEqual(100.001);
});

test('a let-down that has no pressure before the loop runs does not keep it from starting', async () => {
  const { result, diagnosis } = balance(await read(shippedText('ammonia-purge-recovery.yaml')));
  expect(diagnosis).toBeNull();
  expect(result.convergence.tears).toHaveLength(1);
});

test('a condenser set by its duty starts, though once through holds less heat than that', async () => {
  const text = shippedText('ammonia-flash-gas-return.yaml');
  const duty = balance(await read(text)).result.figures.duty_kW['condenser']!;
  const byDuty = text.replace('    temperature: -8 degC', `    duty: ${duty} kW`);
  expect(byDuty).not.toBe(text);
  const { result, diagnosis } = balance(await read(byDuty));
  expect(diagnosis).toBeNull();
  expect(Math.abs(result.streams['S7']!.temperature_K - 265.15)).toBeLessThan(1e-4);
});

test('a compressor whose suction is above its discharge before the recycle has come round does not end the closing', async () => {
  const text = shippedText('ammonia-uncertain.yaml');
  const flowsheet = await read(text, { set: ['circulator.pressure=184 bar'] });
  const { result, diagnosis } = balance(flowsheet);
  expect(diagnosis).toBeNull();
  expect(result.streams['S9']!.pressure_bar).toBeCloseTo(184, 9);
  expect(result.blocks['circulator']!.power_kW).toBeGreaterThan(0);
});

test('a compressor that is to lower the pressure is the cause of what fails behind it', async () => {
  const text = shippedText('ammonia-loop.yaml');
  const { result, diagnosis } = balance(await read(text, { set: ['makeup_compressor.pressure=10 bar'] }));
  expect(result.convergence.converged).toBe(false);
  expect(diagnosis).toMatchObject({
    code: 'pressure-fall',
    what: 'makeup_compressor: The compressor is set to 10.000 bar, below its suction of 26.000 bar.',
    where: { file: '--set', column: 28 },
  });
});
