import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { constantHeatGas } from './constant-heat-gas.ts';
import { expectClose, faultsOf, mixtureOf, refusedBySchema, streamOf, trial } from './helpers.ts';

const air = mixtureOf(['N2', 'O2'], { gas: 'ideal' });
const airFlows = (molPerS: number) => ({ N2: 0.79 * molPerS, O2: 0.21 * molPerS });
/** kg/mol of this air */
const airMass = air.mass(streamOf(air, { bar: 1, flows: airFlows(1) }));

describe('published worked examples', () => {
  // Y. A. Cengel, M. A. Boles, Thermodynamics, example 7-13: 263.2 kJ/kg from 100 to 900 kPa at 300 K with k = 1.4
  // throughout. The heat capacity of real air rises by 3 % up to the 560 K of the discharge: 0.5 % less work.
  test('air from 100 to 900 kPa takes 263 kJ/kg', () => {
    const inlet = streamOf(air, { kelvin: 300, bar: 1, flows: airFlows(1) });
    const { report } = trial('compressor', { pressure: '900 kPa', efficiency: '100 %' }, air, [inlet]);
    expectClose(report.powerW / airMass / 1e3, 263.2, 0.01 * 263.2);
  });

  // J. M. Coulson, J. F. Richardson, Chemical Engineering vol. 1, example 8.3: 0.1 m3/s (273 K, 101.3 kPa) of air
  // from 289 K and 101.3 kPa to 380 kPa with k = 1.4: 17.2 kW, printed to three digits.
  test('0.1 normal m3/s of air to 380 kPa takes 17.2 kW', () => {
    const molPerS = (101.3e3 * 0.1) / (8.314 * 273);
    const inlet = streamOf(air, { kelvin: 289, bar: 1.013, flows: airFlows(molPerS) });
    const { report } = trial('compressor', { pressure: '380 kPa', efficiency: '100 %' }, air, [inlet]);
    expectClose(report.powerW / 1e3, 17.2, 0.005 * 17.2);
  });

  // J. M. Smith, H. C. Van Ness, M. M. Abbott, Introduction to Chemical Engineering Thermodynamics, example 7.8:
  // saturated steam from 100 to 300 kPa with 75 %: 284.5 kJ/kg and 519.25 K. The vapour model is 3.5 K too hot:
  // it makes little of the association of steam near saturation.
  test('saturated steam from 100 to 300 kPa takes 284.5 kJ/kg and leaves at 519 K', () => {
    const steam = mixtureOf(['H2O']);
    const water = streamOf(steam, { celsius: 25, bar: 1, flows: { H2O: 1 } });
    const boiler = trial('heater', { vapour_fraction: '100 %' }, steam, [water]);
    const { outlets, report } = trial(
      'compressor',
      { pressure: '300 kPa', efficiency: '75 %' },
      steam,
      boiler.outlets,
    );
    expectClose(report.powerW / 18.015e-3 / 1e3, 284.5, 0.01 * 284.5);
    expectClose(outlets[0]!.temperatureK, 519.25, 4);
  });

  // I. Granet, Thermodynamics and Heat Power, example 10.6: ammonia, dry saturated at 15 psia, isentropic to
  // 120 psia, throttled from saturated liquid: work 131.0 and effect 486.4 Btu/lb, COP 3.71. Ours: 132.7 and 477.5
  // Btu/lb, COP 3.60, since Soave-Redlich-Kwong is short of the departures of polar ammonia.
  test('an ammonia refrigerator between 15 and 120 psia has the COP 3.71 within 4 %', () => {
    const ammonia = mixtureOf(['NH3']);
    const low = streamOf(ammonia, { celsius: -40, bar: 15 * 0.0689476, flows: { NH3: 1 } });
    const high = streamOf(ammonia, { celsius: 0, bar: 120 * 0.0689476, flows: { NH3: 1 } });
    const suction = trial('heater', { vapour_fraction: '100 %' }, ammonia, [low]).outlets[0]!;
    const condensate = trial('heater', { vapour_fraction: '0 %' }, ammonia, [high]).outlets[0]!;
    const machine = trial('compressor', { pressure: '120 psi', efficiency: '100 %' }, ammonia, [suction]);
    const perLb = (watts: number) => watts / 17.031e-3 / 2326;
    expectClose(perLb(machine.report.powerW), 131.0, 0.015 * 131);
    expectClose(perLb(suction.enthalpyW - condensate.enthalpyW), 486.4, 0.02 * 486.4);
  });

  // The same book: with n = 1.3 throughout 246.4 kJ/kg, in two stages with cooling to 300 K between 215.3 kJ/kg.
  // A gas whose k is 1.3 has that path as its isentrope. Four digits printed.
  test.each([
    [1, 246.4],
    [2, 215.3],
  ])('a gas of exponent 1.3 from 100 to 900 kPa in %d stages takes %d kJ/kg', (stages, work) => {
    expectClose(exponentGas(1.3, 0.287, 300, 1, 9, stages).kJPerKg, work, 0.06);
  });

  // J. M. Coulson, J. F. Richardson, Chemical Engineering vol. 1, example 8.4: 101.3 to 2065 kPa in two stages,
  // 290 K, n = 1.25, M = 28.8, mechanical efficiency 85 %: 346.5 kJ/kg.
  test('air of exponent 1.25 in two stages to 2065 kPa draws 346.5 kJ/kg', () => {
    expectClose(exponentGas(1.25, 8.314462618 / 28.8, 290, 1.013, 20.65, 2, '85 %').kJPerKg, 346.5, 0.1);
  });

  // P. K. Nag, Basic and Applied Thermodynamics, example 19.11 (works re-computed): 1 to 36 bar, 298 K, n = 1.3; the
  // limit of 390 K takes four stages.
  test.each([
    [1, 476.75, 681.3],
    [2, 379.56, 450.6],
    [3, 352.89, 392.6],
    [4, 340.47, 366.4],
  ])(
    'air of exponent 1.3 to 36 bar in %d stages takes %d kJ/kg and leaves at %d K',
    (stages, work, outletK) => {
      const { kJPerKg, dischargeK, warnings } = exponentGas(1.3, 0.287, 298, 1, 36, stages);
      expectClose(kJPerKg, work, 0.02);
      expectClose(dischargeK, outletK, 0.06);
      expect(warnings).toEqual(stages < 4 ? ['hot-discharge'] : []);
    },
  );

  function exponentGas(
    n: number,
    rKJPerKgK: number,
    kelvin: number,
    from: number,
    to: number,
    stages: number,
    drive = '100 %',
  ) {
    const gas = constantHeatGas(n, 8.314462618e-3 / rKJPerKgK);
    const inlet = streamOf(gas, { kelvin, bar: from, flows: { X: 1 } });
    const cooling = stages > 1 ? { stages, intercooling: `${kelvin} K` } : {};
    const raw = {
      pressure: `${to} bar`,
      efficiency: '100 %',
      drive_efficiency: drive,
      discharge_limit: '390 K',
      ...cooling,
    };
    const { report } = trial('compressor', raw, gas, [inlet]);
    return {
      kJPerKg: report.powerW / gas.mass(inlet) / 1e3,
      dischargeK: report.details['discharge_K'] as number,
      warnings: report.warnings.map((w) => w.code),
    };
  }

  // Derived, not published: ideal 3:1 gas by NASA heat capacities (seven coefficients; ours have nine, and differ by
  // 0.1 %), 25 to 200 bar, 35 degC before each stage, 80 %.
  test.each([
    [1, 9085.6, 345.0],
    [2, 7754.2, 167.8],
    [3, 7365.8, 119.3],
    [4, 7180.7, 96.7],
  ])(
    'ideal synthesis gas in %d stages to 200 bar takes %d kJ/kmol and leaves at %d degC',
    (stages, work, celsius) => {
      const gas = mixtureOf(['H2', 'N2'], { gas: 'ideal' });
      const inlet = streamOf(gas, { celsius: 35, bar: 25, flows: { H2: 0.75, N2: 0.25 } });
      const cooling = stages > 1 ? { stages, intercooling: '35 degC' } : {};
      const raw = { pressure: '200 bar', efficiency: '80 %', ...cooling };
      const { report, outlets } = trial('compressor', raw, gas, [inlet]);
      expectClose(report.powerW, work, 1e-3 * work);
      expectClose(outlets[0]!.temperatureK - 273.15, celsius, 0.5);
    },
  );
});

const mixture = mixtureOf(['H2', 'N2', 'NH3']);
const gas = streamOf(mixture, { celsius: 35, bar: 25, flows: { H2: 0.75, N2: 0.25 } });
const run = (raw: Record<string, unknown>) => trial('compressor', raw, mixture, [gas]);

test('real synthesis gas to 200 bar takes 3 to 8 % more than ideal gas', () => {
  const ideal = mixtureOf(['H2', 'N2'], { gas: 'ideal' });
  const inlet = streamOf(ideal, { celsius: 35, bar: 25, flows: { H2: 0.75, N2: 0.25 } });
  const raw = { pressure: '200 bar', stages: 3, intercooling: '35 degC', efficiency: '80 %' };
  const ratio = run(raw).report.powerW / trial('compressor', raw, ideal, [inlet]).report.powerW;
  expect(ratio).toBeGreaterThan(1.03);
  expect(ratio).toBeLessThan(1.08);
});

test('a stage of full efficiency keeps the entropy', () => {
  const { outlets } = run({ ratio: 3, efficiency: '100 %' });
  expectClose(mixture.entropy(outlets[0]!), mixture.entropy(gas), 1e-9 * Math.abs(mixture.entropy(gas)));
});

test('work grows as the efficiency falls, exactly inversely in one stage', () => {
  const full = run({ ratio: 2, efficiency: '100 %' }).report.powerW;
  fc.assert(
    fc.property(fc.double({ min: 0.05, max: 1, noNaN: true }), (efficiency) => {
      expectClose(run({ ratio: 2, efficiency }).report.powerW, full / efficiency, (1e-8 * full) / efficiency);
    }),
    { numRuns: 30 },
  );
});

test('stages have equal ratios: three of them by hand are one compressor of three', () => {
  const together = run({ pressure: '200 bar', stages: 3, efficiency: '80 %' });
  let stream = gas;
  let power = 0;
  for (const bar of [50, 100, 200]) {
    const stage = trial('compressor', { pressure: `${bar} bar`, efficiency: '80 %' }, mixture, [stream]);
    power += stage.report.powerW;
    stream = stage.outlets[0]!;
  }
  expectClose(together.report.powerW, power, 1e-8 * power);
  expectClose(together.outlets[0]!.temperatureK, stream.temperatureK, 1e-6);
});

test('the three ways to set the discharge agree', () => {
  const power = run({ pressure: '200 bar' }).report.powerW;
  expectClose(run({ ratio: 8 }).report.powerW, power, 1e-9 * power);
  expectClose(run({ pressure_rise: '175 bar' }).report.powerW, power, 1e-9 * power);
});

test('cooling between stages saves work, the more the colder and the more stages', () => {
  const power = (stages: number, intercooling: string) =>
    run({ pressure: '200 bar', stages, intercooling, efficiency: '80 %' }).report.powerW;
  const uncooled = run({ pressure: '200 bar', stages: 3, efficiency: '80 %' }).report.powerW;
  expect(power(3, '40 degC')).toBeLessThan(uncooled);
  expect(power(3, '20 degC')).toBeLessThan(power(3, '40 degC'));
  expect(power(4, '40 degC')).toBeLessThan(power(3, '40 degC'));
});

test('coolers never heat: one set hotter than the discharge does nothing, and says so', () => {
  const { report } = run({ ratio: 1.02, stages: 2, intercooling: '80 degC' });
  expect(report.details['intercooling_duty_kW']).toBe(0);
  expect(report.warnings).toEqual([
    {
      code: 'idle-intercooling',
      message:
        'intercooling to 80 degC is hotter than the 36 degC at which stage 1 discharges, so the cooler behind it does nothing; set intercooling lower',
    },
  ]);
});

test('a drop in every cooler costs work', () => {
  const three = { pressure: '200 bar', stages: 3, intercooling: '40 degC' };
  const plain = run(three).report.powerW;
  const drop = (pressure_drop_per_cooler: string) =>
    run({ ...three, pressure_drop_per_cooler }).report.powerW;
  expect(drop('0.5 bar')).toBeGreaterThan(plain);
  expect(drop('2 bar')).toBeGreaterThan(drop('0.5 bar'));
  expectClose(drop('0 bar'), plain, 1e-9 * plain);
});

test('the limit of the discharge can be set', () => {
  const at = (discharge_limit: string) => run({ ratio: 2, discharge_limit }).report.warnings;
  expect(at('150 degC')).toEqual([]);
  expect(at('100 degC')).toEqual([
    {
      code: 'hot-discharge',
      message:
        'the discharge reaches 125 degC, above its discharge_limit of 100 degC; use more stages with intercooling',
    },
  ]);
});

test('a polytropic efficiency takes more work than the same as isentropic, and stages of it add up', () => {
  const isentropic = run({ ratio: 8, efficiency: '80 %' }).report.powerW;
  const whole = run({ ratio: 8, polytropic_efficiency: '80 %' });
  expect(whole.report.powerW).toBeGreaterThan(isentropic);
  const cut = run({ ratio: 8, stages: 4, polytropic_efficiency: '80 %' });
  // Of an ideal gas to rounding; in a real one the formula's mean temperature is 0.13 % off at this ratio of 8.
  expectClose(cut.report.powerW, whole.report.powerW, 2e-3 * whole.report.powerW);
  expect(whole.report.assumptions).toEqual(['Power is that of the shaft: no drive efficiency is given.']);
  expect(
    faultsOf('compressor', { ratio: 2, efficiency: '80 %', polytropic_efficiency: '80 %' })[0]?.code,
  ).toBe('too-many-settings');
});

test('drive losses are drawn but do not reach the gas', () => {
  const plain = run({ ratio: 2 });
  const driven = run({ ratio: 2, drive_efficiency: '95 %' });
  expectClose(driven.report.powerW, plain.report.powerW / 0.95, 1e-9 * plain.report.powerW);
  expectClose(driven.report.driveLossW, driven.report.powerW - plain.report.powerW, 1e-6);
  expect(driven.outlets[0]!.temperatureK).toBe(plain.outlets[0]!.temperatureK);
});

test('a hot discharge and liquid at a suction are worth a word', () => {
  expect(run({ pressure: '200 bar' }).report.warnings.map((w) => w.code)).toEqual(['hot-discharge']);
  const wet = streamOf(mixture, { celsius: -5, bar: 100, flows: { H2: 3, N2: 1, NH3: 1 } });
  const { report } = trial('compressor', { ratio: 1.1 }, mixture, [wet]);
  expect(report.warnings).toEqual([
    { code: 'liquid-at-suction', message: 'liquid enters a stage; take it out before it with a condenser' },
  ]);
});

test('efficiencies not given are filled in, and the report says so', () => {
  expect(run({ ratio: 2 }).report.assumptions).toEqual([
    'Isentropic efficiency 75 % (common practice; none given).',
    'Power is that of the shaft: no drive efficiency is given.',
  ]);
  const given = run({ ratio: 2, efficiency: '75 %', drive_efficiency: '97 %' });
  expect(given.report.assumptions).toEqual([]);
});

test('it cannot lower the pressure: a fault, not a trouble on the way; a ratio below 1 is turned down', () => {
  const { report } = run({ pressure: '20 bar' });
  expect(report.faults).toMatchObject([{ code: 'pressure-fall', path: ['pressure'] }]);
  expect(report.powerW).toBe(0);
  expect(run({ pressure: '200 bar' }).report.faults).toEqual([]);
  expect(refusedBySchema('compressor', { ratio: 0.9 })).toBe(true);
});

test('faults: no discharge, two of them, coolers without stages', () => {
  const codes = (raw: unknown) => faultsOf('compressor', raw).map((fault) => fault.code);
  expect(codes({})).toEqual(['missing-setting']);
  expect(codes({ pressure: '200 bar', ratio: 2 })).toEqual(['too-many-settings']);
  expect(codes({ ratio: 2, intercooling: '40 degC' })).toEqual(['idle-setting']);
  expect(codes({ ratio: 2, stages: 2, intercooling: '40 degC' })).toEqual([]);
});
