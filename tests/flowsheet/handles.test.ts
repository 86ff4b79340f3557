import { expect, test } from 'vitest';
import { chosenHandles } from '../../src/flowsheet/chosen-handles.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import { shippedText } from '../tally/shipped.ts';

async function read(handles: string, options: { set?: string[] } = {}) {
  const text = shippedText('ammonia-loop.yaml').replace(/^handles:[\s\S]*$/m, `handles:\n${handles}`);
  return readFlowsheet(text, { file: 'loop.yaml', ...options });
}

test('a handle is read in SI, with the unit it is written in', async () => {
  const { flowsheet, diagnostics } = await read(`
  condenser.temperature: -30..15 degC:91
  makeup.pressure: 20 barg..500 psia
  makeup.composition.Ar: 0.1..1
`);
  expect(diagnostics).toEqual([]);
  const [cold, pressure, argon] = flowsheet!.handles;
  expect(cold).toEqual({
    path: 'condenser.temperature',
    between: [273.15 - 30, 288.15],
    unit: 'degC',
    scale: { factor: 1, offset: 273.15 },
    places: 91,
  });
  expect(pressure!.unit).toBe('psia');
  expect(pressure!.between[0]).toBeCloseTo(2101325, 6);
  expect(argon).toMatchObject({ between: [0.1, 1], unit: '', places: 101 });
});

test.each([
  [
    'condensr.temperature: -30 degC..15 degC',
    'unknown-setting',
    'the nearest is condenser.temperature',
    'condensr.temperature',
  ],
  ['condenser.temperature: -30 bar..15 bar', 'wrong-unit', 'is a unit of', '-30 bar'],
  ['condenser.temperature: -30..15', 'missing-unit', 'needs its unit', '-30'],
  [
    'condenser.temperature: 15 degC..-30 degC',
    'bad-handle',
    'the lower end stands first',
    '15 degC..-30 degC',
  ],
  ['condenser.temperature: -30 degC..-30 degC', 'bad-handle', 'both ends are the same', '-30 degC..-30 degC'],
  ['condenser.temperature: 0 degC..15 degC', 'bad-handle', 'the file sets it to -8 degC', '0 degC..15 degC'],
  ['condenser.temperature: -30 degC', 'bad-handle', 'have .. between them', '-30 degC'],
  [
    'condenser.temperature: -30 degC..15 degC:1',
    'bad-handle',
    'a whole number from 2',
    '-30 degC..15 degC:1',
  ],
  ['purge.fractions.bleed: 0.5 %..130 %', 'out-of-range', 'at most 100 %', '130 %'],
])('%s is refused at its place', async (line, code, why, at) => {
  const { flowsheet, diagnostics } = await read(`  ${line}\n`);
  expect(flowsheet).toBeNull();
  expect(diagnostics).toHaveLength(1);
  const [fault] = diagnostics;
  expect(fault).toMatchObject({ code });
  expect(fault!.why).toContain(why);
  expect(`  ${line}`.slice(fault!.where.column - 1)).toMatch(new RegExp(`^${at.replace(/[.%]/g, '\\$&')}`));
});

test('a setting that --set or a case has moved may stand outside its range', async () => {
  const { flowsheet } = await read('  condenser.temperature: -30 degC..15 degC\n', {
    set: ['condenser.temperature=-40 degC'],
  });
  expect(flowsheet!.handles).toHaveLength(1);
});

test('what an aim moves is no handle', async () => {
  const text = shippedText('reference-loop.yaml').concat(
    'aims: {cap: {move: purge.fractions.bleed, between: [0.5 %, 20 %], until: streams.S4.y.Ar = 5 %}}\n',
  );
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'loop.yaml' });
  expect(flowsheet!.handles.map(({ path }) => path)).toEqual([
    'condenser.temperature',
    'converter.temperature',
  ]);
  expect(diagnostics).toMatchObject([{ code: 'bad-handle', severity: 'warning' }]);
  expect(diagnostics[0]!.what).toBe('purge.fractions.bleed is a handle and moved by the aim cap.');
});

test('a file without handles is given condenser temperatures and splitter fractions around what they are', async () => {
  const { flowsheet } = await readFlowsheet(shippedText('ammonia-three-beds.yaml'), { file: 'a.yaml' });
  const chosen = chosenHandles(flowsheet!);
  expect(chosen.length).toBeGreaterThan(0);
  expect(chosen.length).toBeLessThanOrEqual(4);
  for (const { path, between } of chosen) {
    expect(path).toMatch(/\.temperature$|\.fractions\./);
    expect(between[0]).toBeLessThan(between[1]);
  }
});
