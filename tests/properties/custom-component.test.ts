import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Component } from '../../src/model/component.ts';
import { builtInComponent, builtInIds } from '../../src/properties/components.ts';
import type { CustomDefinition } from '../../src/properties/custom-component.ts';
import { customComponent } from '../../src/properties/custom-component.ts';
import { createIdealGas } from '../../src/properties/ideal-gas.ts';
import { liquidVolume } from '../../src/properties/liquid-volume.ts';
import { lnVapourPressure } from '../../src/properties/vapour-pressure.ts';
import { expectRelative } from './expect-relative.ts';

function at(c: Component, T: number) {
  const gas = createIdealGas([c], 'atct');
  const [h, s, cp] = [new Float64Array(1), new Float64Array(1), new Float64Array(1)];
  gas.enthalpies(T, h);
  gas.entropies(T, s);
  gas.heatCapacities(T, cp);
  return { h: h[0]!, s: s[0]!, cp: cp[0]! };
}

test('a component defined with the data of a built-in one is the same component', () => {
  for (const id of builtInIds) {
    const known = builtInComponent(id)!;
    const own = customComponent(id, {
      formula: known.formula,
      solid: known.solid,
      nasa9: known.idealGas,
      critical: known.critical ?? undefined,
      boilingK: known.boilingK ?? undefined,
      antoine: known.antoine,
      lowerHeatingJPerMol: known.lowerHeatingJPerMol,
    });
    expect(own.elements).toEqual(known.elements);
    expect(own.molarMassKgPerMol).toBe(known.molarMassKgPerMol);
    for (const T of [150, 298.15, 700, 1500, 7000]) expect(at(own, T)).toEqual(at(known, T));
    // inside the range of the sets; beyond it the built-in one goes on with its wide-range equation
    for (const { fromK, toK } of known.antoine) {
      const T = (fromK + toK) / 2;
      expect(lnVapourPressure(own, T)).toBe(lnVapourPressure(known, T));
    }
  }
});

test('heating values follow from the formation enthalpy', () => {
  for (const id of builtInIds) {
    const known = builtInComponent(id)!;
    const own = customComponent(id, { formula: known.formula, nasa9: known.idealGas });
    // the built-in values are printed to 10 J/mol
    expect(Math.abs(own.lowerHeatingJPerMol - known.lowerHeatingJPerMol), id).toBeLessThan(10);
    expect(Math.abs(own.higherHeatingJPerMol - known.higherHeatingJPerMol), id).toBeLessThan(10);
  }
});

test('what burns to something unknown here is given no heating value', () => {
  const chloride = customComponent('C2H5Cl', {
    formula: 'C2H5Cl',
    formationEnthalpyJPerMol: -112000,
    heatCapacity: 62,
  });
  expect(chloride.lowerHeatingJPerMol).toBe(0);
  expect(chloride.sources['heating value']).toBe(
    'taken as 0: it does not burn, or what it burns to is not known',
  );
  expect(customComponent('X', { formula: 'CH4', lowerHeatingJPerMol: 8e5 })).toMatchObject({
    lowerHeatingJPerMol: 8e5,
    higherHeatingJPerMol: 8e5,
  });
});

test('formation enthalpy, entropy and heat capacity come back exactly', () => {
  const coefficient = (size: number) => fc.double({ min: -size, max: size, noNaN: true });
  fc.assert(
    fc.property(
      fc.double({ min: -5e5, max: 5e5, noNaN: true }),
      fc.double({ min: 50, max: 400, noNaN: true }),
      fc.tuple(
        fc.double({ min: 20, max: 80, noNaN: true }),
        coefficient(0.05),
        coefficient(2e-5),
        coefficient(5e-9),
      ),
      fc.double({ min: 260, max: 1400, noNaN: true }),
      (enthalpy, entropy, [a, b, c, d], T) => {
        const own = customComponent('X', {
          formula: 'C2H6',
          formationEnthalpyJPerMol: enthalpy,
          entropyJPerMolK: entropy,
          heatCapacity: [a, b, c, d],
        });
        const reference = at(own, 298.15);
        expectRelative(reference.h, enthalpy, 1e-12, 1e5);
        expectRelative(reference.s, entropy, 1e-12);
        const hot = at(own, T);
        expectRelative(hot.cp, a + T * (b + T * (c + T * d)), 1e-12, 1);
        const rise = (n: number) => (T ** n - 298.15 ** n) / n;
        const heat = a * rise(1) + b * rise(2) + c * rise(3) + d * rise(4);
        expectRelative(hot.h - reference.h, heat, 1e-10, 1e5);
        const spread = a * Math.log(T / 298.15) + b * rise(1) + c * rise(2) + d * rise(3);
        expectRelative(hot.s - reference.s, spread, 1e-10, 100);
      },
    ),
  );
});

test('a constant heat capacity needs one number', () => {
  const own = customComponent('X', { formula: 'N2', formationEnthalpyJPerMol: 1000, heatCapacity: 30 });
  expectRelative(at(own, 1000).h, 1000 + 30 * (1000 - 298.15), 1e-12);
});

test('what the user left out is absent from the component', () => {
  const bare = customComponent('X', { formula: 'N2' });
  expect(bare).toMatchObject({
    name: 'X',
    idealGas: [],
    critical: null,
    boilingK: null,
    antoine: [],
    wideVapourPressure: null,
    liquid: null,
    custom: true,
  });
  expect(at(bare, 300).h).toBeNaN();
});

test('an Antoine set and a liquid volume of the user are used as given', () => {
  const definition: CustomDefinition = {
    formula: 'C3H6O',
    // acetone, NIST Chemistry WebBook, from memory; boils at 329.2 K
    antoine: { A: 4.42448, B: 1312.253, C: -32.445, fromK: 259, toK: 508 },
    liquidVolumeM3PerMol: 74e-6,
  };
  const acetone = customComponent('acetone', definition);
  expectRelative(Math.exp(lnVapourPressure(acetone, 329.2)), 101325, 0.01);
  expect(liquidVolume(acetone, 300)).toBe(74e-6);
});

test('a formula nobody can read is a fault of the caller', () => {
  expect(() => customComponent('X', { formula: 'Qq2' })).toThrow('"Qq" is not an element known here');
});
