import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { GasModelName } from '../../src/model/flowsheet.ts';
import type { Reaction } from '../../src/model/reaction.ts';
import type { StreamState } from '../../src/model/stream.ts';
import { createMixture } from '../../src/properties/mixture.ts';
import { benchReactor, dysonSimonRates } from '../published/kinetics.ts';
import {
  components,
  expectBalances,
  expectClose,
  faultsOf,
  flowOf,
  fractionOf,
  KELVIN,
  mixtureOf,
  reaction,
  streamOf,
  type Trial,
  trial,
  troubleOf,
} from './helpers.ts';

interface Columns {
  readonly position: readonly number[];
  readonly temperature_K: readonly number[];
  readonly pressure_bar: readonly number[];
  readonly mole_fraction: Readonly<Record<string, readonly number[]>>;
  readonly rate_mol_m3_s: Readonly<Record<string, readonly number[]>>;
  readonly equilibrium_K: Readonly<Record<string, readonly (number | null)[]>>;
}
interface Details {
  readonly profile: Columns;
  readonly hottest_K: number;
  readonly hottest_position: number;
  readonly approach_K: Readonly<Record<string, number>>;
  readonly fraction_of_equilibrium: Readonly<Record<string, number>>;
  readonly conversion: Readonly<Record<string, number>>;
  readonly extent_kmol_h: Readonly<Record<string, number>>;
  readonly equilibrium_outlet_K: number;
  readonly effectiveness_inlet: number;
  readonly volume_m3: number;
  readonly space_velocity_per_h: number;
}
const detailsOf = (t: Trial) => t.report.details as unknown as Details;

const loop = ['H2', 'N2', 'NH3', 'Ar', 'CH4'];
const synthesis = reaction('synthesis', 'N2 + 3 H2 <=> 2 NH3', components(...loop));
const ammonia = mixtureOf(loop, { reactions: [synthesis] });
const loopGas = (flows: Readonly<Record<string, number>> = {}, celsius = 380): StreamState =>
  streamOf(ammonia, {
    celsius,
    bar: 200,
    flows: { H2: 64, N2: 21.5, NH3: 3, Ar: 3.5, CH4: 8, ...flows },
  });
const bed = (more: Readonly<Record<string, unknown>> = {}, inlet = loopGas()): Trial =>
  trial(
    'kinetic_bed',
    {
      rate_law: 'dyson-simon-1968',
      reactions: ['synthesis'],
      volume: '0.15 m3',
      ...(more['temperature'] || more['cooling'] ? {} : { adiabatic: true }),
      ...more,
    },
    ammonia,
    [inlet],
    [synthesis],
  );

describe('the adiabatic bench reactor of Vanden Bussche and Froment', () => {
  const ids = ['H2', 'CO', 'CO2', 'N2', 'CH3OH', 'H2O'];
  const list = components(...ids);
  const graaf = { kind: 'published', name: 'graaf-1986' } as const;
  const reactions = [
    reaction('methanol', 'CO2 + 3 H2 <=> CH3OH + H2O', list, graaf),
    reaction('reverse_shift', 'CO2 + H2 <=> CO + H2O', list, graaf),
  ];
  // The published inlet; heats of the NASA tables, as the profile was derived with.
  const mixture = createMixture({ components: list, gas: 'ideal', dissolvedGases: true, basis: 'nasa' });
  const molarMass = list.reduce((sum, c) => sum + c.molarMassKgPerMol * share(c.id), 0);
  const total = benchReactor.feedKgPerS / molarMass;
  const inlet = streamOf(mixture, {
    kelvin: benchReactor.kelvin,
    bar: benchReactor.bar,
    flows: Object.fromEntries(ids.map((id) => [id, total * share(id)])),
  });
  const run = (rate_law: string) =>
    trial(
      'kinetic_bed',
      {
        rate_law,
        reactions: ['methanol', 'reverse_shift'],
        catalyst_mass: `${benchReactor.catalystKg} kg`,
        adiabatic: true,
      },
      mixture,
      [inlet],
      reactions,
    );
  const { profile } = detailsOf(run('vanden-bussche-froment-1996'));

  function share(id: string): number {
    return (benchReactor.feed as Readonly<Record<string, number>>)[id] ?? 0;
  }

  // Printed to 0.1 K and five decimals: the tolerances are half a digit and a little rounding.
  test.each(benchReactor.profile)(
    'after %d of the catalyst it is at %d K',
    (position, kelvin, ...fractions) => {
      const at = profile.position.findIndex((z) => Math.abs(z - position) < 1e-9);
      expectClose(profile.temperature_K[at]!, kelvin, 0.06, 'temperature');
      benchReactor.columns.forEach((id, i) => {
        expectClose(profile.mole_fraction[id]![at]!, fractions[i]!, 1.1e-5, id);
      });
    },
  );

  test('carbon monoxide rises first, by the reverse shift, and falls then', () => {
    const [first, ...later] = profile.mole_fraction['CO']!;
    const fine = detailsOf(
      trial(
        'kinetic_bed',
        {
          rate_law: 'vanden-bussche-froment-1996',
          reactions: ['methanol', 'reverse_shift'],
          catalyst_mass: '0.2 g',
          adiabatic: true,
        },
        mixture,
        [inlet],
        reactions,
      ),
    );
    expect(flowOf(inlet, mixture, 'CO')).toBeGreaterThan(0);
    expect(fine.extent_kmol_h['reverse_shift']).toBeGreaterThan(0);
    expect(later.at(-1)).toBeLessThan(first!);
  });

  test('Graaf starts slower and ends at the same 552.4 K and 2.28 % of methanol', () => {
    const slow = detailsOf(run('graaf-1988')).profile;
    expect(slow.temperature_K[4]).toBeLessThan(profile.temperature_K[4]!);
    expectClose(slow.temperature_K.at(-1)!, 552.4, 0.06);
    expectClose(slow.mole_fraction['CH3OH']!.at(-1)!, 0.02284, 2e-5);
  });
});

describe('with ten times the catalyst the outlet is that of a reactor at equilibrium to 0.1 %', () => {
  const carbon = ['CH4', 'H2O', 'CO', 'CO2', 'H2', 'N2', 'CH3OH'];
  const sulphur = ['SO2', 'O2', 'SO3', 'N2'];
  const gas = {
    ammonia: {
      ids: loop,
      celsius: 380,
      hot: 500,
      bar: 220,
      flows: { H2: 64, N2: 21.5, NH3: 3, Ar: 3.5, CH4: 8 },
    },
    methanol: {
      ids: carbon,
      celsius: 225,
      hot: 270,
      bar: 50,
      flows: { H2: 75, CO: 8, CO2: 5, CH4: 8, N2: 4 },
    },
    methanation: {
      ids: carbon,
      celsius: 300,
      hot: 380,
      bar: 25,
      flows: { H2: 75, CO: 1, CO2: 0.5, N2: 23, H2O: 0.5 },
    },
    reforming: { ids: carbon, celsius: 520, hot: 520, bar: 10, flows: { CH4: 25, H2O: 74, H2: 1 } },
    sulphur: { ids: sulphur, celsius: 420, hot: 560, bar: 1.4, flows: { SO2: 10, O2: 11, N2: 79 } },
  };
  const equations: Readonly<Record<string, string>> = {
    synthesis: 'N2 + 3 H2 <=> 2 NH3',
    methanol: 'CO + 2 H2 <=> CH3OH',
    reverse_shift: 'CO2 + H2 <=> CO + H2O',
    methanation: 'CO + 3 H2 <=> CH4 + H2O',
    shift: 'CO + H2O <=> CO2 + H2',
    oxidation: 'SO2 + 1/2 O2 <=> SO3',
  };
  // The amounts are those with which a bed comes near to equilibrium, of 100 mol/s; reactions are written otherwise
  // than the law writes them.
  const cases: readonly [
    law: string,
    gas: keyof typeof gas,
    reactions: readonly string[],
    amount: { volume?: number; catalyst_mass?: number },
  ][] = [
    ['dyson-simon-1968', 'ammonia', ['synthesis'], { volume: 0.2 }],
    ['murase-1970', 'ammonia', ['synthesis'], { volume: 0.4 }],
    ['vanden-bussche-froment-1996', 'methanol', ['methanol', 'reverse_shift'], { catalyst_mass: 120 }],
    ['graaf-1988', 'methanol', ['methanol', 'reverse_shift'], { catalyst_mass: 300 }],
    ['xu-froment-1989', 'methanation', ['methanation', 'shift'], { catalyst_mass: 500 }],
    ['xu-froment-1989', 'reforming', ['methanation', 'shift'], { catalyst_mass: 60 }],
    ['eklund-1956', 'sulphur', ['oxidation'], { catalyst_mass: 1000 }],
  ];

  describe.each(cases)('%s, %s', (rate_law, of, names, amount) => {
    const { ids, celsius, hot, bar, flows } = gas[of];
    const list = components(...ids);
    const reactions = names.map((name) => reaction(name, equations[name]!, list));
    const [key, one] = Object.entries(amount)[0]!;
    const unit = key === 'volume' ? 'm3' : 'kg';

    test.each<[GasModelName, string, object]>([
      ['srk', 'adiabatic', { adiabatic: true }],
      ['srk', 'with a pressure drop', { adiabatic: true, pressure_drop: '0.3 bar' }],
      ['ideal', 'at one temperature', { temperature: `${hot} degC` }],
    ])('%s gas, %s', (model, _how, heat) => {
      const mixture = mixtureOf(ids, { gas: model, reactions });
      const inlet = streamOf(mixture, { celsius, bar, flows });
      const ended = trial(
        'kinetic_bed',
        { rate_law, reactions: names, [key]: `${10 * one} ${unit}`, ...heat },
        mixture,
        [inlet],
        reactions,
      );
      const reactor = trial(
        'reactor',
        { reactions: Object.fromEntries(names.map((name) => [name, {}])), ...heat },
        mixture,
        [inlet],
        reactions,
      );
      const out = ended.outlets[0]!;
      const wanted = reactor.outlets[0]!;
      wanted.flowsMolPerS.forEach((flow, i) => {
        // 0.1 % of each flow; what is left of a reactant in traces counts against the feed (1 ppm)
        expectClose(out.flowsMolPerS[i]!, flow, 1e-3 * flow + 1e-6 * 100, ids[i]);
      });
      expectClose(out.temperatureK, wanted.temperatureK, 0.1, 'temperature');
      expectBalances(ended, mixture);
    });
  });
});

test("with the authors' constants the law stops where it was printed to stop, whatever the gas model", () => {
  for (const gas of ['ideal', 'srk'] as const) {
    const mixture = mixtureOf(loop, { gas, reactions: [synthesis] });
    const inlet = streamOf(mixture, {
      celsius: dysonSimonRates.celsius,
      bar: dysonSimonRates.atm * 1.01325,
      flows: { H2: 75, N2: 25 },
    });
    const { outlets } = trial(
      'kinetic_bed',
      {
        rate_law: 'dyson-simon-1968',
        reactions: ['synthesis'],
        volume: '20 m3',
        temperature: `${dysonSimonRates.celsius} degC`,
        equilibrium: 'authors',
      },
      mixture,
      [inlet],
      [synthesis],
    );
    // printed to four decimals
    expectClose(fractionOf(outlets[0]!, mixture, 'NH3'), dysonSimonRates.zeroAt, 1e-4);
  }
});

describe('what the bed finds can be carried into a reactor', () => {
  const found = bed();

  test.each(['approach', 'fraction_of_equilibrium'])('by its %s', (how) => {
    const { approach_K, fraction_of_equilibrium } = detailsOf(found);
    const setting =
      how === 'approach'
        ? { approach: `${approach_K['synthesis']} K` }
        : { fraction_of_equilibrium: fraction_of_equilibrium['synthesis'] };
    const quick = trial(
      'reactor',
      { reactions: { synthesis: setting }, adiabatic: true },
      ammonia,
      [loopGas()],
      [synthesis],
    );
    // the error of the integration, on a temperature rise of 150 K
    expectClose(quick.outlets[0]!.temperatureK, found.outlets[0]!.temperatureK, 1e-5, 'temperature');
    quick.outlets[0]!.flowsMolPerS.forEach((flow, i) => {
      expectClose(found.outlets[0]!.flowsMolPerS[i]!, flow, 1e-6, loop[i]);
    });
  });

  test('and the approach falls to nothing as catalyst is added', () => {
    const approaches = [0.05, 0.1, 0.2, 0.4, 2].map(
      (volume) => detailsOf(bed({ volume: `${volume} m3` })).approach_K['synthesis']!,
    );
    approaches.slice(1).forEach((approach, k) => {
      expect(approach).toBeLessThan(approaches[k]!);
    });
    expectClose(approaches.at(-1)!, 0, 1e-3);
    const ended = bed({ volume: '2 m3' });
    expectClose(detailsOf(ended).equilibrium_outlet_K, ended.outlets[0]!.temperatureK, 1e-4);
    expectClose(detailsOf(ended).fraction_of_equilibrium['synthesis']!, 1, 1e-6);
  });
});

describe('along the bed', () => {
  const t = bed({ pressure_drop: '4 bar' });
  const { profile, hottest_K, hottest_position } = detailsOf(t);

  test('the columns are of one length and run from inlet to outlet', () => {
    expect(profile.position).toEqual(Array.from({ length: 21 }, (_, k) => k / 20));
    for (const column of [
      profile.temperature_K,
      profile.pressure_bar,
      ...Object.values(profile.mole_fraction),
      ...Object.values(profile.rate_mol_m3_s),
      ...Object.values(profile.equilibrium_K),
    ]) {
      expect(column).toHaveLength(21);
    }
    expectClose(profile.temperature_K[0]!, t.inlets[0]!.temperatureK, 1e-9);
    expectClose(profile.pressure_bar[10]!, 198, 1e-9);
    expectClose(profile.pressure_bar.at(-1)!, 196, 1e-9);
  });

  test('explicit and implicit steps end at the same outlet', () => {
    // The outlet of the pass is that of odex, the profile is followed implicitly; each errs by 1e-10 a step.
    expectClose(profile.temperature_K.at(-1)!, t.outlets[0]!.temperatureK, 1e-5, 'temperature');
    loop.forEach((id) => {
      expectClose(profile.mole_fraction[id]!.at(-1)!, fractionOf(t.outlets[0]!, ammonia, id), 1e-8, id);
    });
  });

  test('fractions add up to 1 and the gas is warmer the further it is', () => {
    profile.position.forEach((_, k) => {
      const sum = loop.reduce((all, id) => all + profile.mole_fraction[id]![k]!, 0);
      expectClose(sum, 1, 1e-12);
      if (k > 0) expect(profile.temperature_K[k]).toBeGreaterThan(profile.temperature_K[k - 1]!);
    });
    expect(hottest_position).toBe(1);
    expectClose(hottest_K, t.outlets[0]!.temperatureK, 1e-5);
  });

  test('the rate is that of the equation at the gas of each point', () => {
    // Slope of the ammonia made, over 1 % of the bed around the middle
    const made = (volume: number) => flowOf(bed({ volume: `${volume} m3` }).outlets[0]!, ammonia, 'NH3');
    const at = detailsOf(bed()).profile.rate_mol_m3_s['synthesis']![10]!;
    const slope = (made(0.0755) - made(0.0745)) / 0.001 / 2;
    expectClose(slope, at, 1e-3 * at);
  });
});

describe('heat', () => {
  const cooled = (kW: number, more: object = {}) =>
    bed({ cooling: { temperature: '370 degC', heat_transfer: `${kW} kW/(m3 K)` }, ...more });

  test('without heat transfer a cooled bed is adiabatic', () => {
    const alone = bed();
    const t = cooled(0);
    expectClose(t.outlets[0]!.temperatureK, alone.outlets[0]!.temperatureK, 1e-6);
    expectClose(t.report.dutyW, 0, 1e-6);
  });

  test('the more of it, the colder the hottest place and the nearer the outlet to the coolant', () => {
    const beds = [2, 20, 2000].map((kW) => cooled(kW));
    const hottest = beds.map((t) => detailsOf(t).hottest_K);
    expect(hottest[1]).toBeLessThan(hottest[0]!);
    expect(hottest[2]).toBeLessThan(hottest[1]!);
    expectClose(beds[2]!.outlets[0]!.temperatureK, 370 + KELVIN, 1);
    for (const t of beds) {
      expect(t.report.dutyW).toBeLessThan(0);
      expectBalances(t, ammonia);
    }
  });

  test('the heat is what the coolant takes along the bed', () => {
    const t = cooled(20);
    const { temperature_K } = detailsOf(t).profile;
    // Simpson's rule over 20 sections of 0.15 m3 in all
    const weight = (k: number) => (k === 0 || k === 20 ? 1 : k % 2 === 1 ? 4 : 2);
    const mean = temperature_K.reduce((sum, T, k) => sum + weight(k) * (370 + KELVIN - T), 0) / 60;
    expectClose(t.report.dutyW, 20e3 * 0.15 * mean, 2e-4 * Math.abs(t.report.dutyW));
  });

  test('the hot spot of a cooled bed lies inside it', () => {
    const { hottest_position, hottest_K, profile } = detailsOf(cooled(40, { volume: '0.6 m3' }));
    expect(hottest_position).toBeGreaterThan(0);
    expect(hottest_position).toBeLessThan(1);
    for (const T of profile.temperature_K) expect(T).toBeLessThanOrEqual(hottest_K + 1e-9);
  });

  test('a bed at one temperature has it everywhere, and its duty closes the balance', () => {
    const t = bed({ temperature: '440 degC' });
    for (const T of detailsOf(t).profile.temperature_K) expect(T).toBe(440 + KELVIN);
    expect(t.outlets[0]!.temperatureK).toBe(440 + KELVIN);
    expectBalances(t, ammonia);
  });
});

describe('the amount of catalyst', () => {
  const same = (a: Trial, b: Trial, allowed = 1e-7) => {
    expectClose(a.outlets[0]!.temperatureK, b.outlets[0]!.temperatureK, 1e3 * allowed, 'temperature');
    a.outlets[0]!.flowsMolPerS.forEach((flow, i) => {
      expectClose(flow, b.outlets[0]!.flowsMolPerS[i]!, allowed * 100);
    });
  };

  test('twice the volume at half the activity or effectiveness is the same bed', () => {
    same(bed({ volume: '0.3 m3', activity: '50 %' }), bed());
    same(bed({ volume: '0.3 m3', effectiveness: '50 %' }), bed());
  });

  test('a mass with its bulk density is a volume', () => {
    const t = bed({ volume: undefined, catalyst_mass: '420 kg', bulk_density: '2800 kg/m3' });
    same(t, bed());
    expectClose(detailsOf(t).volume_m3, 0.15, 1e-12);
  });

  test('two beds in series are one bed', () => {
    const first = bed({ volume: '0.06 m3' });
    const second = bed({ volume: '0.09 m3' }, first.outlets[0]!);
    same(second, bed());
  });

  test('none of it changes nothing', () => {
    const [out] = bed({ activity: 0 }).outlets;
    expectClose(out!.temperatureK, loopGas().temperatureK, 1e-9);
    expect([...out!.flowsMolPerS]).toEqual([...loopGas().flowsMolPerS]);
  });

  test('whole pellets are slower, and a second bed has to be told what was converted before', () => {
    const whole = bed({ effectiveness: 'published' });
    expect(fractionOf(whole.outlets[0]!, ammonia, 'NH3')).toBeLessThan(
      fractionOf(bed().outlets[0]!, ammonia, 'NH3'),
    );
    expect(detailsOf(whole).effectiveness_inlet).toBeLessThan(1);
    const first = bed({ volume: '0.06 m3', effectiveness: 'published' });
    const before = detailsOf(first).conversion['N2'];
    const second = bed(
      { volume: '0.09 m3', effectiveness: 'published', conversion_before: before },
      first.outlets[0]!,
    );
    same(second, whole, 1e-7);
  });

  test('the space velocity is the normal volume flow per volume of bed and hour', () => {
    // 100 mol/s are 2.2414 Nm3/s
    expectClose(detailsOf(bed()).space_velocity_per_h, (2.2413969545 * 3600) / 0.15, 1e-3);
  });
});

describe('inlets at the edge', () => {
  test('a feed without ammonia gets under way, and its first traces take no room', () => {
    const none = bed({}, loopGas({ NH3: 0 }));
    const trace = bed({}, loopGas({ NH3: 1e-4 }));
    expect(fractionOf(none.outlets[0]!, ammonia, 'NH3')).toBeGreaterThan(0.05);
    expectClose(none.outlets[0]!.temperatureK, trace.outlets[0]!.temperatureK, 2e-3);
  });

  test('a gas beyond equilibrium runs back', () => {
    const [out] = bed({}, loopGas({ NH3: 60 }, 500)).outlets;
    expect(flowOf(out!, ammonia, 'NH3')).toBeLessThan(60);
    expect(out!.temperatureK).toBeLessThan(500 + KELVIN);
  });

  test('what lacks everything a reaction takes leaves as it came', () => {
    const inlet = streamOf(ammonia, { celsius: 400, bar: 100, flows: { H2: 50, Ar: 10 } });
    const [out] = bed({}, inlet).outlets;
    expect([...out!.flowsMolPerS]).toEqual([...inlet.flowsMolPerS]);
  });

  test('it moves smoothly with its inlet, so that a loop around it can be closed to 1e-9', () => {
    const made = (kelvin: number) => {
      const inlet = streamOf(ammonia, {
        kelvin,
        bar: 200,
        flows: { H2: 64, N2: 21.5, NH3: 3, Ar: 3.5, CH4: 8 },
      });
      return flowOf(bed({ pressure_drop: '3 bar' }, inlet).outlets[0]!, ammonia, 'NH3');
    };
    fc.assert(
      fc.property(fc.double({ min: 640, max: 690, noNaN: true }), (kelvin) => {
        const bend = made(kelvin - 1e-3) - 2 * made(kelvin) + made(kelvin + 1e-3);
        expect(Math.abs(bend)).toBeLessThan(1e-6);
      }),
      { numRuns: 20 },
    );
  });

  test('it can end in no temperature only by a fault that says so', () => {
    expect(troubleOf(() => bed({ pressure_drop: '300 bar' }))).toBe('pressure-drop');
  });
});

test('a law used outside its range is worth a word', () => {
  expect(bed({ temperature: '450 degC' }).report.warnings).toEqual([]);
  expect(bed({}, loopGas({}, 480)).report.warnings.map((one) => one.code)).toEqual(['rate-law-out-of-range']);
});

describe('faults of its settings', () => {
  const list = components(...loop, 'CO', 'CO2', 'H2O', 'CH3OH');
  const known = (equations: Readonly<Record<string, string>>): { reactions: readonly Reaction[] } => ({
    reactions: Object.entries(equations).map(([name, equation]) => reaction(name, equation, list)),
  });
  const both = {
    methanol: 'CO + 2 H2 <=> CH3OH',
    reverse_shift: 'CO2 + H2 <=> CO + H2O',
    direct: 'CO2 + 3 H2 <=> CH3OH + H2O',
    synthesis: 'N2 + 3 H2 <=> 2 NH3',
  };
  const faults = (raw: object, equations: Readonly<Record<string, string>> = both, of = list) =>
    faultsOf(
      'kinetic_bed',
      { rate_law: 'vanden-bussche-froment-1996', catalyst_mass: '10 t', adiabatic: true, ...raw },
      { components: of, ...known(equations) },
    );

  test('the reactions of the law are found by their sums', () => {
    expect(faults({ reactions: ['direct', 'reverse_shift'] })).toEqual([]);
    expect(faults({ reactions: ['methanol', 'reverse_shift'] })).toEqual([]);
    expect(faults({ reactions: ['methanol', 'direct'], rate_law: 'graaf-1988' })).toEqual([]);
  });

  test('a reaction of the law that is left out', () => {
    expect(faults({ reactions: ['direct'] })).toEqual([
      {
        path: ['reactions'],
        code: 'missing-setting',
        what: 'The reactions named leave out CO2 + H2 <=> CO + H2O.',
        why: 'vanden-bussche-froment-1996 runs CO2 + 3 H2 <=> CH3OH + H2O and CO2 + H2 <=> CO + H2O',
        mend: 'add reverse_shift to the list',
      },
    ]);
    const [fault] = faults({ reactions: ['direct'] }, { direct: both.direct });
    expect(fault!.mend).toBe(
      'add it to the reactions of the flowsheet, e.g. side: CO2 + H2 <=> CO + H2O, and name it here',
    );
  });

  test.each([
    ['unknown', { reactions: ['direct', 'reverse_shft'] }, 'unknown-reaction', 'write reverse_shift'],
    [
      'named twice',
      { reactions: ['direct', 'reverse_shift', 'direct'] },
      'duplicate-name',
      'take one of them out',
    ],
    [
      'a sum of the others',
      { reactions: ['direct', 'reverse_shift', 'methanol'] },
      'dependent-reaction',
      'take it out here',
    ],
    [
      'not of this law',
      { reactions: ['direct', 'reverse_shift', 'synthesis'] },
      'idle-setting',
      'take it out here',
    ],
  ])('a reaction %s', (_how, raw, code, mend) => {
    expect(faults(raw).map((one) => [one.code, one.mend])).toEqual([[code, mend]]);
  });

  test('a species of the law that is no component', () => {
    const few = components('H2', 'N2', 'NH3');
    const found = faultsOf(
      'kinetic_bed',
      { rate_law: 'graaf-1988', reactions: ['synthesis'], catalyst_mass: '1 t', adiabatic: true },
      { components: few, reactions: [reaction('synthesis', both.synthesis, few)] },
    );
    expect(found.map((one) => [one.code, one.mend])).toEqual([
      ['unknown-component', 'add CO, CO2, H2O, CH3OH to components'],
    ]);
  });

  const direct = { reactions: ['direct', 'reverse_shift'] };
  test.each<[string, object, string, string | number | undefined]>([
    ['no way of heat', { adiabatic: undefined }, 'missing-setting', undefined],
    ['two ways of heat', { temperature: '250 degC' }, 'too-many-settings', 'temperature'],
    ['no catalyst', { catalyst_mass: undefined }, 'missing-setting', undefined],
    ['volume and mass', { volume: '1 m3' }, 'too-many-settings', 'catalyst_mass'],
    [
      'a volume for a law by mass',
      { catalyst_mass: undefined, volume: '1 m3' },
      'missing-setting',
      undefined,
    ],
    [
      'a coolant without volume',
      { adiabatic: undefined, cooling: { temperature: '240 degC', heat_transfer: '20 kW/(m3 K)' } },
      'missing-setting',
      undefined,
    ],
    ['a density nobody asks for', { bulk_density: '1100 kg/m3' }, 'idle-setting', 'bulk_density'],
    ['an effectiveness nobody published', { effectiveness: 'published' }, 'wrong-value', 'effectiveness'],
    ['a conversion without effect', { conversion_before: '5 %' }, 'idle-setting', 'conversion_before'],
  ])('%s', (_how, raw, code, at) => {
    const found = faults({ ...direct, ...raw });
    expect(found.map((one) => [one.code, one.path[0]])).toEqual([[code, at]]);
  });
});

test('a mixture of any gases comes through with its balances', () => {
  fc.assert(
    fc.property(
      fc.array(fc.oneof(fc.constant(0), fc.double({ min: 0.01, max: 50, noNaN: true })), {
        minLength: 5,
        maxLength: 5,
      }),
      fc.double({ min: 300, max: 600, noNaN: true }),
      fc.double({ min: 20, max: 300, noNaN: true }),
      fc.double({ min: -4, max: 2, noNaN: true }),
      (flows, celsius, bar, exponent) => {
        fc.pre(flows.some((flow) => flow > 0));
        const inlet = streamOf(ammonia, {
          celsius,
          bar,
          flows: Object.fromEntries(loop.map((id, i) => [id, flows[i]!])),
        });
        const t = bed({ volume: `${10 ** exponent} m3` }, inlet);
        expectBalances(t, ammonia);
        for (const flow of t.outlets[0]!.flowsMolPerS) expect(flow).toBeGreaterThanOrEqual(0);
        expect(JSON.stringify(t.report)).not.toMatch(/NaN|Infinity/);
      },
    ),
    { numRuns: 60 },
  );
});
