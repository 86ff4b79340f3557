import fc from 'fast-check';
import { expect, test } from 'vitest';
import { expectClose, flowOf, mixtureOf, refusedBySchema, streamOf, trial, troubleOf } from './helpers.ts';

const mixture = mixtureOf(['H2', 'N2', 'NH3']);
const gas = (celsius: number, bar: number, h2 = 3, n2 = 1, nh3 = 0) =>
  streamOf(mixture, { celsius, bar, flows: { H2: h2, N2: n2, NH3: nh3 } });

test('a mixer adds up its inlets, component by component, and their enthalpies', () => {
  const inlets = [gas(35, 200), gas(20, 201, 10, 3, 1), gas(-10, 205, 0, 0, 4)];
  const [out] = trial('mixer', {}, mixture, inlets).outlets;
  expect([...out!.flowsMolPerS]).toEqual([13, 4, 5]);
  expectClose(
    out!.enthalpyW,
    inlets.reduce((sum, s) => sum + s.enthalpyW, 0),
    1e-9,
  );
});

test('the order of its inlets does not matter', () => {
  const inlet = fc
    .tuple(
      fc.double({ min: -20, max: 400, noNaN: true }),
      fc.double({ min: 10, max: 250, noNaN: true }),
      fc.array(fc.double({ min: 0, max: 10, noNaN: true }), { minLength: 3, maxLength: 3 }),
    )
    .map(([celsius, bar, flows]) => gas(celsius, bar, flows[0], flows[1], flows[2]));
  fc.assert(
    fc.property(fc.array(inlet, { minLength: 2, maxLength: 5 }), (inlets) => {
      const [there] = trial('mixer', {}, mixture, inlets).outlets;
      const [back] = trial('mixer', {}, mixture, [...inlets].reverse()).outlets;
      // Sums in another order differ by rounding; so does the temperature they lead to.
      expectClose(back!.temperatureK, there!.temperatureK, 1e-6);
      expectClose(back!.enthalpyW, there!.enthalpyW, 1e-9 * (1 + Math.abs(there!.enthalpyW)));
      expect(back!.pressurePa).toBe(there!.pressurePa);
    }),
  );
});

test('it takes the lowest pressure of the inlets that carry anything', () => {
  const inlets = [gas(35, 200), gas(20, 190), gas(20, 50, 0, 0, 0)];
  const [out] = trial('mixer', {}, mixture, inlets).outlets;
  expect(out!.pressurePa).toBe(190e5);
});

test('a set pressure below its inlets is kept, one above the lowest is refused', () => {
  const inlets = [gas(35, 200), gas(20, 190)];
  expect(trial('mixer', { pressure: '150 bar' }, mixture, inlets).outlets[0]!.pressurePa).toBe(150e5);
  expect(troubleOf(() => trial('mixer', { pressure: '195 bar' }, mixture, inlets))).toBe('pressure-rise');
});

test('an inlet let down by more than 2 % of its pressure is worth a word', () => {
  expect(trial('mixer', {}, mixture, [gas(35, 200), gas(20, 197)]).report.warnings).toEqual([]);
  expect(trial('mixer', {}, mixture, [gas(35, 200), gas(20, 190)]).report.warnings).toEqual([
    {
      code: 'mixing-pressure',
      message: 'an inlet at 200.00 bar is let down to 190.00 bar in the mixer without doing work',
    },
  ]);
});

test('a single inlet goes through unchanged', () => {
  const inlet = gas(-20, 100, 3, 1, 5);
  expect(trial('mixer', {}, mixture, [inlet]).outlets[0]).toEqual(inlet);
});

test('hot gas boils the condensate it meets', () => {
  const [out] = trial('mixer', {}, mixture, [gas(400, 20, 30, 10, 0), gas(10, 20, 0, 0, 1)]).outlets;
  expect(out!.vapourFraction).toBe(1);
  expect(flowOf(out!, mixture, 'NH3')).toBe(1);
  expect(out!.temperatureK).toBeLessThan(673.15);
});

test('settings it does not know are turned down', () => {
  expect(refusedBySchema('mixer', { presure: '5 bar' })).toBe(true);
  expect(refusedBySchema('mixer', { pressure: 5 })).toBe(true);
});

test('it has any number of inlets and one outlet', () => {
  expect(trial('mixer', {}, mixture, [gas(0, 1)]).kind.ports({})).toEqual({
    inlets: 'any',
    outlets: ['out'],
  });
});
