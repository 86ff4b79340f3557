import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { copyStream, emptyStream, type StreamState } from '../../src/model/stream.ts';
import { R } from '../../src/properties/constants.ts';
import type { Mixture } from '../../src/properties/mixture.ts';
import { stateSlopes } from '../../src/properties/state-slopes.ts';
import { mixtureOf, streamOf } from './mixture-of.ts';

const ammonia = ['H2', 'N2', 'NH3', 'Ar', 'CH4', 'He'];
const methanol = ['H2', 'CO', 'CO2', 'CH3OH', 'H2O', 'N2', 'C_gr'];
const aqueous = ['NH3', 'H2O', 'N2', 'H2'];
const mixtures: readonly [string, Mixture][] = [
  ['ammonia loop, srk', mixtureOf(ammonia)],
  ['ammonia loop, pr', mixtureOf(ammonia, { gas: 'pr' })],
  ['ammonia loop, ideal', mixtureOf(ammonia, { gas: 'ideal' })],
  ['ammonia loop, srk, nothing dissolves', mixtureOf(ammonia, { dissolvedGases: false })],
  ['ammonia loop, srk for both phases', mixtureOf(ammonia, { liquid: 'eos' })],
  ['methanol loop, srk', mixtureOf(methanol)],
  ['methanol loop, ideal, nothing dissolves', mixtureOf(methanol, { gas: 'ideal', dissolvedGases: false })],
  ['methanol loop, pr for both phases', mixtureOf(methanol, { gas: 'pr', liquid: 'eos' })],
  ['ammonia and water with gas, srk', mixtureOf(aqueous)],
];

const states = fc.record({
  T: fc.integer({ min: 2300, max: 7000 }).map((k) => k / 10),
  bar: fc.integer({ min: 0, max: 1000 }).map((k) => 10 ** (k / 400)),
  shares: fc.array(
    fc.integer({ min: 0, max: 1000 }).map((k) => (k < 100 ? 0 : k / 100)),
    {
      minLength: 7,
      maxLength: 7,
    },
  ),
});

/** The stream with its variable j (flows, T, P) moved, in equilibrium again. */
function moved(mixture: Mixture, from: StreamState, j: number, by: number): StreamState {
  const stream = emptyStream(mixture.size);
  copyStream(from, stream);
  if (j < mixture.size) stream.flowsMolPerS[j]! += by;
  else if (j === mixture.size) stream.temperatureK += by;
  else stream.pressurePa += by;
  mixture.settle(stream);
  return stream;
}

function kindOf({ vapourFraction }: StreamState): string {
  return vapourFraction === 0 ? 'liquid' : vapourFraction === 1 ? 'gas' : 'both';
}

/** What a first trace of component j does to liquid and enthalpy; entropy rises without bound. */
function expectFirstTrace(mixture: Mixture, stream: StreamState, j: number, found: number[][]): void {
  const step = 1e-7 * mixture.total(stream);
  const up = moved(mixture, stream, j, step);
  if (kindOf(up) !== kindOf(stream)) return;
  const [before, after] = [functionsOf(mixture, stream), functionsOf(mixture, up)];
  for (let f = 0; f <= mixture.size; f++) {
    const difference = (after[f]! - before[f]!) / step;
    const perMole = f < mixture.size ? 1 : 1e5;
    expect(
      Math.abs(found[f]![j]! - difference),
      `function ${f} in the first of ${j}: ${found[f]![j]} against ${difference}`,
    ).toBeLessThan(1e-4 * (perMole + Math.abs(difference)));
  }
}

/** All state functions in a row: the liquid, then enthalpy and entropy. */
function functionsOf(mixture: Mixture, stream: StreamState): number[] {
  return [...stream.liquidMolPerS, stream.enthalpyW, mixture.entropy(stream)];
}

describe.each(mixtures)('%s', (_, mixture) => {
  const { size } = mixture;
  const width = size + 2;
  const slopes = stateSlopes(size);
  const h = new Float64Array(size);

  test('the derivatives of a stream are those that differences give', () => {
    const met = new Map<string, number>();
    fc.assert(
      fc.property(states, ({ T, bar, shares }) => {
        const flows = shares.slice(0, size);
        const total = flows.reduce((sum, n) => sum + n, 0);
        if (total === 0) return;
        const stream = streamOf(mixture, T, bar, flows);
        const kind = kindOf(stream);
        if (!mixture.slopes(stream, 'all', slopes)) {
          // One component alone, or hardly more, boils: that is the only state without derivatives.
          expect(kind).toBe('both');
          expect(flows.filter((n) => n > 0).length).toBe(1);
          return;
        }
        const found: number[][] = [
          ...flows.map((__, i) => Array.from(slopes.liquid.subarray(i * width, (i + 1) * width))),
          Array.from(slopes.enthalpy),
          Array.from(slopes.entropy),
        ];
        mixture.idealGas.enthalpies(T, h);
        for (let j = 0; j < width; j++) {
          const scale = j < size ? total : j === size ? T : bar * 1e5;
          const step = 1e-4 * scale;
          if (j < size && flows[j]! < 4 * step) {
            expectFirstTrace(mixture, stream, j, found);
            continue;
          }
          const [up, down, up2, down2] = [1, -1, 0.5, -0.5].map((k) => moved(mixture, stream, j, k * step));
          if ([up!, down!].some((s) => kindOf(s) !== kind)) continue;
          met.set(kind, (met.get(kind) ?? 0) + 1);
          const at = [up!, down!, up2!, down2!].map((s) => functionsOf(mixture, s));
          for (let f = 0; f < size + 2; f++) {
            const wide = (at[0]![f]! - at[1]![f]!) / (2 * step);
            const narrow = (at[2]![f]! - at[3]![f]!) / step;
            const perMole = f < size ? 1 : f === size ? R * T + Math.abs(h[j] ?? 0) : 10 * R;
            const size1 = (perMole * total) / scale + Math.abs(narrow);
            const limit = (4 * narrow - wide) / 3;
            expect(
              Math.abs(found[f]![j]! - limit),
              `${kind} of function ${f} in variable ${j}: ${found[f]![j]} against ${limit}`,
            ).toBeLessThan(1e-6 * size1 + Math.abs(wide - narrow));
          }
        }
      }),
      { numRuns: 60 },
    );
    expect(met.get('gas')).toBeGreaterThan(0);
    expect(met.get('both')).toBeGreaterThan(0);
  });
});
