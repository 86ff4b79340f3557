import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { blockKinds } from '../../src/blocks/registry.ts';
import { firstBed } from '../published/sulphur-dioxide.ts';
import {
  components,
  expectClose,
  faultsOf,
  flowOf,
  fractionOf,
  mixtureOf,
  reaction,
  streamOf,
  trial,
  troubleOf,
} from './helpers.ts';

const ids = ['H2', 'N2', 'NH3', 'Ar'];
const synthesis = [reaction('synthesis', 'N2 + 3 H2 <=> 2 NH3', components(...ids))];
const mixture = mixtureOf(ids, { reactions: synthesis });
const loopGas = streamOf(mixture, { celsius: 300, bar: 200, flows: { H2: 60, N2: 20, NH3: 3, Ar: 5 } });
const run = (raw: Record<string, unknown>, inlet = loopGas) =>
  trial('reactor', { reactions: { synthesis: {} }, ...raw }, mixture, [inlet], synthesis);

describe('an ammonia converter', () => {
  test('at a set temperature reaches the fugacities of its constant', () => {
    const { outlets, report } = run({ temperature: '450 degC' });
    const [out] = outlets;
    const y = out!.flowsMolPerS.map((flow) => flow / mixture.total(out!));
    const lnPhi = new Float64Array(4);
    mixture.gas.lnPhi(out!.temperatureK, out!.pressurePa, y, lnPhi);
    const lnQ = [-3, -1, 2].reduce((sum, v, i) => sum + v * (Math.log(y[i]! * 200) + lnPhi[i]!), 0);
    expectClose(lnQ, (report.details['ln_K'] as Record<string, number>)['synthesis']!, 1e-8);
  });

  test('run adiabatically with its own duty taken out comes to the same point as isothermally', () => {
    const isothermal = run({ temperature: '450 degC' });
    expect(isothermal.report.dutyW).toBeLessThan(0);
    const byDuty = run({ duty: `${isothermal.report.dutyW} W` });
    expectClose(byDuty.outlets[0]!.temperatureK, 723.15, 1e-6);
    expectClose(
      flowOf(byDuty.outlets[0]!, mixture, 'NH3'),
      flowOf(isothermal.outlets[0]!, mixture, 'NH3'),
      1e-7,
    );
  });

  test('run adiabatically keeps its enthalpy, with the heat of reaction in it', () => {
    const { outlets, report } = run({ adiabatic: true });
    expect(outlets[0]!.enthalpyW).toBe(loopGas.enthalpyW);
    expect(report.dutyW).toBe(0);
    expect(outlets[0]!.temperatureK).toBeGreaterThan(loopGas.temperatureK + 100);
  });

  test('takes a cooler temperature to more ammonia, and a higher pressure too', () => {
    const ammonia = (celsius: number, bar: number) =>
      flowOf(
        run(
          { temperature: `${celsius} degC` },
          streamOf(mixture, { celsius: 300, bar, flows: { H2: 60, N2: 20, Ar: 5 } }),
        ).outlets[0]!,
        mixture,
        'NH3',
      );
    fc.assert(
      fc.property(fc.integer({ min: 350, max: 540 }), fc.integer({ min: 50, max: 290 }), (celsius, bar) => {
        expect(ammonia(celsius + 10, bar)).toBeLessThan(ammonia(celsius, bar));
        expect(ammonia(celsius, bar + 10)).toBeGreaterThan(ammonia(celsius, bar));
      }),
      { numRuns: 25 },
    );
  });

  test('an approach costs conversion, the more the wider it is', () => {
    const ammonia = [0, 5, 10, 20, 40].map((approach) =>
      flowOf(
        run({ reactions: { synthesis: { approach: `${approach} K` } }, temperature: '450 degC' }).outlets[0]!,
        mixture,
        'NH3',
      ),
    );
    expect(ammonia).toEqual(ammonia.toSorted((a, b) => b - a));
    expect(new Set(ammonia).size).toBe(5);
  });

  test('an approach of 20 K gives the equilibrium of 20 K hotter', () => {
    const ideal = mixtureOf(ids, { gas: 'ideal', reactions: synthesis });
    const inlet = streamOf(ideal, { celsius: 300, bar: 200, flows: { H2: 60, N2: 20 } });
    const at = (approach: string, temperature: string) =>
      flowOf(
        trial('reactor', { reactions: { synthesis: { approach } }, temperature }, ideal, [inlet], synthesis)
          .outlets[0]!,
        ideal,
        'NH3',
      );
    expectClose(at('20 K', '430 degC'), at('0 K', '450 degC'), 1e-8);
  });

  test('loses its pressure drop', () => {
    expect(run({ temperature: '450 degC', pressure_drop: '4 bar' }).outlets[0]!.pressurePa).toBe(196e5);
    expect(troubleOf(() => run({ temperature: '450 degC', pressure_drop: '250 bar' }))).toBe('pressure-drop');
  });

  test('reports extent, constant and temperatures', () => {
    const { outlets, report } = run({ temperature: '450 degC' });
    const made = flowOf(outlets[0]!, mixture, 'NH3') - 3;
    expectClose(
      (report.details['extent_kmol_h'] as Record<string, number>)['synthesis']!,
      (made / 2) * 3.6,
      1e-9,
    );
    expect(report.details).toMatchObject({
      inlet_K: 573.15,
      outlet_K: 723.15,
      outlet_bar: 200,
      approach_K: { synthesis: 0 },
      carbon_activity_inlet: null,
      carbon_activity_outlet: null,
    });
  });
});

describe('set conversions', () => {
  test('25 % of the nitrogen make half as much ammonia again, whatever the temperature', () => {
    const raw = { reactions: { synthesis: { conversion: '25 %', of: 'N2' } }, temperature: '450 degC' };
    const [out] = run(raw).outlets;
    expectClose(flowOf(out!, mixture, 'N2'), 15, 1e-12);
    expectClose(flowOf(out!, mixture, 'H2'), 45, 1e-12);
    expectClose(flowOf(out!, mixture, 'NH3'), 13, 1e-12);
  });

  test('more than there is of the other reactant is refused', () => {
    const poor = streamOf(mixture, { celsius: 300, bar: 200, flows: { H2: 60, N2: 2 } });
    const raw = { reactions: { synthesis: { conversion: '25 %', of: 'H2' } }, temperature: '450 degC' };
    expect(troubleOf(() => run(raw, poor))).toBe('reactant-used-up');
  });

  test('beside an equilibrium they are taken first, and the report says so', () => {
    const names = ['CO', 'H2O', 'CO2', 'H2', 'CH4'];
    const list = components(...names);
    const two = [
      reaction('methanation', 'CO + 3 H2 <=> CH4 + H2O', list),
      reaction('shift', 'CO + H2O <=> CO2 + H2', list),
    ];
    const gas = mixtureOf(names, { reactions: two });
    const inlet = streamOf(gas, { celsius: 350, bar: 20, flows: { CO: 1, H2O: 2, CO2: 0.3, H2: 4 } });
    const raw = {
      reactions: { methanation: { conversion: '10 %', of: 'CO' }, shift: {} },
      temperature: '400 degC',
    };
    const { outlets, report } = trial('reactor', raw, gas, [inlet], two);
    expectClose(flowOf(outlets[0]!, gas, 'CH4'), 0.1, 1e-12);
    expect(report.assumptions).toEqual([
      'conversions are taken first, in the order written, then the equilibria all at once',
    ]);
  });
});

test('the first bed of a sulphur dioxide converter stops where the book says', () => {
  const names = ['SO2', 'O2', 'SO3', 'N2'];
  const list = components(...names);
  const oxidation = [reaction('oxidation', '2 SO2 + O2 <=> 2 SO3', list)];
  const gas = mixtureOf(names, { gas: 'ideal', reactions: oxidation });
  const inlet = streamOf(gas, { kelvin: firstBed.inletK, bar: firstBed.bar, flows: firstBed.feedPercent });
  const raw = { reactions: { oxidation: {} }, adiabatic: true };
  const [out] = trial('reactor', raw, gas, [inlet], oxidation).outlets;
  // 0.4 points and 1 K are what the heat capacities of three tabulations differ by.
  expectClose(1 - flowOf(out!, gas, 'SO2') / 10, firstBed.conversion, 0.004);
  expectClose(out!.temperatureK, firstBed.outletK, 1);
});

test('a shift reactor leaves a gas that obeys the constant of Moe', () => {
  const names = ['CO', 'H2O', 'CO2', 'H2', 'N2'];
  const list = components(...names);
  const shift = [reaction('shift', 'CO + H2O <=> CO2 + H2', list, { kind: 'published', name: 'moe-1962' })];
  const gas = mixtureOf(names, { gas: 'ideal', reactions: shift });
  const inlet = streamOf(gas, { celsius: 220, bar: 30, flows: { CO: 3, H2O: 30, CO2: 10, H2: 50, N2: 20 } });
  const [out] = trial('reactor', { reactions: { shift: {} }, adiabatic: true }, gas, [inlet], shift).outlets;
  const y = (id: string) => fractionOf(out!, gas, id);
  // J. M. Moe, Chem. Eng. Prog. 58(3) (1962) 33: K = exp(4577.8/T - 4.33)
  const K = Math.exp(4577.8 / out!.temperatureK - 4.33);
  expectClose((y('CO2') * y('H2')) / (y('CO') * y('H2O')), K, 1e-8 * K);
  expect(out!.temperatureK).toBeGreaterThan(493.15 + 10);
});

describe('carbon', () => {
  const names = ['CO', 'CO2', 'H2', 'H2O', 'CH4'];
  const list = components(...names);
  const shift = [reaction('shift', 'CO + H2O <=> CO2 + H2', list)];
  const gas = mixtureOf(names, { reactions: shift });
  const warnings = (flows: Record<string, number>) =>
    trial(
      'reactor',
      { reactions: { shift: {} }, temperature: '600 degC' },
      gas,
      [streamOf(gas, { celsius: 600, bar: 20, flows })],
      shift,
    ).report.warnings.map((warning) => warning.code);

  test('can form from dry carbon monoxide, and the report warns', () => {
    expect(warnings({ CO: 5, H2: 5, CO2: 0.1, H2O: 0.1 })).toEqual(['carbon']);
  });

  test('does not form where there is steam enough', () => {
    expect(warnings({ CO: 0.1, H2: 5, CO2: 3, H2O: 10 })).toEqual([]);
  });
});

test('graphite leaves a gasifier as the solid it is', () => {
  const names = ['CO', 'CO2', 'C_gr', 'N2'];
  const list = components(...names);
  const boudouard = [reaction('boudouard', '2 CO <=> C_gr + CO2', list)];
  const gas = mixtureOf(names, { reactions: boudouard });
  const inlet = streamOf(gas, { celsius: 500, bar: 1, flows: { CO: 10, CO2: 1, N2: 1 } });
  const { outlets } = trial(
    'reactor',
    { reactions: { boudouard: {} }, temperature: '600 degC' },
    gas,
    [inlet],
    boudouard,
  );
  const made = flowOf(outlets[0]!, gas, 'C_gr');
  expect(made).toBeGreaterThan(1);
  expect(outlets[0]!.liquidMolPerS[2]).toBe(made);
  expect(outlets[0]!.vapourFraction).toBe(1);
});

test('liquid at the outlet of a reactor is worth a word', () => {
  const cold = run({ temperature: '-20 degC' });
  expect(cold.report.warnings.map((warning) => warning.code)).toContain('liquid-in-reactor');
  expect(run({ temperature: '450 degC' }).report.warnings).toEqual([]);
});

test('a published constant outside its range is worth a word', () => {
  const names = ['CO', 'H2O', 'CO2', 'H2'];
  const shift = [
    reaction('shift', 'CO + H2O <=> CO2 + H2', components(...names), { kind: 'published', name: 'moe-1962' }),
  ];
  const gas = mixtureOf(names, { reactions: shift });
  const inlet = streamOf(gas, { celsius: 220, bar: 1, flows: { CO: 3, H2O: 30, CO2: 10, H2: 50 } });
  const { report } = trial(
    'reactor',
    { reactions: { shift: {} }, temperature: '1400 degC' },
    gas,
    [inlet],
    shift,
  );
  expect(report.warnings.map((warning) => warning.code)).toContain('constant-out-of-range');
});

test('it says which reactions run and which of them to equilibrium', () => {
  const kind = blockKinds.get('reactor')!;
  const setting = { reactions: { a: { conversion: 0.5, of: 'H2' }, b: { approach: 10 }, c: {} } };
  expect(kind.reactionsIn!(setting)).toEqual(['a', 'b', 'c']);
  expect(kind.equilibriaIn!(setting)).toEqual(['b', 'c']);
  expect(kind.ports(setting)).toEqual({ inlets: ['in'], outlets: ['out'] });
});

test('exactly one of temperature, adiabatic and duty is set', () => {
  const known = { components: components(...ids), reactions: synthesis };
  const codes = (raw: object) =>
    faultsOf('reactor', { reactions: { synthesis: {} }, ...raw }, known).map((fault) => fault.code);
  expect(codes({})).toEqual(['missing-setting']);
  expect(codes({ adiabatic: true, temperature: '450 degC' })).toEqual(['too-many-settings']);
  expect(codes({ adiabatic: true })).toEqual([]);
});
