import fc from 'fast-check';

/**
 * Chemistry to draw from: the key reactant is the one fed short, so that a conversion never runs out of the others;
 * `bar` is about the highest pressure it is run at.
 */
const chemistries = [
  {
    equation: 'N2 + 3 H2 -> 2 NH3',
    key: 'N2',
    need: { N2: 1, H2: 3 },
    product: 'NH3',
    inerts: ['Ar', 'CH4', 'He'],
    bar: 300,
  },
  {
    equation: 'CO + 2 H2 -> CH3OH',
    key: 'CO',
    need: { CO: 1, H2: 2 },
    product: 'CH3OH',
    inerts: ['N2', 'CH4', 'Ar'],
    bar: 120,
  },
  {
    equation: 'CO + 3 H2 -> CH4 + H2O',
    key: 'CO',
    need: { CO: 1, H2: 3 },
    product: 'H2O',
    inerts: ['N2', 'Ar'],
    bar: 80,
  },
  {
    equation: '2 CH3OH -> DME + H2O',
    key: 'CH3OH',
    need: { CH3OH: 1 },
    product: 'DME',
    inerts: ['N2', 'CH4'],
    bar: 30,
  },
  {
    equation: 'SO2 + 1/2 O2 -> SO3',
    key: 'SO2',
    need: { SO2: 1, O2: 0.5 },
    product: 'SO3',
    inerts: ['N2', 'Ar'],
    bar: 10,
  },
] as const;

export interface RandomLoop {
  readonly text: string;
  readonly label: string;
}

const share = (min: number, max: number) => fc.double({ min, max, noNaN: true });

/**
 * Random loops with set conversions that have a steady state: one or two feeds, a reactor, a separator that
 * takes out product and a little of everything, a purge, and one to three recycles nested or side by side.
 */
export const randomLoop: fc.Arbitrary<RandomLoop> = fc
  .record({
    chemistry: fc.constantFrom(...chemistries),
    gas: fc.constantFrom('ideal', 'srk', 'pr'),
    inertParts: fc.array(share(0.01, 4), { minLength: 0, maxLength: 3 }),
    excess: share(1, 1.4),
    conversion: share(0.05, 0.95),
    recovery: share(0.6, 1),
    loss: share(0, 0.05),
    purge: share(0.01, 0.4),
    recycles: fc.integer({ min: 1, max: 3 }),
    inner: share(0.1, 0.9),
    pressure: share(0.1, 1),
    temperature: share(300, 500),
    cooling: share(60, 120),
    adiabatic: fc.boolean(),
  })
  .map((draw) => {
    const { chemistry: c } = draw;
    const inerts = c.inerts.slice(0, draw.inertParts.length);
    const products = c.equation.split('->')[1].match(/[A-Z][A-Za-z0-9_]*/g) ?? [];
    const components = [...new Set([...Object.keys(c.need), ...products, ...inerts])];
    const parts = [
      ...Object.entries(c.need).map(([id, n]) => `${id}: ${id === c.key ? n : n * draw.excess}`),
      ...inerts.map((id, i) => `${id}: ${draw.inertParts[i] / 25}`),
    ];
    const taken = components.map((id) => `${id}: ${id === c.product ? draw.recovery : draw.loss}`);
    const reactorMode = draw.adiabatic ? 'adiabatic: true' : `temperature: ${draw.temperature} degC`;
    const back = {
      1: ['S8: purge.rest -> mixer'],
      2: ['S8: purge.rest -> fork', 'S9: fork.inner -> middle', 'S10: fork.rest -> mixer'],
      3: [
        'S8: purge.rest -> fork',
        'S9: fork.inner -> middle',
        'S10: fork.rest -> fork2',
        'S11: fork2.inner -> last',
        'S12: fork2.rest -> mixer',
      ],
    }[draw.recycles as 1 | 2 | 3];
    const text = [
      'looptally: 1',
      'title: random loop',
      `components: [${components.join(', ')}]`,
      `gas: ${draw.gas}`,
      `reactions: {main: ${c.equation}}`,
      'feeds:',
      `  makeup: {flow: 1000 kmol/h, temperature: 40 degC, pressure: ${draw.pressure * c.bar} bar, composition: {${parts.join(', ')}}}`,
      'blocks:',
      '  mixer: {kind: mixer}',
      ...(draw.recycles > 1
        ? ['  middle: {kind: mixer}', `  fork: {kind: splitter, fractions: {inner: ${draw.inner}}}`]
        : []),
      ...(draw.recycles > 2
        ? ['  last: {kind: mixer}', `  fork2: {kind: splitter, fractions: {inner: ${draw.inner}}}`]
        : []),
      `  heater: {kind: heater, temperature: ${draw.temperature - 50} degC}`,
      `  reactor: {kind: reactor, reactions: {main: {conversion: ${draw.conversion}, of: ${c.key}}}, ${reactorMode}}`,
      `  cooler: {kind: heater, temperature: ${draw.cooling} degC}`,
      `  separator: {kind: separator, recover: {product: {${taken.join(', ')}}}}`,
      `  purge: {kind: splitter, fractions: {bleed: ${draw.purge}}}`,
      'streams:',
      ...[
        'S1: makeup -> mixer',
        ...(draw.recycles > 1 ? ['S2: mixer -> middle', 'S2b: middle -> heater'] : ['S2: mixer -> heater']),
        'S3: heater -> reactor',
        ...(draw.recycles > 2 ? ['S4: reactor -> last', 'S4b: last -> cooler'] : ['S4: reactor -> cooler']),
        'S5: cooler -> separator',
        'S6: separator.product -> out',
        'S7: separator.rest -> purge',
        'S13: purge.bleed -> out',
        ...back,
      ].map((line) => `  ${line}`),
      `ledger: {product: ${c.product} in S6, reactant: ${c.key}, purge: [S13]}`,
      'solve: {max_passes: 200}',
    ].join('\n');
    return {
      text,
      label: `${c.product} ${draw.gas} ${draw.recycles} recycles, purge ${draw.purge.toFixed(3)}`,
    };
  });
