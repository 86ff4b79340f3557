import fc from 'fast-check';
import { expect, test } from 'vitest';
import * as published from '../published/reaction-equilibria.ts';
import { expectRelative, expectWithin, fixedLnK, solveCase } from './helpers.ts';

const K = (degC: number): number => degC + 273.15;
const atm = 101_325;

// ideal 3:1 gas without inerts: K P c (1 − y)² = y with K per 1/2 N2 + 3/2 H2 = NH3, c = 0.25^0.5 0.75^1.5,
// a quadratic; the ratio stays 3:1 at any conversion
test.each([
  [0.0066, 10],
  [0.0066, 300],
  [0.5, 100],
  [1e-6, 1],
  [1e6, 1000],
])('ideal ammonia with K = %d at %d atm meets the closed form', (Ka, pressure) => {
  const a = Ka * pressure * 0.25 ** 0.5 * 0.75 ** 1.5;
  // y = 1 + 1/(2a) − sqrt(1/a + 1/(4a²)), written without cancellation
  const y = (2 * a) / (2 * a + 1 + Math.sqrt(4 * a + 1));
  const result = solveCase(
    [['N2 + 3 H2 <=> 2 NH3', fixedLnK(2 * Math.log(Ka), atm)]],
    { N2: 1, H2: 3, NH3: 0 },
    { temperatureK: 700, pressurePa: pressure * atm },
  );
  expectRelative(result.mole_fraction['NH3']!, y, 1e-11);
});

test.each(published.gasifier)(
  'the gasifier over solid carbon at %d K gives the textbook gas',
  (T, Ka, Kb, a, b, ...y) => {
    const result = solveCase(
      [
        ['C_gr + CO2 <=> 2 CO', fixedLnK(Math.log(Ka!))],
        ['C_gr + H2O <=> CO + H2', fixedLnK(Math.log(Kb!))],
      ],
      { C_gr: 5, CO2: 0.5, N2: 1.881, H2O: 1, CO: 0, H2: 0 },
      { temperatureK: T!, pressurePa: 20e5 },
    );
    // four digits printed, three at 1000 K for the mole fractions
    expectWithin(result.reactions[0]!.extent, a!, 1e-4);
    expectWithin(result.reactions[1]!.extent, b!, 1e-4);
    ['H2', 'CO', 'H2O', 'CO2', 'N2'].forEach((id, i) => {
      expectWithin(result.mole_fraction[id]!, y[i]!, 6e-4);
    });
  },
);

test('a gasifier short of carbon burns all of it and its gas is unsaturated', () => {
  const result = solveCase(
    ['C_gr + CO2 <=> 2 CO', 'C_gr + H2O <=> CO + H2'],
    { C_gr: 0.3, CO2: 0.5, N2: 1.881, H2O: 1, CO: 0, H2: 0 },
    { temperatureK: 1300, pressurePa: 20e5 },
  );
  expect(result.amounts['C_gr']).toBe(0);
  expect(result.carbon_activity!).toBeLessThan(1);
  expectWithin(result.reactions[0]!.extent + result.reactions[1]!.extent, 0.3, 1e-12);
  // what is left is the shift among the gases
  const y = result.mole_fraction;
  const shift = Math.log((y['CO2']! * y['H2']!) / (y['CO']! * y['H2O']!));
  expectWithin(shift, result.reactions[1]!.lnK - result.reactions[0]!.lnK, 1e-9);
});

test('where solid carbon is left the three routes find its activity one', () => {
  const result = solveCase(
    ['2 CO <=> C_gr + CO2', 'CH4 <=> C_gr + 2 H2', 'CO + H2 <=> C_gr + H2O'],
    { CO: 1, H2: 1, CO2: 0, CH4: 0, H2O: 0, C_gr: 0 },
    { temperatureK: 800, pressurePa: 10e5, gas: 'srk' },
  );
  expect(result.amounts['C_gr']!).toBeGreaterThan(0.1);
  expectWithin(result.carbon_activities.boudouard!, 1, 1e-8);
  expectWithin(result.carbon_activities.methaneCracking!, 1, 1e-8);
  expectWithin(result.carbon_activities.coReduction!, 1, 1e-8);
});

test.each(published.shiftCases)('shift case %s of the textbook', (_, CO, H2O, CO2, N2, bar, lnK, reacted) => {
  const result = solveCase(
    [['CO + H2O <=> CO2 + H2', fixedLnK(lnK)]],
    { CO, H2O, CO2, N2, H2: 0 },
    { temperatureK: 1100, pressurePa: bar * 1e5 },
  );
  // two or three digits printed
  expectWithin(result.conversion['H2O']!, reacted, 5e-4);
});

test('reforming with shift gives the textbook gas', () => {
  const result = solveCase(
    [
      ['CH4 + H2O <=> CO + 3 H2', fixedLnK(Math.log(0.574))],
      ['CO + H2O <=> CO2 + H2', fixedLnK(Math.log(2.21))],
    ],
    { CH4: 1, H2O: 5, CO: 0, H2: 0, CO2: 0 },
    { temperatureK: 873 },
  );
  for (const [id, y] of Object.entries(published.reforming)) expectWithin(result.mole_fraction[id]!, y, 6e-6);
});

test.each(published.methanolConversions)(
  'methanol at %d degC and %d bar converts what the Graaf constants allow',
  (degC, bar, ...x) => {
    const constant = { kind: 'published', name: 'graaf-winkelman-2016' } as const;
    const reactions = [
      ['CO + 2 H2 <=> CH3OH', constant],
      ['CO2 + H2 <=> CO + H2O', constant],
    ] as const;
    const rest = { temperatureK: K(degC!), pressurePa: bar! * 1e5 };
    const absent = { CO: 0, CO2: 0, H2: 0, CH3OH: 0, H2O: 0 };
    const fromCO = solveCase([reactions[0]], { CO: 1, H2: 2, CH3OH: 0 }, rest);
    expectWithin(fromCO.conversion['CO']!, x[0]!, 1e-4);
    const fromCO2 = solveCase(reactions, { ...absent, CO2: 1, H2: 3 }, rest);
    expectWithin(fromCO2.conversion['CO2']!, x[1]!, 1e-4);
    expectWithin(fromCO2.amounts['CH3OH']!, x[2]!, 1e-4);
    const mixed = solveCase(reactions, { ...absent, CO: 10, CO2: 8, H2: 70, N2: 12 }, rest);
    expectWithin(100 * mixed.mole_fraction['CH3OH']!, x[3]!, 1e-3);
    expectWithin(mixed.conversion['CO']!, x[4]!, 1e-4);
    expectWithin(mixed.conversion['CO2']!, x[5]!, 1e-4);
  },
);

test.each(published.sulphurConversions)(
  'converter gas of %d %% SO2 and %d %% O2 at %d degC',
  (SO2, O2, degC, eklund, nasa, eklundAt12) => {
    const feed = { SO2, O2, N2: 100 - SO2 - O2, SO3: 0 };
    const at = (name: string | null, pressurePa: number): number =>
      solveCase(
        [name === null ? 'SO2 + 1/2 O2 <=> SO3' : ['SO2 + 1/2 O2 <=> SO3', { kind: 'published', name }]],
        feed,
        { temperatureK: K(degC), pressurePa },
      ).conversion['SO2']!;
    expectWithin(at('eklund-1956', atm), eklund, 1e-4);
    expectWithin(at('eklund-1956', 1.2e5), eklundAt12, 1e-4);
    // newer polynomials of SO2 and SO3 than those of the table
    expectWithin(at(null, atm), nasa, 2e-3);
  },
);

test('the adiabatic first bed of SO2 oxidation ends where heating-up line and equilibrium meet', () => {
  const result = solveCase(
    ['SO2 + 1/2 O2 <=> SO3'],
    { SO2: 10, O2: 11, N2: 79, SO3: 0 },
    {
      temperatureK: 690,
      pressurePa: 1.2e5,
      adiabatic: true,
    },
  );
  // read from a diagram of the book
  expectWithin(result.conversion['SO2']!, published.sulphurBed.conversion, 0.005);
  expectWithin(result.temperature_K, published.sulphurBed.outletK, 2);
});

test('an adiabatic converter at 200 bar returns the enthalpy it was given', () => {
  const feed = { N2: 1, H2: 3, NH3: 0.1, Ar: 0.2 };
  const out = solveCase(['N2 + 3 H2 <=> 2 NH3'], feed, {
    temperatureK: 650,
    pressurePa: 200e5,
    gas: 'srk',
    adiabatic: true,
  });
  expect(out.temperature_K).toBeGreaterThan(700);
  // cooled adiabatically by the reverse reaction, the product goes back no further than to its own equilibrium
  const again = solveCase(['N2 + 3 H2 <=> 2 NH3'], out.amounts, {
    temperatureK: out.temperature_K,
    pressurePa: 200e5,
    gas: 'srk',
    adiabatic: true,
  });
  expectWithin(again.temperature_K, out.temperature_K, 1e-7);
  expectWithin(again.reactions[0]!.extent, 0, 1e-9);
});

test('the approach takes K hotter for an exothermic reaction and colder for an endothermic one', () => {
  const exothermic = (temperatureK: number, approachK: number) =>
    solveCase(
      ['N2 + 3 H2 <=> 2 NH3'],
      { N2: 1, H2: 3, NH3: 0 },
      { temperatureK, pressurePa: 1e7, approachK },
    );
  expect(exothermic(700, 15).reactions[0]!.lnK).toBe(exothermic(715, 0).reactions[0]!.lnK);
  expectWithin(exothermic(700, 15).reactions[0]!.extent, exothermic(715, 0).reactions[0]!.extent, 1e-12);
  const endothermic = (temperatureK: number, approachK: number) =>
    solveCase(
      ['CH4 + H2O <=> CO + 3 H2'],
      { CH4: 1, H2O: 3, CO: 0, H2: 0 },
      { temperatureK, pressurePa: 30e5, approachK },
    );
  expectWithin(endothermic(1100, 15).reactions[0]!.extent, endothermic(1085, 0).reactions[0]!.extent, 1e-12);
});

test('a feed that cannot react comes out as it went in', () => {
  const result = solveCase(['N2 + 3 H2 <=> 2 NH3'], { N2: 1, H2: 0, NH3: 0, Ar: 2 }, { temperatureK: 700 });
  expect(result.amounts).toEqual({ N2: 1, H2: 0, NH3: 0, Ar: 2 });
  expect(result.reactions[0]!.extent).toBe(0);
  expect(result.carbon_activity).toBeNull();
});

test('a reaction that follows from the others is left out, and the case says so', () => {
  const result = solveCase(
    ['CO + 2 H2 <=> CH3OH', 'CO2 + H2 <=> CO + H2O', 'CO2 + 3 H2 <=> CH3OH + H2O'],
    { CO: 1, CO2: 1, H2: 5, CH3OH: 0, H2O: 0 },
    { temperatureK: 520, pressurePa: 8e6 },
  );
  expect(result.assumptions).toContain(
    'CO2 + 3 H2 <=> CH3OH + H2O follows from the other reactions and is left out.',
  );
  const y = result.mole_fraction;
  const lnQ = Math.log((y['CH3OH']! * y['H2O']!) / (y['CO2']! * y['H2']! ** 3)) - 2 * Math.log(80);
  expectWithin(lnQ, result.reactions[2]!.lnK, 1e-9);
});

const conditions = fc.record({
  T: fc.double({ min: 550, max: 900, noNaN: true }),
  bar: fc.double({ min: 5, max: 150, noNaN: true }),
  N2: fc.double({ min: 0.2, max: 3, noNaN: true }),
  H2: fc.double({ min: 0.5, max: 6, noNaN: true }),
  NH3: fc.double({ min: 0, max: 0.5, noNaN: true }),
  gas: fc.constantFrom('ideal' as const, 'srk' as const),
});
const synthesis = ['N2 + 3 H2 <=> 2 NH3'];
const extent = (c: {
  T: number;
  bar: number;
  N2: number;
  H2: number;
  NH3: number;
  gas: 'ideal' | 'srk';
  Ar?: number;
}): number =>
  solveCase(
    synthesis,
    { N2: c.N2, H2: c.H2, NH3: c.NH3, Ar: c.Ar ?? 0 },
    { temperatureK: c.T, pressurePa: c.bar * 1e5, gas: c.gas },
  ).reactions[0]!.extent;

test('an exothermic reaction converts less when hotter', () => {
  fc.assert(
    fc.property(conditions, (c) => {
      expect(extent({ ...c, T: c.T + 10 })).toBeLessThan(extent(c));
    }),
    { numRuns: 60 },
  );
});

test('a reaction to fewer moles converts more under pressure', () => {
  fc.assert(
    fc.property(conditions, (c) => {
      expect(extent({ ...c, bar: c.bar * 1.1 })).toBeGreaterThan(extent(c));
    }),
    { numRuns: 60 },
  );
});

test('removing product converts more', () => {
  fc.assert(
    fc.property(conditions, (c) => {
      expect(extent({ ...c, NH3: 0.5 * c.NH3 }) - extent(c)).toBeGreaterThanOrEqual(
        c.NH3 > 1e-6 ? 1e-9 : -1e-14,
      );
    }),
    { numRuns: 60 },
  );
});

test('an inert costs conversion at fixed pressure', () => {
  fc.assert(
    fc.property(conditions, (c) => {
      expect(extent({ ...c, Ar: 0.5 })).toBeLessThan(extent(c));
    }),
    { numRuns: 60 },
  );
});

test('solid carbon drops out of the quotient: more of it changes nothing in the gas', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 800, max: 1400, noNaN: true }),
      fc.double({ min: 1, max: 40, noNaN: true }),
      fc.double({ min: 3, max: 50, noNaN: true }),
      (temperatureK, bar, carbon) => {
        const gas = (C_gr: number) =>
          solveCase(
            ['C_gr + CO2 <=> 2 CO'],
            { C_gr, CO2: 1, CO: 0.1, N2: 0.5 },
            { temperatureK, pressurePa: bar * 1e5 },
          );
        const some = gas(carbon);
        const more = gas(2 * carbon);
        expect(some.amounts['C_gr']!).toBeGreaterThan(0);
        expectWithin(more.mole_fraction['CO']!, some.mole_fraction['CO']!, 1e-12);
      },
    ),
    { numRuns: 60 },
  );
});
