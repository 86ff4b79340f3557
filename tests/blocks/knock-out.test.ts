import fc from 'fast-check';
import { expect, test } from 'vitest';
import { lnVapourPressure } from '../../src/properties/vapour-pressure.ts';
import {
  BAR,
  expectBalances,
  expectClose,
  faultsOf,
  flowOf,
  fractionOf,
  mixtureOf,
  streamOf,
  trial,
} from './helpers.ts';

/** Wet gas of electrolysers, or of a low-pressure reformer. */
const mixture = mixtureOf(['H2', 'N2', 'CO2', 'H2O']);
const wet = streamOf(mixture, { celsius: 40, bar: 1.2, flows: { H2: 90, N2: 2, CO2: 2, H2O: 5.5 } });
const four = {
  pressure: '30 bar',
  stages: 4,
  intercooling: '30 degC',
  pressure_drop_per_cooler: '0.1 bar',
  knock_out: true,
  efficiency: '78 %',
};
const run = (raw: object = four, inlet = wet) => trial('compressor', raw, mixture, [inlet]);

test('mass, atoms and energy close with what is knocked out, drive losses included', () => {
  expectBalances(run({ ...four, drive_efficiency: '95 %' }), mixture);
});

test('they close for any wet gas, any stages and coolers', () => {
  fc.assert(
    fc.property(
      fc.record({
        water: fc.double({ min: 0, max: 30, noNaN: true }),
        carbonDioxide: fc.double({ min: 0, max: 40, noNaN: true }),
        celsius: fc.double({ min: 20, max: 150, noNaN: true }),
        bar: fc.double({ min: 1, max: 20, noNaN: true }),
        stages: fc.integer({ min: 2, max: 6 }),
        cooling: fc.double({ min: 5, max: 60, noNaN: true }),
        drop: fc.double({ min: 0, max: 0.4, noNaN: true }),
      }),
      ({ water, carbonDioxide, celsius, bar, stages, cooling, drop }) => {
        const flows = { H2: 60, N2: 3, CO2: carbonDioxide, H2O: water };
        const inlet = streamOf(mixture, { celsius, bar, flows });
        const raw = {
          ...four,
          pressure: `${bar * 12} bar`,
          stages,
          intercooling: `${cooling} degC`,
          pressure_drop_per_cooler: `${drop} bar`,
        };
        expectBalances(run(raw, inlet), mixture);
      },
    ),
    { numRuns: 60 },
  );
});

test('the gas leaves the last drum saturated: water has its vapour pressure there', () => {
  const { outlets } = run();
  const water = mixture.components.find((c) => c.id === 'H2O')!;
  const lastSuctionBar = (30 / BAR) * BAR * (outlets[0]!.pressurePa / (30 * BAR));
  // Ratio of the stages by hand: four of them with three drops of 0.1 bar between 1.2 and 30 bar.
  let ratio = 2.2;
  for (let step = 0; step < 200; step++) {
    const reached = (((1.2 * ratio - 0.1) * ratio - 0.1) * ratio - 0.1) * ratio;
    ratio *= (30 / reached) ** 0.2;
  }
  const drumBar = lastSuctionBar / ratio;
  const vapourBar = Math.exp(lnVapourPressure(water, 303.15)) / BAR;
  // Real-gas and Poynting corrections at 13 bar: below 4 %.
  expectClose(fractionOf(outlets[0]!, mixture, 'H2O') * drumBar, vapourBar, 0.04 * vapourBar);
});

test('the condensate leaves at the pressure of the first drum, almost pure water with some gas in it', () => {
  const { outlets, report } = run();
  const [, condensate] = outlets;
  expect(condensate!.pressurePa).toBeLessThan(3 * BAR);
  expect(condensate!.pressurePa).toBeGreaterThan(2 * BAR);
  expect(fractionOf(condensate!, mixture, 'H2O')).toBeGreaterThan(0.998);
  expect(flowOf(condensate!, mixture, 'CO2')).toBeGreaterThan(0);
  // Drains of later drums give up a little of their gas where they are let down.
  expect(condensate!.vapourFraction).toBeLessThan(0.01);
  expectClose(report.details['condensate_kmol_h'] as number, mixture.total(condensate!) * 3.6, 1e-9);
  expect(report.warnings).toEqual([]);
});

test('with one drum its liquid leaves as it is', () => {
  const { outlets } = run({ ...four, pressure: '5 bar', stages: 2 });
  expect(outlets[1]!.vapourFraction).toBe(0);
  expectClose(outlets[1]!.temperatureK, 303.15, 1e-9);
});

test('without knock-out the liquid goes on and is warned of', () => {
  const { knock_out: _, ...raw } = four;
  const plain = run(raw);
  expect(plain.outlets).toHaveLength(1);
  expect(plain.report.warnings).toEqual([
    {
      code: 'liquid-at-suction',
      message: 'liquid condenses between stages; take it out with knock_out: true',
    },
  ]);
  expectBalances(plain, mixture);
});

test('a dry gas leaves the drums empty', () => {
  const dry = streamOf(mixture, { celsius: 40, bar: 1.2, flows: { H2: 90, N2: 2 } });
  const { outlets, report } = run(four, dry);
  expect([mixture.total(outlets[1]!), outlets[1]!.enthalpyW]).toEqual([0, 0]);
  expect(report.warnings).toEqual([]);
});

test('drums and drops belong to coolers', () => {
  const codes = (raw: object) => faultsOf('compressor', raw).map(({ path, code }) => [path[0], code]);
  expect(codes({ ratio: 3, stages: 2, knock_out: true })).toEqual([['knock_out', 'idle-setting']]);
  expect(codes({ ratio: 3, stages: 2, pressure_drop_per_cooler: '0.2 bar' })).toEqual([
    ['pressure_drop_per_cooler', 'idle-setting'],
  ]);
  expect(codes({ ratio: 3, stages: 2, knock_out: false })).toEqual([]);
});
