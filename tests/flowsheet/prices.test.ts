import { expect, test } from 'vitest';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import { createObjectiveCases } from '../../src/study/objective-cases.ts';
import { balance } from '../../src/tally/balance.ts';
import { flowsheetOf } from '../study/read-study.ts';
import { shippedText } from '../tally/shipped.ts';

const plain = shippedText('ammonia-loop.yaml').replace(/\n# What `looptally optimise[\s\S]*$/, '\n');
const move = 'move: {purge.fractions.bleed: 1 %..10 %}';

async function priced(prices: string, goal = 'minimise: cost'): Promise<Flowsheet> {
  return flowsheetOf(`${plain}\nprices: {${prices}}\nobjective: {${goal}, ${move}}\n`);
}

/** The goal at the settings of the file. */
function goalOf(flowsheet: Flowsheet): number {
  const cases = createObjectiveCases(flowsheet, flowsheet.objective!);
  return cases.at(cases.asInFile, true)!.goals[0]!;
}

const { result } = balance(await flowsheetOf(plain));
const { figures, streams, blocks } = result;
const duty = (name: string) => -(blocks['condenser']!.details[name] as number);

test.each([
  ['power: 60 EUR/MWh', (60 * figures.power_kW['total']!) / 1e3],
  ['power: 0.06 EUR/kWh', (60 * figures.power_kW['total']!) / 1e3],
  ['refrigeration: 3 EUR/GJ', 3 * duty('refrigeration_duty_kW') * 3.6e-3],
  ['cooling_water: 0.5 EUR/GJ', 0.5 * duty('water_duty_kW') * 3.6e-3],
  ['makeup: 0.1 EUR/Nm3', 0.1 * streams['S1']!.normal_m3_h],
  ['makeup: 2 EUR/kmol', 2 * streams['S1']!.flow_kmol_h],
  ['makeup: 300 EUR/t', 0.3 * streams['S1']!.mass_kg_h],
  ['purge: 20 EUR/MWh', -20 * figures.purge!.lhv_MW],
  ['purge: -20 EUR/MWh', 20 * figures.purge!.lhv_MW],
  ['product: 400 EUR/t, power: 0 EUR/MWh', 0],
])('cost with %s', async (prices, money) => {
  expect(goalOf(await priced(prices))).toBeCloseTo(money, 3);
});

test('refrigeration bought as cold takes no power of one’s own', async () => {
  const both = goalOf(await priced('power: 60 EUR/MWh, refrigeration: 3 EUR/GJ'));
  const { total, refrigeration } = figures.power_kW;
  const money = (60 * (total! - refrigeration!)) / 1e3 + 3 * duty('refrigeration_duty_kW') * 3.6e-3;
  expect(both).toBeCloseTo(money, 3);
});

test('profit is what the product brings less the cost, and money may stand in a formula', async () => {
  const prices = 'product: 400 EUR/t, power: 60 EUR/MWh, purge: 20 EUR/MWh';
  const cost = goalOf(await priced(prices));
  const profit = goalOf(await priced(prices, 'maximise: profit'));
  expect(profit).toBeCloseTo((400 * figures.production_t_d!) / 24 - cost, 3);
  const perTonne = goalOf(await priced(prices, 'minimise: 24 * cost / figures.production_t_d'));
  expect(perTonne).toBeCloseTo((24 * cost) / figures.production_t_d!, 6);
});

test('feeds have prices of their own, and makeup is what is left of them', async () => {
  const methanation = shippedText('methanation.yaml').replace(/\n# What `looptally optimise[\s\S]*$/, '\n');
  const at = async (prices: string) =>
    goalOf(
      await flowsheetOf(
        `${methanation}\nprices: {${prices}}\nobjective: {minimise: cost, move: {divider.fractions.product: 5 %..40 %}}\n`,
      ),
    );
  expect(await at('steam: 20 EUR/t')).toBeCloseTo(20 * 260 * 0.0180153, 2);
  expect(await at('makeup: 1 EUR/kmol')).toBeCloseTo(2260, 6);
  expect(await at('makeup: 1 EUR/kmol, steam: 0 EUR/t')).toBeCloseTo(2000, 6);
});
