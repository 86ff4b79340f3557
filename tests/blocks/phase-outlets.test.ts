import { expect, test } from 'vitest';
import { partPhases } from '../../src/blocks/phase-outlets.ts';
import { emptyStream } from '../../src/model/stream.ts';
import { expectClose, mixtureOf, streamOf } from './helpers.ts';

const mixture = mixtureOf(['H2', 'NH3', 'C_gr']);
const part = (celsius: number, bar: number, flows: Record<string, number>) => {
  const mixed = streamOf(mixture, { celsius, bar, flows });
  const [gas, liquid] = [emptyStream(3), emptyStream(3)];
  partPhases(mixed, gas, liquid, mixture);
  return { mixed, gas, liquid };
};

test('gas and liquid add up to what was parted, in flows and in enthalpy', () => {
  const { mixed, gas, liquid } = part(0, 100, { H2: 1, NH3: 1, C_gr: 0.1 });
  mixed.flowsMolPerS.forEach((flow, i) => {
    expect(gas.flowsMolPerS[i]! + liquid.flowsMolPerS[i]!).toBe(flow);
  });
  expectClose(gas.enthalpyW + liquid.enthalpyW, mixed.enthalpyW, 1e-12 * Math.abs(mixed.enthalpyW));
  expect([gas.vapourFraction, liquid.vapourFraction]).toEqual([1, 0]);
});

test('each phase is in equilibrium with itself: settled again, it stays whole', () => {
  const { gas, liquid } = part(0, 100, { H2: 1, NH3: 1 });
  for (const [phase, share] of [
    [gas, 1],
    [liquid, 0],
  ] as const) {
    // a hair off the boundary that both stand on
    phase.pressurePa *= share === 1 ? 1 - 1e-9 : 1 + 1e-9;
    mixture.settle(phase);
    expect(phase.vapourFraction).toBe(share);
  }
});

test('where there is one phase the other outlet is empty and holds no enthalpy', () => {
  const dry = part(200, 10, { H2: 1, NH3: 1 });
  expect(mixture.total(dry.liquid)).toBe(0);
  expect(dry.liquid.enthalpyW).toBe(0);
  const wet = part(-20, 10, { NH3: 1 });
  expect(mixture.total(wet.gas)).toBe(0);
  expect(wet.gas.enthalpyW).toBe(0);
  expect(wet.liquid.enthalpyW).toBe(wet.mixed.enthalpyW);
});
