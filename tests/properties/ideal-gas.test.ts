import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Component } from '../../src/model/component.ts';
import type { Reaction } from '../../src/model/reaction.ts';
import { builtInComponent, builtInIds } from '../../src/properties/components.ts';
import type { EnthalpyBasis } from '../../src/properties/ideal-gas.ts';
import { createIdealGas, enthalpyBasisFor } from '../../src/properties/ideal-gas.ts';
import { expectRelative } from './expect-relative.ts';

const all = builtInIds.map((id) => builtInComponent(id)!);

function pure(c: Component, basis: EnthalpyBasis = 'atct') {
  const gas = createIdealGas([c], basis);
  const out = new Float64Array(1);
  const read = (name: 'enthalpies' | 'entropies' | 'heatCapacities') => (T: number) => {
    gas[name](T, out);
    return out[0]!;
  };
  return { h: read('enthalpies'), s: read('entropies'), cp: read('heatCapacities') };
}

function named(id: string) {
  return pure(builtInComponent(id)!);
}

// NIST-JANAF, 4th ed. (1998), table N-023, J/(mol K), three decimals. The NASA fit follows Gurvich (1978)
// and lies within 0.002 of it: hence 1e-4.
test.each([
  [298.15, 29.124],
  [500, 29.58],
  [1000, 32.697],
])('nitrogen at %d K has the heat capacity %d', (T, cp) => {
  expectRelative(named('N2').cp(T), cp, 1e-4);
});

test('elements at 298.15 K have no enthalpy', () => {
  // The coefficients are printed to ten figures; what is left over is a few thousandths of a joule.
  for (const id of ['H2', 'N2', 'O2', 'Ar', 'He', 'C_gr']) {
    expect(Math.abs(named(id).h(298.15)), id).toBeLessThan(0.01);
  }
});

test('the enthalpy at 298.15 K is the formation enthalpy of the Active Thermochemical Tables', () => {
  // Active Thermochemical Tables 1.112, J/mol; b1 is shifted to them with ten figures.
  expectRelative(named('NH3').h(298.15), -45558, 1e-6);
  expectRelative(named('CH3OH').h(298.15), -200700, 1e-6);
  expectRelative(named('H2O').h(298.15), -241822, 1e-6);
});

test('enthalpy and entropy run on without a step over every seam and range end', () => {
  for (const c of all) {
    const { h, s } = pure(c);
    for (const T of c.idealGas.flatMap((interval) => [interval.fromK, interval.toK])) {
      const below = T * (1 - 1e-13);
      const above = T * (1 + 1e-13);
      expect(Math.abs(h(above) - h(below)), `${c.id} at ${T} K`).toBeLessThan(1e-6);
      expect(Math.abs(s(above) - s(below)), `${c.id} at ${T} K`).toBeLessThan(1e-9);
    }
  }
});

test('heat capacities meet at the seams', () => {
  // Printed coefficients leave less than 1e-6 J/(mol K).
  for (const c of all) {
    for (const { fromK } of c.idealGas.slice(1)) {
      const { cp } = pure(c);
      expect(Math.abs(cp(fromK * (1 + 1e-12)) - cp(fromK)), c.id).toBeLessThan(1e-6);
    }
  }
});

const anyComponent = fc.constantFrom(...all);
const anyTemperature = fc.double({ min: 20, max: 8000, noNaN: true });

test('heat capacity is the slope of enthalpy, and Cp/T that of entropy, inside and outside the range', () => {
  fc.assert(
    fc.property(anyComponent, anyTemperature, (c, T) => {
      const { h, s, cp } = pure(c);
      const step = 1e-4 * T;
      // central differences: truncation 1e-8, cancellation 1e-8 of H over a step of 1e-4 T
      expectRelative((h(T + step) - h(T - step)) / (2 * step), cp(T), 2e-5);
      expectRelative((s(T + step) - s(T - step)) / (2 * step), cp(T) / T, 2e-5);
    }),
    { numRuns: 500 },
  );
});

test('enthalpy and entropy rise with temperature, however far outside the range', () => {
  fc.assert(
    fc.property(anyComponent, anyTemperature, anyTemperature, (c, one, other) => {
      fc.pre(Math.abs(one - other) > 1e-6);
      const { h, s } = pure(c);
      const [low, high] = [Math.min(one, other), Math.max(one, other)];
      expect(h(high)).toBeGreaterThan(h(low));
      expect(s(high)).toBeGreaterThan(s(low));
    }),
  );
});

test('a component is the same alone and among others', () => {
  const out = new Float64Array(all.length);
  for (const T of [150, 298.15, 700, 1000, 2500, 7000]) {
    createIdealGas(all, 'nasa').enthalpies(T, out);
    all.forEach((c, i) => {
      expect(out[i]).toBe(pure(c, 'nasa').h(T));
    });
  }
});

function reaction(coefficients: number[]): Reaction {
  return {
    name: 'r',
    equation: '',
    coefficients: Float64Array.from(coefficients),
    constant: { kind: 'gibbs' },
  };
}

test('reactions of sulphur compounds with what the newer tables moved are computed on the older basis', () => {
  const components = ['CO', 'H2S', 'SO2', 'SO3', 'O2', 'H2O'].map((id) => builtInComponent(id)!);
  const shift = [0, 0, -1, 1, -0.5, 0];
  const burning = [0, -1, 1, 0, -1.5, 1];
  expect(enthalpyBasisFor(components, [])).toBe('atct');
  // oxygen is an element on either basis
  expect(enthalpyBasisFor(components, [reaction(shift)])).toBe('atct');
  expect(enthalpyBasisFor(components, [reaction(shift), reaction(burning)])).toBe('nasa');
});
