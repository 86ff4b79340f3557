import { readFlowsheet } from '../../src/flowsheet/read.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import type { Result } from '../../src/model/result.ts';
import { balance } from '../../src/tally/balance.ts';

/** A recycle loop of a textbook with its printed answers. */
export interface Example {
  readonly name: string;
  readonly components: string;
  readonly equation: string;
  /** kmol/h */
  readonly flows: string;
  readonly conversion: string;
  readonly product: string;
  /** share of the separated gas that is purged */
  readonly purge: number;
  /** with the relative deviation that the printed digits allow */
  readonly answers: readonly (readonly [
    what: string,
    printed: number,
    ours: (result: Result) => number,
    allowed: number,
  ])[];
}

const RECYCLE = 'S7';
const PURGE = 'S6';
const REACTOR_FEED = 'S2';
const PRODUCT = 'S4';

const flow = (tag: string) => (result: Result) => result.streams[tag]!.flow_kmol_h;
const flowOf = (tag: string, id: string) => (result: Result) => result.streams[tag]!.components_kmol_h[id]!;
const fractionOf = (tag: string, id: string) => (result: Result) => result.streams[tag]!.mole_fraction[id]!;
const reactants = (tag: string) => (result: Result) => flowOf(tag, 'N2')(result) + flowOf(tag, 'H2')(result);

export const examples: readonly Example[] = [
  {
    // K. V. Narayanan & B. Lakshmikutty, Stoichiometry and Process Calculations, PHI, Example 10.22
    name: 'Narayanan and Lakshmikutty 10.22',
    components: 'CO, H2, CH3OH, CH4',
    equation: 'CO + 2 H2 -> CH3OH',
    flows: 'CO: 33 kmol/h, H2: 66.5 kmol/h, CH4: 0.5 kmol/h',
    conversion: '{conversion: 20 %, of: CO}',
    product: 'CH3OH: 1',
    purge: 16.6667 / (16.6667 + 337.943),
    answers: [
      ['recycle', 337.9, flow(RECYCLE), 3e-4],
      ['purge', 16.67, flow(PURGE), 3e-4],
      ['methanol', 27.78, flowOf(PRODUCT, 'CH3OH'), 3e-4],
      ['CH4 in purge', 0.03, fractionOf(PURGE, 'CH4'), 3e-4],
      ['CO in purge', 0.3134, fractionOf(PURGE, 'CO'), 5e-4],
    ],
  },
  {
    // S. K. Ghoshal, S. K. Sanyal & S. Datta, Introduction to Chemical Engineering, Tata McGraw-Hill, Example 3.14
    name: 'Ghoshal and others 3.14',
    components: 'N2, H2, NH3, Ar',
    equation: 'N2 + 3 H2 -> 2 NH3',
    flows: 'N2: 25 kmol/h, H2: 75 kmol/h, Ar: 0.2 kmol/h',
    conversion: '{conversion: 21 %, of: N2}',
    product: 'NH3: 1',
    purge: 3.1596 / (3.1596 + 361.145),
    answers: [
      ['purge of N2 and H2', 3.1596, reactants(PURGE), 2e-4],
      ['recycle of N2 and H2', 361.145, reactants(RECYCLE), 2e-4],
      ['ammonia', 48.42, flowOf(PRODUCT, 'NH3'), 2e-4],
      [
        'Ar per N2 and H2 at the reactor',
        0.05,
        (r) => flowOf(REACTOR_FEED, 'Ar')(r) / reactants(REACTOR_FEED)(r),
        1e-3,
      ],
    ],
  },
  {
    // R. M. Felder & R. W. Rousseau, Elementary Principles of Chemical Processes, ammonia problem of ch. 4 (from memory)
    name: 'Felder and Rousseau ch. 4',
    components: 'N2, H2, NH3, Ar',
    equation: 'N2 + 3 H2 -> 2 NH3',
    flows: 'N2: 24.75 kmol/h, H2: 74.25 kmol/h, Ar: 1 kmol/h',
    conversion: '{conversion: 25 %, of: N2}',
    product: 'NH3: 1',
    purge: 0.02536,
    answers: [
      ['overall conversion', 0.9293, (r) => r.figures.overall_conversion['N2']!, 2e-4],
      ['recycle', 307.429, flow(RECYCLE), 3e-4],
      ['Ar in recycle', 0.125, fractionOf(RECYCLE, 'Ar'), 3e-4],
      ['ammonia', 46.0, flowOf(PRODUCT, 'NH3'), 2e-4],
    ],
  },
  {
    // public course notebook (introductory chemical engineering), University of Notre Dame; closed form
    name: 'course notebook, fixed split',
    components: 'CO, H2, CH3OH, N2',
    equation: 'CO + 2 H2 -> CH3OH',
    flows: 'CO: 36 kmol/h, H2: 60 kmol/h, N2: 4 kmol/h',
    conversion: '{conversion: 20 %, of: H2}',
    product: 'CH3OH: 1',
    purge: 0.05,
    answers: [
      ['H2 at the reactor', 250, flowOf(REACTOR_FEED, 'H2'), 1e-9],
      ['CO at the reactor', 245, flowOf(REACTOR_FEED, 'CO'), 1e-9],
      ['N2 at the reactor', 80, flowOf(REACTOR_FEED, 'N2'), 1e-9],
      ['methanol', 25, flowOf(PRODUCT, 'CH3OH'), 1e-9],
      ['CO purged', 11, flowOf(PURGE, 'CO'), 1e-9],
    ],
  },
  {
    // R. M. Felder & R. W. Rousseau, Elementary Principles of Chemical Processes, Example 4.7-3, per 100 mol of reactor feed
    name: 'Felder and Rousseau 4.7-3',
    components: 'CO2, H2, CH3OH, H2O, Ar',
    equation: 'CO2 + 3 H2 -> CH3OH + H2O',
    flows: 'CO2: 15.719 kmol/h, H2: 45.438 kmol/h, Ar: 0.2456 kmol/h',
    conversion: '{conversion: 60 %, of: H2}',
    product: 'CH3OH: 1, H2O: 1',
    purge: 5.4035 / (5.4035 + 38.5965),
    answers: [
      ['reactor feed', 100, flow(REACTOR_FEED), 1e-3],
      ['H2 at the reactor', 0.7, fractionOf(REACTOR_FEED, 'H2'), 1e-3],
      ['CO2 at the reactor', 0.28, fractionOf(REACTOR_FEED, 'CO2'), 1e-3],
      ['recycle', 38.6, flow(RECYCLE), 1e-3],
      ['purge', 5.4, flow(PURGE), 1e-3],
    ],
  },
];

// Reading is asynchronous (units load on demand), the report is not: the files are read once, on import.
const flowsheets = await Promise.all(examples.map((example) => read(textOf(example))));

/** An example closed. */
export function resultOf(example: Example): Result {
  const { result, diagnosis } = balance(flowsheets[examples.indexOf(example)]!, { tolerance: 1e-11 });
  if (diagnosis) throw new Error(`${example.name}: ${diagnosis.what}`);
  return result;
}

async function read(text: string): Promise<Flowsheet> {
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'textbook.yaml' });
  if (!flowsheet) throw new Error(diagnostics.map(({ what }) => what).join('\n'));
  return flowsheet;
}

/** Makeup, reactor of set conversion, complete separation of the product, purge: only the balance is asked. */
function textOf(example: Example): string {
  return `
looptally: 1
title: ${example.name}
components: [${example.components}]
gas: ideal
reactions: {main: ${example.equation}}
feeds:
  makeup: {temperature: 100 degC, pressure: 10 bar, flows: {${example.flows}}}
blocks:
  mixer: {kind: mixer}
  reactor: {kind: reactor, reactions: {main: ${example.conversion}}, temperature: 300 degC}
  separator: {kind: separator, recover: {product: {${example.product}}}}
  purge: {kind: splitter, fractions: {bleed: ${example.purge}}}
streams:
  S1: makeup -> mixer
  ${REACTOR_FEED}: mixer -> reactor
  S3: reactor -> separator
  ${PRODUCT}: separator.product -> out
  S5: separator.rest -> purge
  ${PURGE}: purge.bleed -> out
  ${RECYCLE}: purge.rest -> mixer
`;
}
