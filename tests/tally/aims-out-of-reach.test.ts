import { expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';
import { textWithoutObjective } from './shipped.ts';

async function aimsOf(...aims: readonly string[]) {
  const text = `${textWithoutObjective('ammonia-loop.yaml')}\naims:\n${aims.map((aim) => `  ${aim}\n`).join('')}`;
  const { result } = balance(await read(text));
  expect(result.convergence.converged).toBe(true);
  return result.aims;
}
const inerts = (wanted: string) =>
  `inerts: {move: purge.fractions.bleed, between: [1 %, 10 %], until: figures.inerts.converter = ${wanted}}`;
const SLIP =
  'slip: {move: condenser.temperature, between: [-30 degC, 20 degC], until: streams.S4.y.NH3 = 3 %}';

test('an aim out of reach ends at the bound on its side, with the nearest value', async () => {
  const { inerts: much } = await aimsOf(inerts('30 %'));
  expect(much).toMatchObject({ reached: false, value: 0.01 });
  expect(much!.note).toBe('stopped at the lower bound of purge.fractions.bleed');
  const { inerts: little } = await aimsOf(inerts('1 %'));
  expect(little).toMatchObject({ reached: false, value: 0.1 });
  expect(little!.note).toBe('stopped at the upper bound of purge.fractions.bleed');
  expect(much!.achieved).toBeGreaterThan(little!.achieved);
});

test('of two aims the one kept away by its bound is given up, the other met', async () => {
  const found = await aimsOf(inerts('30 %'), SLIP);
  expect(found['slip']).toMatchObject({ reached: true, note: null });
  expect(found['slip']!.achieved).toBeCloseTo(0.03, 8);
  expect(found['inerts']).toMatchObject({ reached: false, value: 0.01 });
  expect(found['inerts']!.note).toBe('stopped at the lower bound of purge.fractions.bleed');
});

test('two aims for one figure meet half-way, each naming the other and its value', async () => {
  const found = await aimsOf(
    inerts('8 %'),
    'other: {move: condenser.temperature, between: [-30 degC, 20 degC], until: figures.inerts.converter = 10 %}',
  );
  // both misses are taken relative to where the figure began, above both: the mean
  for (const aim of Object.values(found)) {
    expect(aim.reached).toBe(false);
    expect(aim.achieved).toBeCloseTo(0.09, 5);
  }
  expect(found['inerts']!.note).toBe(
    'it cannot be met along with the aim other (which has 0.09): the settings move them alike',
  );
  expect(found['other']!.note).toContain('the aim inerts (which has 0.09)');
});

test('an aim whose figure no setting moves is told, with its value', async () => {
  const found = await aimsOf(
    'feed: {move: purge.fractions.bleed, between: [1 %, 10 %], until: streams.S1.T = 320 K}',
  );
  expect(found['feed']!.reached).toBe(false);
  expect(found['feed']!.note).toMatch(/^no setting moves streams\.S1\.T, 3\d\d/);
});
