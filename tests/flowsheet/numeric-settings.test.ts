import { expect, test } from 'vitest';
import { numericSettings } from '../../src/flowsheet/numeric-settings.ts';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import { shippedText } from '../tally/shipped.ts';

async function settingsOf(name: string, set: readonly string[] = []) {
  const { flowsheet } = await readFlowsheet(shippedText(name), { file: name, set });
  return numericSettings(flowsheet!);
}

test('every number with a value is a setting, with its natural unit; counts and words are none', async () => {
  const all = await settingsOf('ammonia-loop.yaml');
  expect(all.map(({ path, unit }) => `${path} ${unit}`)).toEqual([
    'makeup.flow kmol/h',
    'makeup.temperature K',
    'makeup.pressure bar',
    'makeup.composition.H2 %',
    'makeup.composition.N2 %',
    'makeup.composition.Ar %',
    'makeup.composition.CH4 %',
    'makeup_compressor.pressure bar',
    'makeup_compressor.efficiency %',
    'makeup_compressor.intercooling K',
    'makeup_compressor.drive_efficiency %',
    'preheat.temperature K',
    'preheat.pressure_drop bar',
    'converter.reactions.synthesis.approach K',
    'converter.pressure_drop bar',
    'condenser.temperature K',
    'condenser.pressure_drop bar',
    'condenser.cooling.water K',
    'condenser.cooling.approach K',
    'purge.fractions.bleed %',
    'circulator.pressure bar',
    'circulator.efficiency %',
    'circulator.drive_efficiency %',
    'letdown.pressure bar',
  ]);
});

test('a value is in SI, and so is one natural unit', async () => {
  const all = await settingsOf('ammonia-loop.yaml');
  const of = (path: string) => all.find((setting) => setting.path === path)!;
  expect(of('circulator.pressure')).toMatchObject({ value: 200e5, unitSI: 1e5, dimension: 'pressure' });
  expect(of('condenser.temperature')).toMatchObject({ value: 265.15, unitSI: 1 });
  expect(of('purge.fractions.bleed')).toMatchObject({ unitSI: 0.01, dimension: 'fraction' });
  expect(of('purge.fractions.bleed').value).toBeCloseTo(0.022, 12);
  expect(of('makeup.flow').value / of('makeup.flow').unitSI).toBeCloseTo(5330, 9);
  // One per cent of a composition is a hundredth of all its parts, which here are parts in a hundred.
  expect(of('makeup.composition.Ar').unitSI).toBeCloseTo(1, 12);
});

test('a flow counted by mass or normal volume keeps its unit, lists are counted from 0', async () => {
  const mass = await settingsOf('ammonia-loop.yaml', ['makeup.flow=50 t/h']);
  expect(mass[0]).toMatchObject({ path: 'makeup.flow', unit: 'kg/h', dimension: 'massFlow' });
  const beds = await settingsOf('ammonia-three-beds.yaml');
  expect(beds.map(({ path }) => path)).toContain('converter.beds.2.approach');
});
