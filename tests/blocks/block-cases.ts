import fc from 'fast-check';
import type { Reaction } from '../../src/model/reaction.ts';
import type { StreamState } from '../../src/model/stream.ts';
import type { Mixture } from '../../src/properties/mixture.ts';
import { components, mixtureOf, reaction, streamOf } from './helpers.ts';

export const ids = ['H2', 'N2', 'NH3', 'Ar', 'CH4', 'H2O'];
const list = components(...ids);
export const reactions: readonly Reaction[] = [reaction('synthesis', 'N2 + 3 H2 <=> 2 NH3', list)];
export const mixture = mixtureOf(ids, { reactions });
export interface Feed {
  readonly celsius: number;
  readonly bar: number;
  readonly flows: readonly number[];
}
/** The equilibria of a reactor are those of a gas. */
const hot = (value: Feed): Feed => ({
  ...value,
  celsius: value.celsius + 300,
  flows: value.flows.map((flow, i) => (ids[i] === 'H2O' ? 0.01 * flow : flow)),
});
/** Gas that stays clear of the critical point of its ammonia, cooled between stages or not. */
const lean = (value: Feed): Feed => ({
  ...value,
  flows: value.flows.map((flow, i) => (ids[i] === 'NH3' || ids[i] === 'H2O' ? 0.01 * flow : flow + 0.1)),
});
const withNitrogen = (value: Feed): Feed =>
  hot({ ...value, flows: value.flows.with(1, 1 + value.flows[1]!) });
const warm = (value: Feed): Feed => ({ ...value, celsius: value.celsius + 100 });
/** Ammonia and water with what little gas they hold, well below boiling. */
const liquid = ({ celsius, bar, flows }: Feed): Feed => ({
  celsius: celsius / 10,
  bar: 20 + bar,
  flows: flows.map((flow, i) => (ids[i] === 'NH3' ? 5 + flow : ids[i] === 'H2O' ? flow : 1e-4 * flow)),
});

const chosenConversion = { synthesis: { conversion: '2 %', of: 'H2' } };

/** One way or more to set every kind; `moves` is a number of its settings with another value for it. */
export const cases: readonly {
  name: string;
  kind: string;
  raw: Record<string, unknown>;
  inlets?: number;
  /** how much hotter each inlet is than the one before it [K]; 11 if left out */
  step?: number;
  /** no heat from outside: entropy may not fall */
  adiabatic?: boolean;
  /** what the block is meant for, made of any feed; left out: any feed */
  meantFor?: (value: Feed) => Feed;
  moves: readonly [path: readonly string[], to: number];
}[] = [
  {
    name: 'mixer',
    kind: 'mixer',
    raw: { pressure: '5 bar' },
    inlets: 3,
    adiabatic: true,
    moves: [['pressure'], 4e5],
  },
  {
    name: 'splitter',
    kind: 'splitter',
    raw: { fractions: { bleed: '3 %', side: '20 %' } },
    moves: [['fractions', 'bleed'], 0.5],
  },
  {
    name: 'isothermal reactor',
    kind: 'reactor',
    raw: { reactions: { synthesis: { approach: '10 K' } }, temperature: '450 degC', pressure_drop: '1 bar' },
    meantFor: hot,
    moves: [['temperature'], 800],
  },
  {
    name: 'adiabatic reactor',
    kind: 'reactor',
    raw: { reactions: { synthesis: {} }, adiabatic: true },
    meantFor: hot,
    adiabatic: true,
    moves: [['reactions', 'synthesis', 'approach'], 60],
  },
  {
    name: 'reactor with a duty and a set conversion',
    kind: 'reactor',
    raw: { reactions: chosenConversion, duty: '20 kW' },
    meantFor: withNitrogen,
    moves: [['reactions', 'synthesis', 'conversion'], 0.01],
  },
  {
    name: 'reactor short of equilibrium',
    kind: 'reactor',
    raw: { reactions: { synthesis: { fraction_of_equilibrium: '80 %' } }, adiabatic: true },
    meantFor: hot,
    adiabatic: true,
    moves: [['reactions', 'synthesis', 'fraction_of_equilibrium'], 0.5],
  },
  {
    name: 'reactor of three beds with coolers',
    kind: 'reactor',
    raw: {
      reactions: { synthesis: {} },
      beds: [{ inlet_temperature: '360 degC' }, { inlet_temperature: '380 degC' }, { duty: '-100 W' }],
      pressure_drop: '1 bar',
    },
    meantFor: hot,
    moves: [['beds', '1', 'inlet_temperature'], 680],
  },
  {
    name: 'reactor of three beds with quench',
    kind: 'reactor',
    raw: { reactions: { synthesis: {} }, beds: [{}, { quench: true }, { quench: true }] },
    inlets: 3,
    meantFor: hot,
    adiabatic: true,
    moves: [['beds', '2', 'approach'], 60],
  },
  {
    name: 'adiabatic kinetic bed',
    kind: 'kinetic_bed',
    raw: {
      rate_law: 'dyson-simon-1968',
      reactions: ['synthesis'],
      volume: '5 L',
      adiabatic: true,
      pressure_drop: '1 bar',
    },
    meantFor: (value) => hot(lean(value)),
    adiabatic: true,
    moves: [['volume'], 0.02],
  },
  {
    name: 'cooled kinetic bed',
    kind: 'kinetic_bed',
    raw: {
      rate_law: 'murase-1970',
      reactions: ['synthesis'],
      catalyst_mass: '20 kg',
      bulk_density: '2800 kg/m3',
      cooling: { temperature: '420 degC', heat_transfer: '30 kW/(m3 K)' },
    },
    meantFor: (value) => hot(lean(value)),
    moves: [['cooling', 'temperature'], 700],
  },
  {
    name: 'condenser by temperature',
    kind: 'condenser',
    raw: { temperature: '-5 degC' },
    moves: [['temperature'], 250],
  },
  {
    name: 'condenser by duty',
    kind: 'condenser',
    raw: { duty: '-20 kW', pressure_drop: '1 bar' },
    meantFor: warm,
    moves: [['duty'], -9e4],
  },
  {
    name: 'adiabatic flash',
    kind: 'flash',
    raw: { pressure: '3 bar', adiabatic: true },
    adiabatic: true,
    moves: [['pressure'], 2e5],
  },
  {
    name: 'flash by temperature',
    kind: 'flash',
    raw: { pressure: '3 bar', temperature: '10 degC' },
    moves: [['temperature'], 260],
  },
  {
    name: 'flash by duty',
    kind: 'flash',
    raw: { pressure: '3 bar', duty: '-10 kW' },
    moves: [['duty'], 2e4],
  },
  {
    name: 'heater by temperature',
    kind: 'heater',
    raw: { temperature: '280 degC', pressure_drop: '1 bar' },
    moves: [['temperature'], 300],
  },
  { name: 'heater by duty', kind: 'heater', raw: { duty: '30 kW' }, moves: [['duty'], 9e4] },
  {
    name: 'exchanger by cold temperature',
    kind: 'exchanger',
    raw: { cold_temperature: '90 degC', hot_pressure_drop: '1 bar' },
    inlets: 2,
    step: -80,
    meantFor: warm,
    moves: [['cold_temperature'], 370],
  },
  {
    name: 'exchanger by approach',
    kind: 'exchanger',
    raw: { approach: '12 K', cold_pressure_drop: '1 bar' },
    inlets: 2,
    step: -80,
    meantFor: warm,
    adiabatic: true,
    moves: [['approach'], 30],
  },
  {
    name: 'compressor of one stage',
    kind: 'compressor',
    raw: { ratio: 1.3, efficiency: '70 %', drive_efficiency: '95 %' },
    adiabatic: true,
    meantFor: warm,
    moves: [['efficiency'], 0.8],
  },
  {
    name: 'compressor with knock-out',
    kind: 'compressor',
    raw: {
      pressure_rise: '150 bar',
      stages: 3,
      intercooling: '20 degC',
      pressure_drop_per_cooler: '0.2 bar',
      knock_out: true,
      polytropic_efficiency: '80 %',
    },
    meantFor: warm,
    moves: [['pressure_drop_per_cooler'], 1e5],
  },
  {
    name: 'expander',
    kind: 'expander',
    raw: { ratio: 2.5, efficiency: '80 %', drive_efficiency: '95 %' },
    adiabatic: true,
    moves: [['efficiency'], 0.6],
  },
  {
    name: 'compressor of three cooled stages',
    kind: 'compressor',
    raw: { pressure_rise: '200 bar', stages: 3, intercooling: '40 degC' },
    meantFor: lean,
    moves: [['intercooling'], 280],
  },
  {
    name: 'pump',
    kind: 'pump',
    raw: { pressure: '400 bar' },
    meantFor: liquid,
    moves: [['efficiency'], 0.4],
  },
  { name: 'valve', kind: 'valve', raw: { pressure: '3 bar' }, adiabatic: true, moves: [['pressure'], 1e5] },
  {
    name: 'separator',
    kind: 'separator',
    raw: {
      recover: { permeate: { H2: '90 %', N2: '5 %' }, dry: { H2O: '100 %' } },
      pressures: { permeate: '3 bar' },
    },
    moves: [['recover', 'permeate', 'H2'], 0.5],
  },
];

export const feed = fc
  .record({
    celsius: fc.double({ min: -30, max: 350, noNaN: true }),
    bar: fc.double({ min: 5, max: 300, noNaN: true }),
    flows: fc.array(
      fc.oneof(
        fc.constant(0),
        fc.double({ min: -12, max: -6, noNaN: true }).map((e) => 10 ** e),
        fc.double({ min: 0.01, max: 10, noNaN: true }),
      ),
      { minLength: ids.length, maxLength: ids.length },
    ),
  })
  // An empty stream is tried on its own; a heat cannot be spent on a mere trace.
  .filter(({ flows }) => flows.some((flow) => flow >= 0.01));

export function feedsOf(mix: Mixture, count: number, value: Feed, step = 11): StreamState[] {
  return Array.from({ length: count }, (_, k) =>
    streamOf(mix, {
      celsius: value.celsius + step * k,
      bar: value.bar + 3 * k,
      flows: Object.fromEntries(ids.map((id, i) => [id, value.flows[(i + k) % ids.length]!])),
    }),
  );
}

/** Heat per mole that keeps a stream between ice and glow: duties of the cases are meant for 10 mol/s. */
export function scaledTo10(value: Feed): Feed {
  const total = value.flows.reduce((sum, flow) => sum + flow, 0);
  return { ...value, flows: value.flows.map((flow) => (10 * flow) / total) };
}
