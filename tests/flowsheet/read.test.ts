import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';

const text = readFileSync(new URL('ammonia.yaml', import.meta.url), 'utf8');

async function read(source: string): Promise<Flowsheet> {
  const { flowsheet, diagnostics } = await readFlowsheet(source, { file: 'ammonia.yaml' });
  if (flowsheet === null) throw new Error(JSON.stringify(diagnostics, null, 1));
  return flowsheet;
}

test('a flowsheet is read into SI', async () => {
  const flowsheet = await read(text);
  expect(flowsheet.components.map((c) => c.id)).toEqual(['H2', 'N2', 'NH3', 'Ar', 'CH4']);
  expect(flowsheet.feeds[0]).toMatchObject({
    name: 'makeup',
    temperatureK: 308.15,
    pressurePa: 2e7,
    basis: 'mole',
  });
  expect(flowsheet.feeds[0].flow?.value).toBeCloseTo(6500 / 3.6, 9);
  expect([...flowsheet.feeds[0].parts]).toEqual([74.2, 24.7, 0, 0.3, 0.8]);
  expect([...flowsheet.reactions[0].coefficients]).toEqual([-3, -1, 2, 0, 0]);
  expect(flowsheet.blocks[1]).toEqual({
    name: 'converter',
    kind: 'reactor',
    settings: { reactions: { synthesis: { approach: 10 } }, temperature: 723.15, pressure_drop: 4e5 },
  });
  expect(flowsheet.streams[3]).toEqual({
    tag: 'S4',
    from: { name: 'condenser', port: 'gas' },
    to: { name: 'purge', port: null },
  });
  expect(flowsheet.streams[4].to).toBeNull();
  expect(flowsheet.solve).toEqual({ method: 'auto', tolerance: 1e-9, maxPasses: 200, tear: ['S8'] });
  expect(flowsheet.cases).toEqual(['cold condenser']);
});

test('an aim has its bounds in SI and its target in the unit of the formula', async () => {
  const [aim] = (await read(text)).aims;
  expect(aim).toMatchObject({
    name: 'inert cap',
    move: 'purge.fractions.bleed',
    between: [0.002, 0.2],
    target: 0.12,
    unit: '',
  });
  expect(aim.until.evaluate({ streams: { S2: { y: { Ar: 0.1, CH4: 0.05 } } } })).toBeCloseTo(0.15, 12);
});

test.each([
  ['streams.S3.T = 420 degC', 693.15],
  ['streams.S3.P = 195 bar', 195],
  ['streams.S3.P = 194 barg', 195.01325],
  ['streams.S5.n.NH3 = 3 kmol/h', 3],
  ['streams.S5.mass = 24 t/d', 1000],
  ['streams.S5.y.NH3 = 99 %', 0.99],
  ['blocks.condenser.duty = -3 MW', -3000],
  ['figures.production_t_d = 1000 t/d', 1000],
  ['figures.production_t_d = 1000', 1000],
  ['figures.purge.lhv_MW = 5000 kW', 5],
  ['figures.overall_conversion.H2 = 97 %', 0.97],
  ['streams.S6.n.H2 / streams.S1.n.H2 = 3 %', 0.03],
  ['figures.recycle_ratio = 4.5', 4.5],
  ['streams.S1.flow + streams.S8.flow = 1 kmol/s', 3600],
])('the target of %s is %d', async (until, target) => {
  const changed = text.replace('streams.S2.y.Ar + streams.S2.y.CH4 = 12 %', until);
  expect((await read(changed)).aims[0].target).toBeCloseTo(target, 9);
});

test('an own lnK is a function of T', async () => {
  const changed = text.replace(
    'synthesis: N2 + 3 H2 <=> 2 NH3',
    'synthesis: {equation: N2 + 3 H2 <=> 2 NH3, lnK: 4577.8/T - 4.33, standard_pressure: 1 atm}',
  );
  const { constant } = (await read(changed)).reactions[0];
  expect(constant.kind).toBe('formula');
  if (constant.kind !== 'formula') return;
  expect(constant.lnK(700)).toBeCloseTo(4577.8 / 700 - 4.33, 12);
  expect(constant.standardPressurePa).toBe(101325);
});

test('flows of the components stand for flow and composition', async () => {
  const changed = text
    .replace(/ {4}flow: 6500 kmol\/h\n/, '')
    .replace(/composition: \{.*\}/, 'flows: {H2: 3.6 kmol/h, N2: 28.0134 kg/s}');
  const [feed] = (await read(changed)).feeds;
  expect(feed.flow).toBeNull();
  expect(feed.parts[0]).toBeCloseTo(1, 12);
  // 28.0134 kg/kmol is the molar mass of nitrogen (IUPAC 2021 abridged atomic weight 14.007 gives 28.014): five digits
  expect(feed.parts[1] / 1000).toBeCloseTo(1, 3);
});

test('a component of the user carries its own data and source', async () => {
  const own =
    'solvent: {formula: C4H10O, source: invented, formation_enthalpy: -252 kJ/mol, entropy: 342 J/(mol K), heat_capacity: 119 J/(mol K)}';
  for (const components of [`[H2, N2, NH3, Ar, CH4, {${own}}]`, `{H2: , N2: , NH3: , Ar: , CH4: , ${own}}`]) {
    const flowsheet = await read(text.replace('[H2, N2, NH3, Ar, CH4]', components));
    expect(flowsheet.components.map((c) => c.id)).toEqual(['H2', 'N2', 'NH3', 'Ar', 'CH4', 'solvent']);
    expect(flowsheet.components[5]).toMatchObject({ custom: true, elements: { C: 4, H: 10, O: 1 } });
  }
});

test('graphite need not be declared', async () => {
  const { components, reactions, assumptions } = await read(
    text.replace('reactions:\n', 'reactions:\n  cracking: CH4 <=> C_gr + 2 H2\n'),
  );
  expect(components.map((c) => c.id)).toEqual(['H2', 'N2', 'NH3', 'Ar', 'CH4', 'C_gr']);
  expect([...reactions[0].coefficients]).toEqual([2, 0, 0, 0, -1, 1]);
  expect(assumptions).toContain('Graphite (C_gr) is carried as a component, for a reaction names it.');
});

test('every default of the ledger is filled in and said', async () => {
  const { ledger, assumptions } = await read(text.replace(/ledger:[\s\S]*?aims:/, 'aims:'));
  expect(ledger).toEqual({
    product: { component: 'NH3', stream: 'S5' },
    reactant: 'H2',
    purge: ['S6'],
    recycle: 'S8',
  });
  expect(assumptions).toEqual([
    'Gases dissolve in the condensate (dissolved_gases: true), for nothing else is said.',
    'The ledger takes NH3 in S5 as the product, for none is named.',
    'The ledger takes H2 as the key reactant, for none is named.',
    'The ledger takes S6 as purge, for none is named.',
    'The ledger takes S8 as the recycle, for none is named.',
  ]);
});

test('a composition that adds up to neither 1 nor 100 is said to be normalised', async () => {
  const { assumptions } = await read(text.replace('Ar: 0.3', 'Ar: 0.5'));
  expect(assumptions).toContain(
    'The composition of feed makeup adds up to 100.2 parts by mole and is normalised.',
  );
});

test('the place of any path is found, or that of the nearest enclosing part', async () => {
  const { placeOf } = await read(text);
  const file = 'ammonia.yaml';
  expect(placeOf('blocks.condenser.temperature')).toEqual({ file, line: 16, column: 45, length: 7 });
  expect(placeOf('condenser.temperature')).toEqual(placeOf('blocks.condenser.temperature'));
  expect(placeOf('condenser.cooling.water')).toEqual(placeOf('condenser'));
  expect(placeOf('condenser')).toEqual({ file, line: 16, column: 3, length: 9 });
  expect(placeOf('streams.S2')).toEqual({ file, line: 21, column: 7, length: 18 });
  expect(placeOf('aims.inert cap.move')).toMatchObject({ line: 34, column: 21 });
  expect(placeOf('nothing.of.the.kind')).toMatchObject({ line: 1 });
});

test('units that only mathjs knows are read', async () => {
  const { feeds } = await read(text.replace('6500 kmol/h', '108333 mol/minute'));
  expect(feeds[0].flow?.value).toBeCloseTo(108333 / 60, 6);
});

test('small aliases are read, each as its own', async () => {
  const changed = text
    .replace('pressure: 200 bar\n    comp', 'pressure: &loop 200 bar\n    comp')
    .replace('compressor, pressure: 200 bar', 'compressor, pressure: *loop');
  expect((await read(changed)).blocks[4].settings).toMatchObject({ pressure: 2e7 });
});

test.each([
  ['H2: 74 %, N2: 24 %', 'the composition of feed makeup adds up to 98 %, not to 100 %.'],
  ['H2: 74 %, N2: 26.6 %', 'the composition of feed makeup adds up to 100.6 %, not to 100 %.'],
  ['H2: 74 %, N2: 25.6 %', null],
  ['H2: 74 %, N2: 259500 ppm, Ar: 500 ppm', null],
  ['H2: 74, N2: 24', null],
])('a composition in per cent that is no whole is warned of with its sum: {%s}', async (parts, what) => {
  const { flowsheet, diagnostics } = await readFlowsheet(
    `looptally: 1
components: [H2, N2, Ar]
feeds: {makeup: {flow: 1 kmol/h, temperature: 20 degC, pressure: 1 bar, composition: {${parts}}}}
blocks: {mixer: {kind: mixer}}
streams: {S1: makeup -> mixer, S2: mixer -> out}
`,
    { file: 'feed.yaml' },
  );
  expect(flowsheet).not.toBeNull();
  const told = diagnostics.map((d) => `${d.severity} ${d.code} ${d.where.line}: ${d.what}`);
  expect(told).toEqual(what === null ? [] : [`warning composition-sum 3: ${what}`]);
});
