import { expect, test } from 'vitest';
import { molarMass, parseFormula } from '../../src/properties/chemical-formula.ts';
import { builtInComponent, builtInIds } from '../../src/properties/components.ts';
import { createIdealGas } from '../../src/properties/ideal-gas.ts';
import { expectRelative } from './expect-relative.ts';

const all = builtInIds.map((id) => builtInComponent(id)!);

// g/mol, sums of IUPAC abridged standard atomic weights 2021
const published: Readonly<Record<string, number>> = {
  H2: 2.016,
  N2: 28.014,
  NH3: 17.031,
  Ar: 39.95,
  He: 4.0026,
  CH4: 16.043,
  CO: 28.01,
  CO2: 44.009,
  H2O: 18.015,
  CH3OH: 32.042,
  C2H5OH: 46.069,
  DME: 46.069,
  MF: 60.052,
  C2H6: 30.07,
  C2H4: 28.054,
  C3H8: 44.097,
  NC4H10: 58.124,
  O2: 31.998,
  SO2: 64.058,
  SO3: 80.057,
  NO: 30.006,
  NO2: 46.005,
  N2O4: 92.01,
  N2O: 44.013,
  HNO3: 63.012,
  H2S: 34.076,
  HCHO: 30.026,
  C_gr: 12.011,
};

test('every component has the molar mass of its atoms', () => {
  expect(builtInIds).toEqual(Object.keys(published));
  for (const c of all) {
    expect(c.molarMassKgPerMol).toBe(molarMass(c.elements));
    expectRelative(c.molarMassKgPerMol * 1000, published[c.id]!, 1e-12);
  }
});

test('every formula spells the atoms of its component', () => {
  for (const c of all) {
    expect(parseFormula(c.formula), c.id).toEqual({ ok: true, elements: c.elements });
  }
});

test('a component is put together once', () => {
  expect(builtInComponent('NH3')).toBe(builtInComponent('NH3'));
  expect(builtInComponent('NH4')).toBeUndefined();
  expect(builtInComponent('toString')).toBeUndefined();
});

test('every component but graphite is a fluid with critical constants', () => {
  expect(all.filter((c) => c.solid).map((c) => c.id)).toEqual(['C_gr']);
  expect(all.filter((c) => c.critical === null).map((c) => c.id)).toEqual(['C_gr']);
});

test('intervals of the ideal gas are ascending and adjoin', () => {
  for (const c of all) {
    expect(c.idealGas.length).toBeGreaterThan(0);
    c.idealGas.slice(1).forEach((interval, k) => {
      expect(interval.fromK, c.id).toBe(c.idealGas[k]!.toK);
    });
  }
});

test('heating values are the heats of combustion', () => {
  const fuels = all.filter((c) => c.lowerHeatingJPerMol > 0);
  const out = new Float64Array(1);
  const heat = (id: string) => {
    createIdealGas([builtInComponent(id)!], 'nasa').enthalpies(298.15, out);
    return out[0]!;
  };
  for (const c of fuels) {
    const { C = 0, H = 0, S = 0 } = c.elements;
    const burnt = C * heat('CO2') + (H / 2) * heat('H2O') + S * heat('SO2');
    // printed to 0.01 kJ/mol
    expect(Math.abs(heat(c.id) - burnt - c.lowerHeatingJPerMol), c.id).toBeLessThan(10);
    // 44.004 kJ per mole of water condensed: NASA's formation enthalpies of steam and water
    expect(Math.abs(c.higherHeatingJPerMol - c.lowerHeatingJPerMol - 22002 * H), c.id).toBeLessThan(15);
  }
  expect(fuels.map((c) => c.id)).toContain('NH3');
  expect(fuels.map((c) => c.id)).not.toContain('H2O');
});

test('every component says where its data come from', () => {
  for (const c of all) {
    expect(c.sources['ideal gas'], c.id).toBeTruthy();
    if (c.critical) expect(c.sources['critical'], c.id).toBeTruthy();
    if (c.antoine.length > 0) expect(c.sources['vapour pressure'], c.id).toBeTruthy();
    if (c.liquid) expect(c.sources['liquid'], c.id).toBeTruthy();
  }
});
