import { expect, test } from 'vitest';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import { balance } from '../../src/tally/balance.ts';

/** A cooler before a vessel; line numbers count from 1. */
const plant = (blocks: string) => `looptally: 1
title: Asked for the impossible
components: [H2, N2, NH3, H2O]
feeds:
  gas: {flow: 100 kmol/h, temperature: 120 degC, pressure: 150 bar, composition: {H2: 60, N2: 20, NH3: 18, H2O: 2}}
blocks:
  ${blocks}
streams:
  S1: gas -> unit
  S2: unit.gas -> out
  S3: unit.liquid -> out
`;
const compressor = plant('unit: {kind: compressor, ratio: 1.5, stages: 2, intercooling: 300 degC}').replace(
  '  S2: unit.gas -> out\n  S3: unit.liquid -> out',
  '  S2: unit -> out',
);
const purge = plant('unit: {kind: splitter, fractions: {gas: 70 %, liquid: 40 %}}').replace(
  '  S3: unit.liquid -> out',
  '  S3: unit.liquid -> out\n  S4: unit.rest -> out',
);

/** Code, line and column of every finding: of reading, or of closing. */
async function findings(text: string): Promise<string[]> {
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'plant.yaml' });
  if (!flowsheet) return diagnostics.map((d) => `${d.code} ${d.where.line}:${d.where.column} ${d.what}`);
  const { diagnosis } = balance(flowsheet);
  return diagnosis
    ? [`${diagnosis.code} ${diagnosis.where.line}:${diagnosis.where.column} ${diagnosis.what}`]
    : [];
}

async function warnings(text: string): Promise<string[]> {
  const { flowsheet } = await readFlowsheet(text, { file: 'plant.yaml' });
  return balance(flowsheet!).result.warnings.map((w) => `${w.code} in ${w.where}`);
}

test('more cooling than the stream holds names the duty and its line', async () => {
  expect(await findings(plant('unit: {kind: condenser, duty: -40 MW}'))).toEqual([
    'duty-too-large 7:33 unit: The duty of -40.00 MW is more heat than this stream of 100.0 kmol/h holds.',
  ]);
});

test('an outlet colder than the coldest chiller names the temperature and its line', async () => {
  const cooling = 'cooling: {water: 25 degC, approach: 10 K, levels: [5 degC, -10 degC]}';
  expect(await findings(plant(`unit: {kind: condenser, temperature: -5 degC, ${cooling}}`))).toEqual([
    'colder-than-refrigerant 7:40 unit: the outlet of -5.0 degC is colder than the coldest chiller level can make it.',
  ]);
});

test('a duty that leads there is found when the plant has closed', async () => {
  const cooling = 'cooling: {water: 25 degC, approach: 10 K, levels: [5 degC, -10 degC]}';
  const [finding] = await findings(plant(`unit: {kind: condenser, duty: -330 kW, ${cooling}}`));
  expect(finding).toMatch(/^colder-than-refrigerant 7:\d+ unit: The outlet of -\d/);
});

test('levels out of order name the level and its line', async () => {
  const cooling = 'cooling: {water: 25 degC, approach: 10 K, levels: [-10 degC, 5 degC]}';
  expect(await findings(plant(`unit: {kind: condenser, temperature: 15 degC, ${cooling}}`))).toEqual([
    'level-order 7:110 unit: the level at 5.0 degC stands behind the one at -10.0 degC, which is no warmer.',
  ]);
});

test('a split above 100 % names the fractions and their line', async () => {
  expect(await findings(purge)).toEqual(['split-above-one 7:26 unit: the fractions add up to 110 %.']);
});

test('a condensate below its freezing point is warned of', async () => {
  const cooling = 'cooling: {water: 25 degC, approach: 10 K}';
  expect(await warnings(plant(`unit: {kind: condenser, temperature: -20 degC, ${cooling}}`))).toEqual([
    'below-freezing in unit',
    // of the gases in the water, in the liquid of the feed and in the condensate
    ...['S1', 'S1', 'S3', 'S3'].map((tag) => `henry-out-of-range in ${tag}`),
  ]);
});

test('intercooling hotter than the discharge is warned of', async () => {
  expect(await warnings(compressor.replace('H2O: 2', 'H2O: 0'))).toEqual(['idle-intercooling in unit']);
});

test('refrigeration that nobody counts is warned of', async () => {
  expect(await warnings(plant('unit: {kind: condenser, temperature: 5 degC}'))).toEqual([
    'refrigeration-not-counted in unit',
    ...['S1', 'S1', 'S3'].map((tag) => `henry-out-of-range in ${tag}`),
  ]);
});
