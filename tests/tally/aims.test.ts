import { expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';
import { textWithoutObjective } from './shipped.ts';

const withAims = (aims: string) => `${textWithoutObjective('ammonia-loop.yaml')}\naims:\n${aims}\n`;

test('the purge that holds the inerts at 12 % is found', async () => {
  const text = withAims(
    '  inert cap: {move: purge.fractions.bleed, between: [0.2 %, 20 %], until: streams.S4.y.Ar + streams.S4.y.CH4 = 12 %}',
  );
  const { result } = balance(await read(text));
  const aim = result.aims['inert cap'];
  expect(aim.reached).toBe(true);
  expect(aim.setting).toBe('purge.fractions.bleed');
  expect(result.figures.inerts['converter']).toBeCloseTo(0.12, 8);
  expect(aim.value).toBeGreaterThan(0.002);
  expect(aim.value).toBeLessThan(0.03);
  // Solved again with the value found, without the aim, the loop gives the same figure.
  const again = balance(
    await read(textWithoutObjective('ammonia-loop.yaml'), { set: [`purge.fractions.bleed=${aim.value}`] }),
  );
  expect(again.result.figures.inerts['converter']).toBeCloseTo(0.12, 7);
});

test('two aims at once: inerts by the purge, yield by the condenser', async () => {
  const text = withAims(
    [
      '  inerts: {move: purge.fractions.bleed, between: [0.5 %, 10 %], until: figures.inerts.converter = 10 %}',
      '  slip: {move: condenser.temperature, between: [-30 degC, 20 degC], until: streams.S4.y.NH3 = 3 %}',
    ].join('\n'),
  );
  const { result } = balance(await read(text));
  expect(result.aims['inerts'].reached).toBe(true);
  expect(result.aims['slip'].reached).toBe(true);
  expect(result.figures.inerts['converter']).toBeCloseTo(0.1, 7);
  expect(result.streams['S4'].mole_fraction['NH3']).toBeCloseTo(0.03, 7);
});

test('an aim out of reach ends at the bound that stands in the way, and says so', async () => {
  const text = withAims(
    '  yield: {move: condenser.temperature, between: [-20 degC, 10 degC], until: figures.overall_yield.value = 99.5 %}',
  );
  const { result, diagnosis } = balance(await read(text));
  expect(diagnosis).toBeNull();
  expect(result.convergence.converged).toBe(true);
  const aim = result.aims['yield'];
  expect(aim.reached).toBe(false);
  expect(aim.note).toMatch(/bound of condenser.temperature/);
  expect(aim.achieved).toBeLessThan(0.995);
});

test('an aim of zero is reached: a converter duty that comes to nothing', async () => {
  const text = textWithoutObjective('ammonia-loop.yaml').replace('adiabatic: true', 'temperature: 470 degC');
  const aim =
    'aims:\n  autothermal: {move: converter.temperature, between: [420 degC, 520 degC], until: blocks.converter.duty = 0 kW}\n';
  const { result } = balance(await read(`${text}\n${aim}`));
  expect(result.aims['autothermal']).toMatchObject({ reached: true, until: 'blocks.converter.duty = 0 kW' });
  const adiabatic = balance(await read(textWithoutObjective('ammonia-loop.yaml'))).result;
  expect(result.streams['S5'].temperature_K).toBeCloseTo(adiabatic.streams['S5'].temperature_K, 3);
});
