import { expect, test } from 'vitest';
import { readFlowsheet } from '../../src/flowsheet/read.ts';
import type { Flowsheet } from '../../src/model/flowsheet.ts';
import { emptyStream } from '../../src/model/stream.ts';
import { closePlant } from '../../src/tally/close-plant.ts';
import { createPlant, type Plant } from '../../src/tally/plant.ts';
import { shippedText } from './shipped.ts';

async function flowsheetOf(change: (text: string) => string = (text) => text): Promise<Flowsheet> {
  const read = await readFlowsheet(change(shippedText('reference-loop.yaml')), { file: 'loop.yaml' });
  expect(read.diagnostics.filter(({ severity }) => severity === 'error')).toEqual([]);
  return read.flowsheet!;
}

function close(plant: Plant): Plant {
  expect(closePlant(plant, { method: 'auto', tolerance: 1e-11, maxPasses: 200 }).converged).toBe(true);
  return plant;
}

const flows = (plant: Plant) => plant.streams.flatMap((stream) => Array.from(stream.flowsMolPerS));

test('a factor on K is ln of it added to ln K: the loop closes as with a formula of the user that much higher', async () => {
  const withLnK = (lnK: string) =>
    flowsheetOf((text) =>
      text.replace(/synthesis: .*<=>.*$/m, `synthesis: {equation: N2 + 3 H2 <=> 2 NH3, lnK: ${lnK}}`),
    );
  const moved = createPlant(await withLnK('11000/T - 24.2'));
  moved.set('reactions.synthesis.K', 1.2);
  expect(moved.get('reactions.synthesis.K')).toBeCloseTo(1.2, 14);
  const written = createPlant(await withLnK(`11000/T - 24.2 + ${Math.log(1.2)}`));
  const plain = createPlant(await withLnK('11000/T - 24.2'));
  const [a, b, c] = [moved, written, plain].map((plant) => flows(close(plant)));
  for (const [i, flow] of a.entries()) expect(flow).toBeCloseTo(b[i], 6);
  expect(Math.max(...a.map((flow, i) => Math.abs(flow - c[i])))).toBeGreaterThan(1);
});

test('a factor of 1 leaves every digit as it is', async () => {
  const flowsheet = await flowsheetOf();
  const moved = createPlant(flowsheet);
  moved.set('reactions.synthesis.K', 1);
  moved.set('components.NH3.vapour_pressure', 1);
  expect(flows(close(moved))).toEqual(flows(close(createPlant(flowsheet))));
});

test('a factor on the vapour pressure moves the dew point by it, and the heat of vaporisation by next to nothing', async () => {
  const { mixture, set } = createPlant(await flowsheetOf((text) => text.replace(/^gas: .*$/m, 'gas: ideal')));
  const ammonia = mixture.components.findIndex(({ id }) => id === 'NH3');
  const stream = emptyStream(mixture.size);
  stream.flowsMolPerS[ammonia] = 1;
  stream.temperatureK = 270;
  const settled = (pressurePa: number) => {
    stream.pressurePa = pressurePa;
    mixture.settle(stream);
    return { gas: stream.vapourFraction, enthalpyW: stream.enthalpyW };
  };
  // the vapour pressure of ammonia at 270 K is 3.8 bar: found by halving, before and after
  const dewPressure = () => {
    let [low, high] = [1e5, 10e5];
    while (high - low > 1) {
      const middle = (low + high) / 2;
      if (settled(middle).gas === 1) low = middle;
      else high = middle;
    }
    return low;
  };
  const before = dewPressure();
  const heat = settled(0.9 * before).enthalpyW - settled(1.2 * before).enthalpyW;
  set('components.NH3.vapour_pressure', 1.1);
  expect(dewPressure() / before).toBeCloseTo(1.1, 4);
  const heatAfter = settled(0.9 * before).enthalpyW - settled(1.2 * before).enthalpyW;
  expect(heatAfter / heat).toBeCloseTo(1, 3);
  set('components.NH3.vapour_pressure', 1);
  expect(dewPressure()).toBeCloseTo(before, 0);
});
