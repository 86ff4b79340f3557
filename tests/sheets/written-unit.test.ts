import { expect, test } from 'vitest';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import { moveUnits } from '../../src/sheets/move-units.ts';
import { shippedText } from '../tally/shipped.ts';

/** The columns of the settings that an objective moves, and a value in SI as each shows it. */
async function columns(move: string, valuesSI: readonly number[]) {
  const text = shippedText('ammonia-loop.yaml').replace(/^ {2}move:.*$/m, `  move: ${move}`);
  const { flowsheet, diagnostics } = await readFlowsheet(text, { file: 'loop.yaml' });
  expect(diagnostics.filter(({ severity }) => severity === 'error')).toEqual([]);
  return moveUnits(flowsheet!, flowsheet!.objective!.moves).map(({ column }, i) => [
    column.head,
    column.number(valuesSI[i]!),
  ]);
}

test('a column of a file has the unit that the bounds are written in', async () => {
  expect(
    await columns(
      '{condenser.temperature: -30 degC..25 degC, makeup_compressor.pressure: 100 barg..200 barg, purge.fractions.bleed: 0.5 %..10 %}',
      [268.15, 2e7, 0.02],
    ),
  ).toEqual([
    ['condenser.temperature [degC]', -5],
    ['makeup_compressor.pressure [barg]', 198.98675],
    ['purge.fractions.bleed [%]', 2],
  ]);
  expect(
    await columns('{condenser.temperature: 250 K..280 K, purge.fractions.bleed: 0.005..0.1}', [268.15, 0.02]),
  ).toEqual([
    ['condenser.temperature [K]', 268.15],
    ['purge.fractions.bleed', 0.02],
  ]);
});

test('parts of a composition keep the natural unit, and bare bounds may stand beside bare parts', async () => {
  expect(await columns('{makeup.composition.Ar: 0.2..0.5}', [0.3])).toEqual([
    ['makeup.composition.Ar [part]', 0.3],
  ]);
});
