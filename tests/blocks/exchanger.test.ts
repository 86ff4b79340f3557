import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { StreamState } from '../../src/model/stream.ts';
import type { Mixture } from '../../src/properties/mixture.ts';
import {
  copyOf,
  enthalpySize,
  expectBalances,
  expectClose,
  faultsOf,
  mixtureOf,
  refusedBySchema,
  streamOf,
  type Trial,
  trial,
  troubleOf,
} from './helpers.ts';

const mixture = mixtureOf(['H2', 'N2', 'NH3', 'Ar', 'CH4']);
const loopGas = { H2: 60, N2: 20, NH3: 3, Ar: 5, CH4: 10 };
const effluentGas = { H2: 48, N2: 16, NH3: 11, Ar: 5, CH4: 10 };
const feed = streamOf(mixture, { celsius: 35, bar: 200, flows: loopGas });
const effluent = streamOf(mixture, { celsius: 450, bar: 195, flows: effluentGas });

interface Details {
  readonly exchanged_kW: number;
  readonly closest_approach_K: number;
  readonly closest_at: {
    readonly share_of_heat_from_cold_end: number;
    readonly hot_K: number;
    readonly cold_K: number;
  };
  readonly log_mean_difference_K: number | null;
  readonly conductance_kW_K: number | null;
  readonly heat_curve: {
    readonly heat_kW: number[];
    readonly hot_K: number[];
    readonly cold_K: number[];
  } | null;
}
const detailsOf = (t: Trial) => ({ ...t.report.details, ...t.report.curves() }) as unknown as Details;

/**
 * The closest approach by brute force: both streams settled at each of many shares of the heat, straight from
 * the mixture, pressures in proportion.
 */
function scanned(t: Trial, mix: Mixture, points: number): { difference: number; share: number } {
  const [hotIn, coldIn] = t.inlets;
  const [hotOut, coldOut] = t.outlets;
  const at = (x: number, coldEnd: StreamState, hotEnd: StreamState) => {
    const state = copyOf(coldEnd);
    state.pressurePa = coldEnd.pressurePa + x * (hotEnd.pressurePa - coldEnd.pressurePa);
    mix.settleAtEnthalpy(state, coldEnd.enthalpyW + x * (hotEnd.enthalpyW - coldEnd.enthalpyW));
    return state.temperatureK;
  };
  let best = { difference: Infinity, share: 0 };
  for (let k = 0; k <= points; k++) {
    const share = k / points;
    const difference = at(share, hotOut, hotIn) - at(share, coldIn, coldOut);
    if (difference < best.difference) best = { difference, share };
  }
  return best;
}

describe('one setting of four', () => {
  const byCold = trial('exchanger', { cold_temperature: '290 degC' }, mixture, [effluent, feed]);
  const { exchanged_kW, closest_approach_K } = detailsOf(byCold);

  test('any of them leads to the same outlets', () => {
    const hotOut = byCold.outlets[0].temperatureK;
    for (const raw of [
      { hot_temperature: `${hotOut} K` },
      { duty: `${exchanged_kW} kW` },
      { approach: `${closest_approach_K} K` },
    ]) {
      const other = trial('exchanger', raw, mixture, [effluent, feed]);
      expectClose(other.outlets[0].temperatureK, hotOut, 1e-7, JSON.stringify(raw));
      expectClose(other.outlets[1].temperatureK, 290 + 273.15, 1e-7, JSON.stringify(raw));
      expect(other.report.faults).toEqual([]);
    }
  });

  test('the heat stays inside: the duty of the block is 0 and the balances close', () => {
    expect(byCold.report.dutyW).toBe(0);
    expect(exchanged_kW).toBeGreaterThan(500);
    expectBalances(byCold, mixture);
  });

  test('none or two of them are refused', () => {
    expect(faultsOf('exchanger', { hot_pressure_drop: '1 bar' }).map((f) => f.code)).toEqual([
      'missing-setting',
    ]);
    expect(faultsOf('exchanger', { duty: '1 MW', approach: '10 K' }).map((f) => f.code)).toEqual([
      'too-many-settings',
    ]);
    expect(refusedBySchema('exchanger', { duty: '-1 MW' })).toBe(true);
    expect(refusedBySchema('exchanger', { approach: '-1 K' })).toBe(true);
  });

  test('a pressure drop larger than the pressure is refused', () => {
    const raw = { approach: '10 K', hot_pressure_drop: '200 bar' };
    expect(troubleOf(() => trial('exchanger', raw, mixture, [effluent, feed]))).toBe('pressure-drop');
  });
});

describe('the closest approach', () => {
  test('of two ideal gases of constant heat capacity lies at an end, and UA is Q over the log mean', () => {
    // Argon has the heat capacity 5/2 R at any temperature.
    const argon = mixtureOf(['Ar'], { gas: 'ideal' });
    const hot = streamOf(argon, { kelvin: 500, bar: 10, flows: { Ar: 10 } });
    const cold = streamOf(argon, { kelvin: 300, bar: 10, flows: { Ar: 20 } });
    const t = trial('exchanger', { duty: '20 kW' }, argon, [hot, cold]);
    const details = detailsOf(t);
    const hotOut = 500 - 20e3 / (10 * 2.5 * 8.314462618);
    const coldOut = 300 + 20e3 / (20 * 2.5 * 8.314462618);
    // The NASA polynomials were made with an older R, 6e-6 larger.
    expectClose(t.outlets[0].temperatureK, hotOut, 1e-3);
    expectClose(t.outlets[1].temperatureK, coldOut, 1e-3);
    const ends = [hotOut - 300, 500 - coldOut];
    expectClose(details.closest_approach_K, Math.min(...ends), 1e-3);
    expect(details.closest_at.share_of_heat_from_cold_end).toBe(0);
    const logMean = (ends[1] - ends[0]) / Math.log(ends[1] / ends[0]);
    expectClose(details.log_mean_difference_K!, logMean, 1e-3);
    expectClose(details.conductance_kW_K!, 20 / logMean, 1e-6);
  });

  // Ammonia condensing out of loop gas against cold loop gas: the dew point is the pinch.
  const condensing = () => {
    const hot = streamOf(mixture, { celsius: 120, bar: 150, flows: { H2: 30, N2: 10, NH3: 40 } });
    const cold = streamOf(mixture, { celsius: -20, bar: 150, flows: { H2: 120, N2: 42, NH3: 2 } });
    return [hot, cold] as const;
  };
  // Boiling water below a gas that cools: the pinch is where boiling starts.
  const boiling = () => {
    const both = mixtureOf(['N2', 'H2O']);
    const hot = streamOf(both, { celsius: 400, bar: 20, flows: { N2: 60 } });
    const cold = streamOf(both, { celsius: 105, bar: 40, flows: { H2O: 8 } });
    return [both, hot, cold] as const;
  };

  test('inside the curve, at the dew point of a condensing stream, agrees with a brute-force scan', () => {
    const t = trial('exchanger', { approach: '6 K', hot_pressure_drop: '1 bar' }, mixture, condensing());
    const { closest_approach_K, closest_at } = detailsOf(t);
    const share = closest_at.share_of_heat_from_cold_end;
    expect(share).toBeGreaterThan(0.05);
    expect(share).toBeLessThan(0.95);
    expectClose(closest_approach_K, 6, 1e-8);
    const coarse = scanned(t, mixture, 4000);
    // The scan can only miss the bottom by what the curve rises over half a step.
    expect(coarse.difference).toBeGreaterThanOrEqual(closest_approach_K - 1e-8);
    expectClose(coarse.difference, closest_approach_K, 0.05);
    expectClose(coarse.share, share, 1 / 4000);
    expect(t.report.faults).toEqual([]);
  });

  test('inside the curve, where water starts to boil, agrees with a brute-force scan', () => {
    const [both, hot, cold] = boiling();
    const t = trial('exchanger', { approach: '15 K', cold_pressure_drop: '0.5 bar' }, both, [hot, cold]);
    const { closest_approach_K, closest_at } = detailsOf(t);
    const coarse = scanned(t, both, 1000);
    expectClose(closest_approach_K, 15, 1e-8);
    expect(coarse.difference).toBeGreaterThanOrEqual(closest_approach_K - 1e-8);
    expectClose(coarse.difference, closest_approach_K, 0.3);
    expectClose(coarse.share, closest_at.share_of_heat_from_cold_end, 1 / 1000);
    expect(coarse.share).toBeGreaterThan(0.05);
  });

  test('in a smooth valley between the ends agrees with a brute-force scan', () => {
    // Hydrogen-rich gas far above its critical temperature against dense carbon dioxide, whose heat capacity peaks.
    const both = mixtureOf(['H2', 'CO2']);
    const hot = streamOf(both, { celsius: 90, bar: 80, flows: { H2: 60 } });
    const cold = streamOf(both, { celsius: 33, bar: 80, flows: { CO2: 20 } });
    const t = trial('exchanger', { approach: '4 K' }, both, [hot, cold]);
    const { closest_approach_K } = detailsOf(t);
    const coarse = scanned(t, both, 2000);
    expect(coarse.difference).toBeGreaterThanOrEqual(closest_approach_K - 1e-7);
    expectClose(coarse.difference, closest_approach_K, 0.05);
  });

  test('on random streams is never above what a scan finds', () => {
    fc.assert(
      fc.property(
        fc.record({
          hot: fc.double({ min: 60, max: 200, noNaN: true }),
          cold: fc.double({ min: -40, max: 40, noNaN: true }),
          bar: fc.double({ min: 30, max: 200, noNaN: true }),
          ammonia: fc.double({ min: 0.05, max: 0.95, noNaN: true }),
          flow: fc.double({ min: 0.2, max: 5, noNaN: true }),
          approach: fc.double({ min: 1, max: 15, noNaN: true }),
        }),
        ({ hot, cold, bar, ammonia, flow, approach }) => {
          const inlets = [
            streamOf(mixture, {
              celsius: hot,
              bar,
              flows: { H2: 0.75 * (1 - ammonia), N2: 0.25 * (1 - ammonia), NH3: ammonia },
            }),
            streamOf(mixture, {
              celsius: cold,
              bar,
              flows: { H2: 0.75 * flow, N2: 0.2 * flow, NH3: 0.05 * flow },
            }),
          ];
          const t = trial('exchanger', { approach: `${approach} K` }, mixture, inlets);
          expect(t.report.faults).toEqual([]);
          expectClose(detailsOf(t).closest_approach_K, approach, 1e-7);
          expect(scanned(t, mixture, 300).difference).toBeGreaterThanOrEqual(approach - 1e-6);
        },
      ),
      { numRuns: 20 },
    );
  });

  test('below a few kelvin is worth a word', () => {
    const close = trial('exchanger', { approach: '2 K' }, mixture, [effluent, feed]);
    expect(close.report.warnings).toEqual([
      {
        code: 'close-approach',
        message:
          'hot and cold come within 2.00 K of one another; below 3 K the exchanger becomes unusually large',
      },
    ]);
    expect(trial('exchanger', { approach: '10 K' }, mixture, [effluent, feed]).report.warnings).toEqual([]);
  });
});

test('total entropy never falls, whatever the approach', () => {
  fc.assert(
    fc.property(
      fc.record({
        hot: fc.double({ min: 50, max: 500, noNaN: true }),
        cold: fc.double({ min: -50, max: 45, noNaN: true }),
        approach: fc.double({ min: 0, max: 4, noNaN: true }),
        drop: fc.double({ min: 0, max: 5, noNaN: true }),
      }),
      ({ hot, cold, approach, drop }) => {
        const inlets = [
          streamOf(mixture, { celsius: hot, bar: 150, flows: effluentGas }),
          streamOf(mixture, { celsius: cold, bar: 160, flows: loopGas }),
        ];
        const raw = {
          approach: `${approach} K`,
          hot_pressure_drop: `${drop} bar`,
          cold_pressure_drop: `${drop} bar`,
        };
        const t = trial('exchanger', raw, mixture, inlets);
        const entropy = (streams: readonly StreamState[]) =>
          streams.reduce((sum, s) => sum + mixture.entropy(s), 0);
        const before = entropy(inlets);
        expect(entropy(t.outlets) - before).toBeGreaterThanOrEqual(-1e-10 * Math.abs(before));
      },
    ),
    { numRuns: 60 },
  );
});

describe('the heat curve', () => {
  test('runs from the cold end to the hot end and rises on both sides', () => {
    const t = trial('exchanger', { approach: '10 K' }, mixture, [effluent, feed]);
    const { heat_curve, exchanged_kW, closest_approach_K } = detailsOf(t);
    const { heat_kW, hot_K, cold_K } = heat_curve!;
    expect(heat_kW.length).toBeGreaterThanOrEqual(19);
    expect(heat_kW.length).toBeLessThanOrEqual(25);
    expect(heat_kW[0]).toBe(0);
    expectClose(heat_kW.at(-1)!, exchanged_kW, 1e-6 * exchanged_kW);
    expectClose(hot_K.at(-1)!, effluent.temperatureK, 1e-4);
    expectClose(cold_K[0], feed.temperatureK, 1e-4);
    for (const list of [heat_kW, hot_K, cold_K]) {
      expect([...list].sort((a, b) => a - b)).toEqual(list);
    }
    const differences = hot_K.map((T, k) => T - cold_K[k]);
    expectClose(Math.min(...differences), closest_approach_K, 1e-3);
  });

  test('UA of it does not depend on where the sum is cut, and exceeds that of the ends when the pinch is inside', () => {
    const hot = streamOf(mixture, { celsius: 120, bar: 150, flows: { H2: 30, N2: 10, NH3: 40 } });
    const cold = streamOf(mixture, { celsius: -20, bar: 150, flows: { H2: 120, N2: 42, NH3: 2 } });
    const t = trial('exchanger', { approach: '6 K' }, mixture, [hot, cold]);
    const { conductance_kW_K, log_mean_difference_K, exchanged_kW } = detailsOf(t);
    expect(conductance_kW_K!).toBeGreaterThan(1.2 * (exchanged_kW / log_mean_difference_K!));
  });
});

describe('what cannot be', () => {
  const faultOf = (t: Trial) => {
    expect(t.report.faults).toHaveLength(1);
    return t.report.faults[0];
  };

  test('cold heated above hot is a temperature cross, with the limit in the remedy', () => {
    const little = streamOf(mixture, { celsius: 35, bar: 200, flows: { H2: 15, N2: 5, NH3: 1 } });
    const t = trial('exchanger', { cold_temperature: '460 degC' }, mixture, [effluent, little]);
    const fault = faultOf(t);
    expect(fault.code).toBe('temperature-cross');
    expect(fault.what).toMatch(
      /^To move \d+\.?\d* kW the streams would have to cross: at the hot end hot would be at 450\.0 degC and cold at 460\.0 degC\.$/,
    );
    expect(fault.mend).toMatch(
      /^set cold_temperature well below 450\.0 degC, where no difference would be left/,
    );
    // The pass itself has moved no more than the temperatures let through.
    expect(t.outlets[1].temperatureK).toBeLessThanOrEqual(effluent.temperatureK + 1e-6);
    expectBalances(t, mixture);
  });

  test('hot cooled below cold is a temperature cross', () => {
    const t = trial('exchanger', { hot_temperature: '20 degC' }, mixture, [effluent, feed]);
    expect(faultOf(t).code).toBe('temperature-cross');
    expect(faultOf(t).mend).toMatch(/^set hot_temperature well above/);
  });

  test('a duty that only crosses inside the curve is found, and the limit it names does not cross', () => {
    const hot = streamOf(mixture, { celsius: 120, bar: 150, flows: { H2: 30, N2: 10, NH3: 40 } });
    const cold = streamOf(mixture, { celsius: -20, bar: 150, flows: { H2: 120, N2: 42, NH3: 2 } });
    const most = detailsOf(trial('exchanger', { approach: '0 K' }, mixture, [hot, cold])).exchanged_kW;
    const t = trial('exchanger', { duty: `${1.02 * most} kW` }, mixture, [hot, cold]);
    const fault = faultOf(t);
    expect(fault.code).toBe('temperature-cross');
    expect(fault.what).toMatch(
      /cross: inside, at \d+ % of the heat counted from the cold end, hot would be at .* and cold at /,
    );
    expect(fault.mend).toContain(`set duty well below ${Number(most.toPrecision(5))} kW`);
    expect(detailsOf(t).closest_approach_K).toBeLessThan(0);
    expect(trial('exchanger', { duty: `${0.999 * most} kW` }, mixture, [hot, cold]).report.faults).toEqual(
      [],
    );
  });

  test('streams on the wrong ports are told so', () => {
    const t = trial('exchanger', { duty: '10 kW' }, mixture, [feed, effluent]);
    expect(faultOf(t)).toEqual({
      path: ['duty'],
      code: 'temperature-cross',
      what: 'Hot enters at 35.0 degC and cold at 450.0 degC.',
      why: 'heat flows from hot to cold only, and here the stream called cold is no colder',
      mend: 'exchange the ports hot and cold, or take the exchanger out',
    });
    expect(detailsOf(t).exchanged_kW).toBe(0);
  });

  test('inlets closer than the approach are told so', () => {
    const t = trial('exchanger', { approach: '500 K' }, mixture, [effluent, feed]);
    expect(faultOf(t)).toEqual({
      path: ['approach'],
      code: 'approach-out-of-reach',
      what: 'Hot enters at 450.0 degC and cold at 35.0 degC: an approach of 500.0 K cannot be kept.',
      why: 'the closest approach is at most the difference between the two inlets',
      mend: 'lower the approach, bring in a hotter or colder stream, or take the exchanger out',
    });
  });

  test('a cold side that should be cooled is told so', () => {
    const t = trial('exchanger', { cold_temperature: '20 degC' }, mixture, [effluent, feed]);
    expect(faultOf(t)).toEqual({
      path: ['cold_temperature'],
      code: 'heat-runs-back',
      what: 'The cold side enters at 35.0 degC and should leave at 20.0 degC.',
      why: 'the cold side of an exchanger can only take heat up, the hot side only give it off',
      mend: 'set cold_temperature above 35.0 degC, or take the exchanger out',
    });
    expectClose(t.outlets[1].temperatureK, feed.temperatureK, 1e-9);
  });

  test('a side without flow is told so', () => {
    const none = streamOf(mixture, { celsius: 450, bar: 195, flows: {} });
    const t = trial('exchanger', { duty: '10 kW' }, mixture, [none, feed]);
    expect(faultOf(t).what).toBe('10 kW are to be moved, and nothing flows on the hot side.');
  });
});

test('heat moved and heat taken up agree to rounding on random duties', () => {
  fc.assert(
    fc.property(fc.double({ min: 0, max: 3e6, noNaN: true }), (duty) => {
      const t = trial('exchanger', { duty: `${duty} W` }, mixture, [effluent, feed]);
      const size = enthalpySize([effluent, feed], mixture);
      const sum = t.outlets[0].enthalpyW + t.outlets[1].enthalpyW;
      expectClose(sum, effluent.enthalpyW + feed.enthalpyW, 1e-14 * size);
    }),
    { numRuns: 30 },
  );
});
