import { describe, expect, test } from 'vitest';
import type { EquilibriumCaseResult } from '../../src/chemistry/equilibrium-case.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import { blockDetails } from '../../src/sheets/block-rows.ts';
import { checkText } from '../../src/sheets/check.ts';
import { degreesOfFreedom } from '../../src/sheets/degrees-of-freedom.ts';
import { equilibriumText } from '../../src/sheets/equilibrium.ts';
import { wrapped } from '../../src/sheets/plain.ts';
import type { Plan } from '../../src/tally/plan.ts';

const flowsheet = {
  title: 'Small loop',
  caseName: null,
  components: [{ id: 'H2' }, { id: 'N2' }, { id: 'NH3' }],
  reactions: [{ name: 'synthesis', equation: 'N2 + 3 H2 <=> 2 NH3' }],
  feeds: [{ name: 'makeup' }],
  blocks: [
    { name: 'mixer', kind: 'mixer' },
    { name: 'divider', kind: 'splitter' },
  ],
  streams: [
    { tag: 'S1', from: { name: 'makeup', port: null } },
    { tag: 'S2', from: { name: 'mixer', port: null } },
    { tag: 'S3', from: { name: 'divider', port: 'bleed' } },
    { tag: 'S4', from: { name: 'divider', port: 'rest' } },
  ],
  aims: [{ name: 'cap' }],
  cases: ['cold'],
  solve: { tear: [] },
} as unknown as Flowsheet;

const plan: Plan = {
  blocks: [
    { name: 'mixer', kind: 'mixer' },
    { name: 'divider', kind: 'splitter' },
  ],
  loops: [{ blocks: ['mixer', 'divider'], tears: ['S4'] }],
  tears: ['S4'],
  smallest: true,
  order: ['mixer', 'divider'],
  aims: [{ name: 'cap', moves: 'divider.fractions.bleed', until: 'streams.S2.y.N2 = 0.2' }],
  unknowns: 5,
  sources: {
    components: [
      { id: 'H2', role: 'gas', data: { critical: 'Book A', 'ideal gas': 'Table B' } },
      { id: 'N2', role: 'gas', data: { critical: 'Book A' } },
    ],
    blocks: [
      { name: 'mixer', kind: 'mixer', models: [] },
      { name: 'divider', kind: 'splitter', models: ['a rule of thumb'] },
    ],
    shared: ['gas: ideal gas'],
  },
  assumptions: ['Everything is ideal.'],
  diagnostics: [],
};

describe('the sheet of a check', () => {
  test('shows contents, order, loops, degrees of freedom, aims and assumptions', () => {
    expect(checkText(flowsheet, plan)).toBe(`Small loop
==========
case: as in the file
no faults found; nothing was solved

What is in it
  3 components: H2, N2, NH3
  1 reaction: synthesis (N2 + 3 H2 <=> 2 NH3)
  1 feed: makeup
  2 blocks: mixer (mixer), divider (splitter)
  4 streams: S1, S2, S3, S4
  1 case: cold

Order of calculation
  mixer -> divider

Loops
  1. mixer, divider; torn at S4
  1 tear, the smallest number that breaks every loop
  the solver guesses 5 numbers: flows, temperature and pressure of each tear

Degrees of freedom
  20 unknowns: 4 streams, each with 3 component flows, temperature and pressure
  5 given by the feeds, 15 by the balances and settings of the blocks
  1 setting set free by an aim and fixed by its wanted value
  0 left

Aims
  cap: moves divider.fractions.bleed until streams.S2.y.N2 = 0.2

Sources
  all blocks: gas: ideal gas
  divider: a rule of thumb
  H2 (gas): critical [1], ideal gas [2]
  N2 (gas): critical [1]
  [1] Book A
  [2] Table B

Assumptions
  - Everything is ideal.
`);
  });

  test('says where the number of tears is not proven to be the smallest, and where some are those of the file', () => {
    expect(checkText(flowsheet, { ...plan, smallest: false })).toContain(
      '\n  1 tear, a small number (not proven smallest)\n',
    );
    const given = { ...flowsheet, solve: { ...flowsheet.solve, tear: ['S4'] } };
    expect(checkText(given, plan)).toContain(
      '\n  1 tear, the smallest number that breaks every loop, those of solve.tear among them\n',
    );
  });

  test('counts a stream of a feed as given and every other as an outlet of a block', () => {
    expect(degreesOfFreedom(flowsheet)).toEqual({
      perStream: 5,
      streams: 4,
      unknowns: 20,
      byFeeds: 5,
      byBlocks: 15,
      aims: 1,
      left: 0,
    });
  });
});

describe('the sheet of an equilibrium', () => {
  const report = {
    reactions: [
      {
        equation: 'A <=> B',
        K: 4.3521e-5,
        lnK: -10.0423,
        delta_h_kJ_mol: -105.11,
        extent: 0.5,
        source: 'Gibbs energies',
      },
    ],
    temperature_K: 723.15,
    pressure_bar: 303.975,
    mole_fraction: { A: 0.5, B: 0.5 },
    amounts: { A: 0.5, B: 0.5 },
    conversion: { A: 0.5 },
    carbon_activity: 1.25,
    iterations: 5,
    assumptions: [],
  } satisfies Partial<EquilibriumCaseResult> as unknown as EquilibriumCaseResult;

  test('shows state, constant, amounts, conversion and the verdict on carbon', () => {
    expect(
      equilibriumText(report, { feed: { A: 1 }, gas: 'ideal', inletK: 573.15 }),
    ).toBe(`Reaction equilibrium
  450.00 degC, 303.98 bar, gas: ideal; adiabatic from 300.00 degC

Reactions
  A <=> B
      K 4.352e-5, ln K -10.042, heat of reaction -105.11 kJ/mol, extent 0.50000
      K from Gibbs energies

Gas, amounts in the unit of the feed
  component      in      out   mol %  conversion
  A          1.0000  0.50000  50.000     50.00 %
  B               0  0.50000  50.000

  carbon activity 1.250: above 1, so carbon can form

Assumptions
`);
  });
});

describe('details of a block', () => {
  test('are written with the unit their key ends in, temperatures in degC', () => {
    expect(
      blockDetails({
        outlet_temperature_K: 273.15,
        approach_K: { synthesis: 10 },
        heat_of_reaction_kW: -42000.2,
        carbon_activity_inlet: 0.51234,
        stages: 2,
        ln_K: { synthesis: -9.79671 },
        temperature_rise_K: 0.04,
        carbon_at_inlet: 123995711.2,
        power_kW: [100],
        adiabatic: true,
        nothing: null,
      }),
    ).toEqual([
      'outlet temperature 0 degC, approach synthesis 10.000 K, heat of reaction -42000 kW, ' +
        'carbon activity inlet 0.5123, stages 2, ln K synthesis -9.797, temperature rise 0.040000 K, ' +
        'carbon at inlet 1.24e+8, power 0 100.00 kW, adiabatic yes',
    ]);
  });

  test('give a line to each of several beds or levels, counted from 1', () => {
    const level = (K: number, kW: number) => ({ evaporator_K: K, duty_kW: kW, power_kW: kW / 4 });
    expect(
      blockDetails({
        condensed_kmol_h: 10,
        levels: [level(283.15, 100), level(263.15, 200)],
        beds: { bed1: { inlet_K: 673.15, outlet_K: 773.15, outlet_bar: 180 } },
      }),
    ).toEqual([
      'condensed 10.000 kmol/h',
      'level 1: evaporator 10.00 degC, duty 100.00 kW, power 25.000 kW',
      'level 2: evaporator -10.00 degC, duty 200.00 kW, power 50.000 kW',
      'bed 1: inlet 400.00 degC, outlet 500.00 degC, outlet 180.00 bar',
    ]);
  });
});

describe('wrapped text', () => {
  test('keeps a word longer than the line whole', () => {
    expect(wrapped('a verylongword b', 6, '- ', '  ')).toEqual(['- a', '  verylongword', '  b']);
  });
});
