import { expect, test } from 'vitest';
import { balance } from '../../src/tally/balance.ts';
import { read } from './read.ts';

/**
 * A loop of the textbooks: makeup, reactor of set conversion, perfect separation of the product, purge.
 * The gas model is ideal and the temperatures are free: only the balance is asked.
 */
function textbookLoop(given: {
  components: string;
  equation: string;
  flows: string;
  conversion: string;
  product: string;
  purge: string;
}): string {
  return `
looptally: 1
title: textbook loop
components: [${given.components}]
gas: ideal
reactions: {main: ${given.equation}}
feeds:
  makeup: {temperature: 100 degC, pressure: 10 bar, flows: {${given.flows}}}
blocks:
  mixer: {kind: mixer}
  reactor: {kind: reactor, reactions: {main: ${given.conversion}}, temperature: 300 degC}
  separator: {kind: separator, recover: {product: {${given.product}}}}
  purge: {kind: splitter, fractions: {bleed: ${given.purge}}}
streams:
  S1: makeup -> mixer
  S2: mixer -> reactor
  S3: reactor -> separator
  S4: separator.product -> out
  S5: separator.rest -> purge
  S6: purge.bleed -> out
  S7: purge.rest -> mixer
`;
}

const near = (value: number, wanted: number, tolerance: number) =>
  expect(Math.abs(value / wanted - 1), `${value} against ${wanted}`).toBeLessThan(tolerance);

// K. V. Narayanan & B. Lakshmikutty, Stoichiometry and Process Calculations, PHI, Example 10.22. Purge fraction from
// the printed answers: 16.67 / (16.67 + 337.9); four printed digits.
test('methanol loop with methane purge, Narayanan and Lakshmikutty 10.22', async () => {
  const text = textbookLoop({
    components: 'CO, H2, CH3OH, CH4',
    equation: 'CO + 2 H2 -> CH3OH',
    flows: 'CO: 33 kmol/h, H2: 66.5 kmol/h, CH4: 0.5 kmol/h',
    conversion: '{conversion: 20 %, of: CO}',
    product: 'CH3OH: 1',
    purge: `${16.6667 / (16.6667 + 337.943)}`,
  });
  const { streams } = balance(await read(text)).result;
  near(streams['S7'].flow_kmol_h, 337.9, 3e-4);
  near(streams['S6'].flow_kmol_h, 16.67, 3e-4);
  near(streams['S4'].components_kmol_h['CH3OH'], 27.78, 3e-4);
  near(streams['S6'].mole_fraction['CH4'], 0.03, 3e-4);
  near(streams['S6'].mole_fraction['CO'], 0.3134, 5e-4);
});

// S. K. Ghoshal, S. K. Sanyal & S. Datta, Introduction to Chemical Engineering, Tata McGraw-Hill, Example 3.14;
// the purge is 0.875 % of the recycle gas, four to six printed digits.
test('ammonia loop with argon purge, Ghoshal and others 3.14', async () => {
  const text = textbookLoop({
    components: 'N2, H2, NH3, Ar',
    equation: 'N2 + 3 H2 -> 2 NH3',
    flows: 'N2: 25 kmol/h, H2: 75 kmol/h, Ar: 0.2 kmol/h',
    conversion: '{conversion: 21 %, of: N2}',
    product: 'NH3: 1',
    purge: `${3.1596 / (3.1596 + 361.145)}`,
  });
  const { streams } = balance(await read(text)).result;
  const reactants = (tag: string) =>
    streams[tag].components_kmol_h['N2'] + streams[tag].components_kmol_h['H2'];
  near(reactants('S6'), 3.1596, 2e-4);
  near(reactants('S7'), 361.145, 2e-4);
  near(streams['S4'].components_kmol_h['NH3'], 48.42, 2e-4);
  near(streams['S2'].components_kmol_h['Ar'] / reactants('S2'), 0.05, 1e-3);
});

// R. M. Felder & R. W. Rousseau, Elementary Principles of Chemical Processes, ammonia problem of ch. 4 (data from
// memory; answers re-solved in closed form).
test('ammonia loop with 1 % inert, Felder and Rousseau ch. 4', async () => {
  const text = textbookLoop({
    components: 'N2, H2, NH3, Ar',
    equation: 'N2 + 3 H2 -> 2 NH3',
    flows: 'N2: 24.75 kmol/h, H2: 74.25 kmol/h, Ar: 1 kmol/h',
    conversion: '{conversion: 25 %, of: N2}',
    product: 'NH3: 1',
    purge: '2.536 %',
  });
  const { streams, figures } = balance(await read(text)).result;
  near(figures.overall_conversion['N2'], 0.9293, 2e-4);
  near(streams['S7'].flow_kmol_h, 307.429, 3e-4);
  near(streams['S7'].mole_fraction['Ar'], 0.125, 3e-4);
  near(streams['S4'].components_kmol_h['NH3'], 46.0, 2e-4);
});

// Public course notebook (introductory chemical engineering), givens; answers in closed form H2 = 60/(1 − 0.95 × 0.8).
test('methanol loop with nitrogen purge and a fixed split', async () => {
  const text = textbookLoop({
    components: 'CO, H2, CH3OH, N2',
    equation: 'CO + 2 H2 -> CH3OH',
    flows: 'CO: 36 kmol/h, H2: 60 kmol/h, N2: 4 kmol/h',
    conversion: '{conversion: 20 %, of: H2}',
    product: 'CH3OH: 1',
    purge: '5 %',
  });
  const { streams, figures } = balance(await read(text), { tolerance: 1e-11 }).result;
  for (const [id, wanted] of Object.entries({ H2: 250, CO: 245, N2: 80 })) {
    near(streams['S2'].components_kmol_h[id], wanted, 1e-9);
  }
  for (const [id, wanted] of Object.entries({ H2: 10, CO: 11, N2: 4 })) {
    near(streams['S6'].components_kmol_h[id], wanted, 1e-9);
  }
  near(streams['S4'].components_kmol_h['CH3OH'], 25, 1e-9);
  near(figures.overall_conversion['CO'], 25 / 36, 1e-9);
  near(figures.overall_conversion['H2'], 50 / 60, 1e-9);
});

// R. M. Felder & R. W. Rousseau, Elementary Principles of Chemical Processes, Example 4.7-3: per 100 mol of reactor
// feed; 61.4 mol of fresh feed, printed to three digits.
test('methanol from carbon dioxide with an inert, Felder and Rousseau 4.7-3', async () => {
  const text = textbookLoop({
    components: 'CO2, H2, CH3OH, H2O, Ar',
    equation: 'CO2 + 3 H2 -> CH3OH + H2O',
    flows: 'CO2: 15.719 kmol/h, H2: 45.438 kmol/h, Ar: 0.2456 kmol/h',
    conversion: '{conversion: 60 %, of: H2}',
    product: 'CH3OH: 1, H2O: 1',
    purge: `${5.4035 / (5.4035 + 38.5965)}`,
  });
  const { streams } = balance(await read(text)).result;
  near(streams['S2'].flow_kmol_h, 100, 1e-3);
  near(streams['S2'].mole_fraction['H2'], 0.7, 1e-3);
  near(streams['S2'].mole_fraction['CO2'], 0.28, 1e-3);
  near(streams['S7'].flow_kmol_h, 38.6, 1e-3);
  near(streams['S6'].flow_kmol_h, 5.4, 1e-3);
});
