import { expect, test } from 'vitest';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import { spreadableSettings } from '../../src/flowsheet/spreads.ts';
import { shippedText } from '../tally/shipped.ts';

async function read(section: string) {
  const text = shippedText('ammonia-loop.yaml').replace(/^ledger:/m, `${section}\nledger:`);
  return readFlowsheet(text, { file: 'loop.yaml' });
}

test('spreads are read in SI, what is left out is the value in the file', async () => {
  const { flowsheet, diagnostics } = await read(`spreads:
  condenser.temperature: {kind: normal, sd: 2 K}
  makeup.pressure: {kind: uniform, low: 25 bar, high: 400 psia}
  makeup.composition.Ar: {kind: triangular, low: 0.2, high: 0.5}
  makeup.flow: {kind: log-normal, median: 5000 kmol/h, factor: 1.05}
  reactions.synthesis.K: {kind: log-normal, factor: 1.1}
  components.NH3.vapour_pressure: {kind: normal, mean: 1.01, sd: 2 %}
correlations:
  - {between: [makeup.flow, makeup.composition.Ar], value: -0.3}
`);
  expect(diagnostics).toMatchObject([{ code: 'wrong-unit' }]);
  expect(diagnostics[0].what).toContain('components.NH3.vapour_pressure.sd');
  expect(flowsheet).toBeNull();
  const again = await read(`spreads:
  condenser.temperature: {kind: normal, sd: 2 K}
  makeup.pressure: {kind: uniform, low: 25 bar, high: 400 psia}
  makeup.composition.Ar: {kind: triangular, low: 0.2, high: 0.5}
  makeup.flow: {kind: log-normal, median: 5000 kmol/h, factor: 1.05}
  reactions.synthesis.K: {kind: log-normal, factor: 1.1}
  components.NH3.vapour_pressure: {kind: normal, mean: 1.01, sd: 0.02}
correlations:
  - {between: [makeup.flow, makeup.composition.Ar], value: -0.3}
`);
  expect(again.diagnostics).toEqual([]);
  const shapes = again.flowsheet!.spreads.map(({ shape }) => shape);
  expect(shapes[0]).toEqual({ kind: 'normal', mean: 265.15, sd: 2 });
  expect(shapes[1]).toMatchObject({ kind: 'uniform', low: 25e5 });
  expect((shapes[1] as { high: number }).high).toBeCloseTo(400 * 6894.757293168, 3);
  expect(shapes[2]).toEqual({ kind: 'triangular', low: 0.2, mode: 0.3, high: 0.5 });
  expect((shapes[3] as { median: number }).median).toBeCloseTo(5000 / 3.6, 9);
  expect(shapes[4]).toEqual({ kind: 'log-normal', median: 1, factor: 1.1 });
  expect(shapes[5]).toEqual({ kind: 'normal', mean: 1.01, sd: 0.02 });
  expect(again.flowsheet!.correlations).toEqual([
    { between: ['makeup.flow', 'makeup.composition.Ar'], value: -0.3 },
  ]);
});

test('a case and --set move what a spread that leaves it out is around', async () => {
  const text = shippedText('ammonia-loop.yaml').replace(
    /^ledger:/m,
    'spreads: {condenser.temperature: {kind: normal, sd: 2 K}}\nledger:',
  );
  const { flowsheet } = await readFlowsheet(text, { file: 'loop.yaml', case: 'cold condenser' });
  expect(flowsheet!.spreads[0].shape).toMatchObject({ mean: expect.closeTo(248.15, 9) });
});

test('constants that act can be spread: K of equilibrium reactions, vapour pressures of liquid: antoine', async () => {
  const constantsOf = async (name: string, set: string[] = []) => {
    const { flowsheet } = await readFlowsheet(shippedText(name), { file: name, set });
    return spreadableSettings(flowsheet!)
      .map(({ path }) => path)
      .filter((path) => /^(reactions|components)\./.test(path));
  };
  expect(await constantsOf('ammonia-loop.yaml')).toContain('reactions.synthesis.K');
  expect(await constantsOf('ammonia-loop.yaml')).toContain('components.NH3.vapour_pressure');
  expect(await constantsOf('ammonia-loop.yaml', ['liquid=eos'])).toEqual(['reactions.synthesis.K']);
  // set conversion: no K acts
  expect(await constantsOf('conversion-loop.yaml')).not.toContain('reactions.synthesis.K');
});
