import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { emptyStream } from '../../src/model/stream.ts';
import { R } from '../../src/properties/constants.ts';
import { expectRelative } from './expect-relative.ts';
import { mixtureOf, streamOf } from './mixture-of.ts';

const ids = ['H2', 'N2', 'NH3', 'Ar', 'CH4'];
const mixture = mixtureOf(ids);

/** Gibbs energy of a stream with its phases as they are [W]. */
function gibbs(stream: ReturnType<typeof streamOf>, mix = mixture): number {
  mix.settlePhases(stream);
  return stream.enthalpyW - stream.temperatureK * mix.entropy(stream);
}

describe('Gibbs energy', () => {
  const flows = fc.array(fc.double({ min: 0.1, max: 5, noNaN: true }), { minLength: 5, maxLength: 5 });

  test('is lowest in the phases found: a little moved to the other phase gains nothing', () => {
    let seen = 0;
    fc.assert(
      fc.property(
        fc.double({ min: 235, max: 310, noNaN: true }),
        fc.double({ min: 20, max: 250, noNaN: true }),
        flows,
        (T, bar, fed) => {
          const stream = streamOf(mixture, T, bar, fed);
          if (stream.vapourFraction >= 1) return;
          for (let i = 0; i < 5; i++) {
            const liquid = stream.liquidMolPerS[i]!;
            const by = 1e-4 * Math.min(liquid, fed[i]! - liquid);
            stream.liquidMolPerS[i] = liquid + by;
            const more = gibbs(stream);
            stream.liquidMolPerS[i] = liquid - by;
            const less = gibbs(stream);
            stream.liquidMolPerS[i] = liquid;
            // difference of chemical potentials; the central difference leaves 1e-8 of RT, rounding of G the rest
            expect(Math.abs(more - less) / (2 * by) / (R * T)).toBeLessThan(
              1e-6 + (1e-15 * Math.abs(more)) / by / (R * T),
            );
            seen += 1;
          }
          // all together: Σ n (μ gas − μ liquid) = 0
          const at = gibbs(stream);
          expect(Number.isFinite(at)).toBe(true);
        },
      ),
      { numRuns: 80 },
    );
    expect(seen).toBeGreaterThan(50);
  });

  test('of boiling ammonia is the same in gas and liquid', () => {
    const pure = mixtureOf(['NH3']);
    const stream = emptyStream(1);
    stream.flowsMolPerS[0] = 1;
    stream.pressurePa = 8e5;
    pure.settleAtEnthalpy(stream, -55e3);
    expect(stream.vapourFraction).toBeGreaterThan(0.1);
    expect(stream.vapourFraction).toBeLessThan(0.9);
    stream.liquidMolPerS[0] = 1;
    const liquid = gibbs(stream, pure);
    stream.liquidMolPerS[0] = 0;
    expectRelative(gibbs(stream, pure), liquid, 1e-10);
  });
});

describe('what depends on how much there is', () => {
  test('enthalpy, entropy, volume and mass grow with the flow', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 230, max: 700, noNaN: true }),
        fc.double({ min: 1, max: 250, noNaN: true }),
        fc.double({ min: 1e-3, max: 1e3, noNaN: true }),
        (T, bar, factor) => {
          const one = streamOf(mixture, T, bar, [6, 2, 2, 0.3, 0.5]);
          const many = streamOf(
            mixture,
            T,
            bar,
            [6, 2, 2, 0.3, 0.5].map((flow) => factor * flow),
          );
          expectRelative(many.enthalpyW, factor * one.enthalpyW, 1e-8, factor * 1e4);
          expectRelative(mixture.entropy(many), factor * mixture.entropy(one), 1e-9);
          expectRelative(mixture.volume(many), factor * mixture.volume(one), 1e-9);
          expectRelative(mixture.mass(many), factor * mixture.mass(one), 1e-12);
          expectRelative(mixture.total(many), factor * mixture.total(one), 1e-12);
        },
      ),
      { numRuns: 60 },
    );
  });
});

test('at 25 degC and 1 bar an element holds no enthalpy and its standard entropy', () => {
  const gas = mixtureOf(['H2', 'N2', 'C_gr'], { gas: 'ideal' });
  // S° of H2 130.68, N2 191.61, graphite 5.74 J/(mol K): NIST-JANAF, 4th ed. (1998), from memory
  for (const [flows, entropy] of [
    [[1, 0, 0], 130.68],
    [[0, 1, 0], 191.61],
    [[0, 0, 1], 5.74],
  ] as const) {
    const stream = streamOf(gas, 298.15, 1, flows);
    expect(Math.abs(stream.enthalpyW)).toBeLessThan(0.1);
    expectRelative(gas.entropy(stream), entropy, 2e-3);
  }
});

test('mixing ideal gases of one temperature takes no heat and gains the entropy of mixing', () => {
  const gas = mixtureOf(['H2', 'N2'], { gas: 'ideal' });
  const [h2, n2, both] = [
    streamOf(gas, 400, 20, [3, 0]),
    streamOf(gas, 400, 20, [0, 1]),
    streamOf(gas, 400, 20, [3, 1]),
  ];
  expectRelative(both.enthalpyW, h2.enthalpyW + n2.enthalpyW, 1e-12);
  const gained = gas.entropy(both) - gas.entropy(h2) - gas.entropy(n2);
  expectRelative(gained, -R * (3 * Math.log(0.75) + Math.log(0.25)), 1e-10);
});

test('in a gas the entropy rises with temperature as the enthalpy over T', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 450, max: 1100, noNaN: true }),
      fc.double({ min: 1, max: 300, noNaN: true }),
      (T, bar) => {
        const [cold, hot] = [
          streamOf(mixture, T - 0.01, bar, [6, 2, 2, 0.3, 0.5]),
          streamOf(mixture, T + 0.01, bar, [6, 2, 2, 0.3, 0.5]),
        ];
        expectRelative(
          (hot.enthalpyW - cold.enthalpyW) / T,
          mixture.entropy(hot) - mixture.entropy(cold),
          1e-6,
        );
      },
    ),
    { numRuns: 60 },
  );
});

test('in a gas the entropy falls with pressure as the volume changes with temperature (Maxwell)', () => {
  for (const bar of [10, 100, 250]) {
    const T = 600;
    const at = (t: number, p: number) => streamOf(mixture, t, p, [6, 2, 2, 0.3, 0.5]);
    const entropyByPressure =
      (mixture.entropy(at(T, bar * 1.0005)) - mixture.entropy(at(T, bar * 0.9995))) / (bar * 1e5 * 0.001);
    const volumeByTemperature = (mixture.volume(at(T + 0.1, bar)) - mixture.volume(at(T - 0.1, bar))) / 0.2;
    expectRelative(entropyByPressure, -volumeByTemperature, 1e-5);
  }
});

test('the volume of a stream is that of its gas and its liquid; a solid takes none', () => {
  const pure = mixtureOf(['NH3', 'C_gr']);
  // Saturated liquid at 239.83 K: 681.97 kg/m3 (Gao et al. 2020, from memory)
  expectRelative(pure.volume(streamOf(pure, 239.82, 1.02, [1, 3])), 17.031e-3 / 681.97, 1e-3);
  const ideal = mixtureOf(['N2'], { gas: 'ideal' });
  expectRelative(ideal.volume(streamOf(ideal, 273.15, 1.01325, [1])), 0.022413969545014137, 1e-12);
});

test('nothing holds no enthalpy, whatever is asked of it', () => {
  const stream = emptyStream(5);
  mixture.settleAtEnthalpy(stream, 1e6);
  expect(stream.enthalpyW).toBe(0);
  expect(mixture.entropy(stream)).toBe(0);
  expect(mixture.volume(stream)).toBe(0);
});

test('a liquid that exceeds its stream by rounding makes no gas out of nothing', () => {
  const stream = streamOf(mixture, 250, 100, [0.001, 0.001, 1, 0.001, 0.001]);
  const before = stream.enthalpyW;
  stream.liquidMolPerS.forEach((flow, i) => {
    stream.liquidMolPerS[i] = flow * (1 + (i % 2 === 0 ? 2e-16 : -2e-16));
  });
  mixture.settlePhases(stream);
  expectRelative(stream.enthalpyW, before, 1e-12);
  expect(mixture.entropy(stream)).not.toBeNaN();
});

test('other condensables give another mixture of the same components', () => {
  const both = mixtureOf(['N2', 'NH3', 'H2O']);
  const named = both.withCondensables(['NH3']);
  expect(named.roles).toEqual(['dissolved', 'condensable', 'gas']);
  expect(named.components).toBe(both.components);
});
