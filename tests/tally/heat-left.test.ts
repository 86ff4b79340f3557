import { describe, expect, test } from 'vitest';
import { closePlant } from '../../src/tally/close-plant.ts';
import { heatLeft } from '../../src/tally/heat-left.ts';
import { createPlant, type Plant } from '../../src/tally/plant.ts';
import { createRecycleProblem } from '../../src/tally/recycle-problem.ts';
import { read } from './read.ts';
import { shipped, shippedText } from './shipped.ts';

const CLOSE = { method: 'auto', tolerance: 1e-9, maxPasses: 200 } as const;

function leftIn(plant: Plant): string[][] {
  return plant.groups
    .filter(({ tears }) => tears.length > 0)
    .map((group) => {
      const left = heatLeft(plant, group);
      if (left === null) return [];
      return group.steps.filter((_, k) => left.flowsOnly[k]).map(({ block }) => plant.blocks[block]!.name);
    });
}

const loop = (converter: string, condenser: string) => `
looptally: 1
title: Loop
components: [H2, N2, NH3, Ar]
reactions: {synthesis: N2 + 3 H2 <=> 2 NH3}
feeds:
  makeup: {temperature: 35 degC, pressure: 200 bar, flow: 1000 kmol/h, composition: {H2: 74, N2: 25, Ar: 1}}
blocks:
  mixer: {kind: mixer}
  converter: {kind: reactor, reactions: {synthesis: {approach: 10 K}}, ${converter}}
  condenser: ${condenser}
  purge: {kind: splitter, fractions: {bleed: 4 %}}
  circulator: {kind: compressor, pressure: 200 bar}
streams:
  S1: makeup -> mixer
  S2: mixer -> converter
  S3: converter -> condenser
  S4: condenser.${condenser.includes('separator') ? 'rest' : 'gas'} -> purge
  S5: condenser.${condenser.includes('separator') ? 'taken' : 'liquid'} -> out
  S6: purge.bleed -> out
  S7: purge.rest -> circulator
  S8: circulator -> mixer
`;
const CONDENSER = '{kind: condenser, temperature: -5 degC, pressure_drop: 4 bar}';

describe('what a pass leaves out', () => {
  test('is the heat of mixer, converter, condenser and circulator where both ends are isothermal', async () => {
    const plant = createPlant(await read(loop('temperature: 450 degC', CONDENSER)));
    expect(leftIn(plant)).toEqual([['mixer', 'converter', 'condenser', 'circulator']]);
  });

  test('is nothing where the converter is adiabatic', async () => {
    const plant = createPlant(await read(loop('adiabatic: true', CONDENSER)));
    expect(leftIn(plant)).toEqual([[]]);
  });

  test('is the heat of mixer and circulator alone where the condenser is set by its duty', async () => {
    const plant = createPlant(
      await read(loop('temperature: 450 degC', '{kind: condenser, duty: -9 MW, pressure_drop: 4 bar}')),
    );
    expect(leftIn(plant)).toEqual([['mixer', 'circulator']]);
  });
});

test('nothing is left out where the heat of a recycle acts on itself', async () => {
  const plant = createPlant(
    await read(`
looptally: 1
title: Gas that goes round
components: [H2, N2]
feeds: {makeup: {temperature: 35 degC, pressure: 20 bar, flow: 100 kmol/h, composition: {H2: 3, N2: 1}}}
blocks:
  mixer: {kind: mixer}
  circulator: {kind: compressor, ratio: 1.1}
  split: {kind: splitter, fractions: {product: 40 %}}
  valve: {kind: valve, pressure: 20 bar}
streams: {S1: makeup -> mixer, S2: mixer -> circulator, S3: circulator -> split, S4: split.product -> out, S5: split.rest -> valve, S6: valve -> mixer}
`),
  );
  expect(leftIn(plant)).toEqual([[]]);
});

test('leaving it out takes no more passes, and less than half of what the blocks do', async () => {
  const plant = createPlant(await read(shippedText('reference-loop.yaml')));
  let enthalpies = 0;
  const { settleAtEnthalpy } = plant.mixture;
  const counted = (of: Plant): Plant => {
    Object.assign(of.mixture, {
      settleAtEnthalpy: (...given: Parameters<typeof settleAtEnthalpy>) => {
        enthalpies++;
        settleAtEnthalpy(...given);
      },
    });
    return of;
  };
  const lean = closePlant(counted(plant), CLOSE);
  const leanEnthalpies = enthalpies;
  const answer = plant.streams.map(({ flowsMolPerS }) => flowsMolPerS.slice());
  enthalpies = 0;
  const whole = createPlant(await read(shippedText('reference-loop.yaml')));
  const kinds = whole.kinds.map((kind) => ({ ...kind, asksForHeat: () => true }));
  const { passes } = closePlant({ ...counted(whole), kinds }, CLOSE);
  expect(lean.passes).toBe(passes);
  expect(leanEnthalpies).toBeLessThan(enthalpies / 2);
  whole.streams.forEach(({ flowsMolPerS }, s) => {
    flowsMolPerS.forEach((flow, i) => {
      expect(answer[s]![i]).toBeCloseTo(flow, 6);
    });
  });
});

describe.each(shipped)('%s', (name) => {
  test('is closed in the heat that its passes leave out', async () => {
    const plant = createPlant(await read(shippedText(name)));
    expect(closePlant(plant, CLOSE).converged).toBe(true);
    for (const group of plant.groups) {
      if (group.tears.length === 0) continue;
      // The whole problem, its heat in every pass, at the answer found without: nothing moves.
      const whole = createRecycleProblem(plant, group);
      const x = new Float64Array(whole.size);
      const g = new Float64Array(whole.size);
      const scale = new Float64Array(whole.size);
      whole.read(x);
      const states = plant.outlets.flat().map(({ enthalpyW, temperatureK }) => ({ enthalpyW, temperatureK }));
      whole.evaluate(x, g);
      whole.scale!(x, g, scale);
      x.forEach((guess, i) => {
        expect(Math.abs(g[i]! - guess) / scale[i]!, whole.names[i]).toBeLessThan(1e-8);
      });
      expect(whole.extraError!()).toBeLessThan(1e-9);
      plant.outlets.flat().forEach(({ temperatureK }, k) => {
        expect(temperatureK).toBeCloseTo(states[k]!.temperatureK, 4);
      });
    }
  });
});
