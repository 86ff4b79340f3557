import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { StreamState } from '../../src/model/stream.ts';
import { emptyStream } from '../../src/model/stream.ts';
import { solveState } from '../../src/properties/solve-state.ts';
import { expectRelative } from './expect-relative.ts';
import { mixtureOf, streamOf } from './mixture-of.ts';

/** A stream whose enthalpy is a given function of temperature. */
function withEnthalpy(h: (T: number) => number, startK: number) {
  const stream = emptyStream(1);
  stream.flowsMolPerS[0] = 1;
  stream.temperatureK = startK;
  let calls = 0;
  const settle = (s: StreamState) => {
    calls += 1;
    s.enthalpyW = h(s.temperatureK);
  };
  const solve = (wanted: number) => solveState(stream, wanted, 'enthalpy', settle, (s) => s.enthalpyW);
  return { stream, solve, calls: () => calls };
}

describe('on functions with known answers', () => {
  test('a straight line is met in a handful of steps', () => {
    const { stream, solve, calls } = withEnthalpy((T) => 30 * T, 300);
    solve(30 * 456.789);
    expectRelative(stream.temperatureK, 456.789, 1e-12);
    expect(calls()).toBeLessThan(12);
  });

  test('any rising curve is met from any start', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 21, max: 3400, noNaN: true }),
        fc.double({ min: 21, max: 3400, noNaN: true }),
        fc.double({ min: -3, max: 3, noNaN: true }),
        (answer, start, bend) => {
          const h = (T: number) => 25 * T + 10 ** bend * 1e-3 * T * T;
          const { stream, solve } = withEnthalpy(h, start);
          solve(h(answer));
          expectRelative(stream.temperatureK, answer, 1e-10);
        },
      ),
    );
  });

  test('a jump is met between its sides', () => {
    const { stream, solve } = withEnthalpy((T) => 30 * T + (T > 350 ? 20e3 : 0), 300);
    solve(30 * 350 + 5e3);
    expectRelative(stream.temperatureK, 350, 1e-12);
    expectRelative(stream.enthalpyW, 30 * 350 + 5e3, 1e-9);
  });

  test.each([
    ['colder', -1e5, 20],
    ['hotter', 1e6, 3500],
  ])('a value %s than the bounds is refused', (_, wanted, bound) => {
    const { solve } = withEnthalpy((T) => 30 * T, 300);
    expect(() => solve(wanted)).toThrow(
      expect.objectContaining({
        code: 'temperature-bound',
        why: `the search ended at ${bound.toFixed(1)} K`,
      }),
    );
  });

  test('a state that is not a number is refused', () => {
    const { solve } = withEnthalpy(() => Number.NaN, 300);
    expect(() => solve(1)).toThrow(expect.objectContaining({ code: 'temperature-bound' }));
  });

  test('an empty stream keeps its temperature', () => {
    const { stream, solve } = withEnthalpy(() => 0, 300);
    stream.flowsMolPerS[0] = 0;
    solve(1e6);
    expect(stream.temperatureK).toBe(300);
  });
});

describe('round trips through enthalpy and entropy', () => {
  // The first is the carrier and always there: near the critical point of a liquid the model has no single answer.
  const systems = [
    { ids: ['H2', 'N2', 'NH3', 'Ar', 'CH4'], flows: [60, 20, 15, 3, 5] },
    { ids: ['H2', 'CO', 'CO2', 'CH3OH', 'H2O', 'N2'], flows: [60, 8, 1.5, 6, 3, 4] },
    { ids: ['CH4', 'H2', 'CO', 'H2O', 'C_gr'], flows: [20, 5, 1, 15, 2] },
    { ids: ['N2', 'O2', 'SO2', 'SO3'], flows: [79, 8, 5, 5] },
  ];
  const some = fc.double({ min: 0.01, max: 3, noNaN: true });
  const parts = fc
    .tuple(
      fc.double({ min: 0.5, max: 3, noNaN: true }),
      fc.array(fc.oneof(fc.constant(0), some), { minLength: 5, maxLength: 5 }),
    )
    .map(([carrier, others]) => [carrier, ...others]);

  test.each(systems)('$ids come back to their temperature from wherever one starts', ({ ids, flows }) => {
    const mixture = mixtureOf(ids);
    fc.assert(
      fc.property(
        fc.double({ min: 255, max: 900, noNaN: true }),
        fc.double({ min: 1, max: 250, noNaN: true }),
        fc.double({ min: 240, max: 900, noNaN: true }),
        parts,
        (T, bar, start, scale) => {
          const fed = flows.map((flow, i) => flow * scale[i]!);
          const state = streamOf(mixture, T, bar, fed);
          const entropy = mixture.entropy(state);
          const back = streamOf(mixture, start, bar, fed);
          mixture.settleAtEnthalpy(back, state.enthalpyW);
          expectRelative(back.temperatureK, T, 1e-9);
          expect(back.enthalpyW).toBe(state.enthalpyW);
          back.temperatureK = start;
          mixture.settleAtEntropy(back, entropy);
          expectRelative(back.temperatureK, T, 1e-9);
        },
      ),
      { numRuns: 100 },
    );
  });

  test.each([
    ['NH3', 8],
    ['CH3OH', 2],
    ['H2O', 40],
    ['SO2', 5],
  ])('boiling %s at %d bar comes back to its share of vapour', (id, bar) => {
    const mixture = mixtureOf([id]);
    const { liquid, gas } = sidesOf(id, bar);
    fc.assert(
      fc.property(
        fc.double({ min: 0.001, max: 0.999, noNaN: true }),
        fc.double({ min: 250, max: 600, noNaN: true }),
        (share, start) => {
          const state = streamOf(mixture, start, bar, [2]);
          mixture.settleAtEnthalpy(state, liquid.enthalpyW + share * (gas.enthalpyW - liquid.enthalpyW));
          expectRelative(state.vapourFraction, share, 1e-7);
          expectRelative(state.liquidMolPerS[0]!, 2 * (1 - share), 1e-6);
          state.temperatureK = start;
          mixture.settleAtEntropy(
            state,
            mixture.entropy(liquid) + share * (mixture.entropy(gas) - mixture.entropy(liquid)),
          );
          expectRelative(state.vapourFraction, share, 1e-7);
        },
      ),
      { numRuns: 25 },
    );
  });
});

/** Two moles of a pure component just below and just above its boiling point. */
function sidesOf(id: string, bar: number): { liquid: StreamState; gas: StreamState } {
  const mixture = mixtureOf([id]);
  let [low, high] = [200, 640];
  for (let k = 0; k < 100; k++) {
    const T = 0.5 * (low + high);
    if (streamOf(mixture, T, bar, [2]).vapourFraction < 1) low = T;
    else high = T;
  }
  return { liquid: streamOf(mixture, low, bar, [2]), gas: streamOf(mixture, high, bar, [2]) };
}
