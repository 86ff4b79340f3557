import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { StreamState } from '../../src/model/stream.ts';
import { builtInComponent, builtInIds } from '../../src/properties/components.ts';
import type { Mixture } from '../../src/properties/mixture.ts';
import { vapourPressureRange } from '../../src/properties/vapour-pressure.ts';
import { mixtureOf, streamOf } from './mixture-of.ts';

const all = builtInIds.map((id) => builtInComponent(id)!).filter((c) => !c.solid);
const condensing = all.filter(
  (c) => (c.critical?.temperatureK ?? 0) > 380 && vapourPressureRange(c) !== null,
);
const gases = all.filter((c) => (c.critical?.temperatureK ?? 999) < 200);

interface Drawn {
  readonly mixture: Mixture;
  readonly stream: StreamState;
  readonly label: string;
}

/** Gases over a condensate of one or two components of the catalogue, within the ranges of their data. */
const drawn = (gas: 'ideal' | 'srk' | 'pr'): fc.Arbitrary<Drawn> =>
  fc
    .record({
      heavy: fc.uniqueArray(fc.constantFrom(...condensing), { minLength: 1, maxLength: 2 }),
      light: fc.uniqueArray(fc.constantFrom(...gases), { minLength: 1, maxLength: 3 }),
      parts: fc.array(fc.double({ min: 0.02, max: 1, noNaN: true }), { minLength: 5, maxLength: 5 }),
      warm: fc.double({ min: 0.05, max: 0.5, noNaN: true }),
      logBar: fc.double({ min: 0, max: 1.9, noNaN: true }),
    })
    .map(({ heavy, light, parts, warm, logBar }) => {
      const ids = [...heavy, ...light].map((c) => c.id);
      const ranges = heavy.map((c) => vapourPressureRange(c)!);
      const fromK = Math.max(...ranges.map((r) => r.fromK), 240);
      const toK = Math.min(...ranges.map((r) => r.toK));
      const T = fromK + warm * (toK - fromK);
      const mixture = mixtureOf(ids, { gas });
      const stream = streamOf(mixture, T, 10 ** logBar, parts.slice(0, ids.length));
      return { mixture, stream, label: `${ids.join(' ')} ${T} K ${10 ** logBar} bar` };
    });

const total = (flows: Float64Array) => flows.reduce((sum, n) => sum + n, 0);

describe.each(['ideal', 'srk', 'pr'] as const)('gas: %s', (gas) => {
  test('a flash of either phase of a flash gives that phase again', () => {
    let both = 0;
    fc.assert(
      fc.property(drawn(gas), ({ mixture, stream, label }) => {
        const liquid = total(stream.liquidMolPerS);
        const whole = total(stream.flowsMolPerS);
        // at the very edge of two phases rounding decides
        if (liquid < 1e-4 * whole || liquid > (1 - 1e-4) * whole) return;
        both++;
        const { temperatureK: T, pressurePa } = stream;
        const gasFlows = stream.flowsMolPerS.map((n, i) => n - stream.liquidMolPerS[i]!);
        const overhead = streamOf(mixture, T, pressurePa / 1e5, gasFlows);
        const bottoms = streamOf(mixture, T, pressurePa / 1e5, stream.liquidMolPerS);
        expect(total(overhead.liquidMolPerS) / whole, label).toBeLessThan(1e-7);
        expect(1 - total(bottoms.liquidMolPerS) / liquid, label).toBeLessThan(1e-7);
        // Their heat is that of the whole.
        const sum = overhead.enthalpyW + bottoms.enthalpyW;
        expect(Math.abs(sum - stream.enthalpyW), label).toBeLessThan(
          1e-6 * (Math.abs(stream.enthalpyW) + 1e4 * whole),
        );
      }),
      { numRuns: 200 },
    );
    expect(both).toBeGreaterThan(50);
  });

  test('the order of the components changes nothing in a flash', () => {
    fc.assert(
      fc.property(drawn(gas), ({ mixture, stream, label }) => {
        const turned = mixtureOf(mixture.components.map((c) => c.id).toReversed(), { gas });
        const flows = stream.flowsMolPerS.toReversed();
        const other = streamOf(turned, stream.temperatureK, stream.pressurePa / 1e5, flows);
        const whole = total(flows);
        other.liquidMolPerS.toReversed().forEach((n, i) => {
          expect(Math.abs(n - stream.liquidMolPerS[i]!) / whole, label).toBeLessThan(1e-8);
        });
        expect(Math.abs(other.enthalpyW - stream.enthalpyW), label).toBeLessThan(1e-4 * whole);
      }),
      { numRuns: 200 },
    );
  });

  test('nothing that happens by itself takes entropy away: let-down at constant enthalpy, and mixing', () => {
    fc.assert(
      fc.property(
        drawn(gas),
        fc.double({ min: 0.3, max: 0.99, noNaN: true }),
        ({ mixture, stream, label }, part) => {
          const before = mixture.entropy(stream);
          const whole = total(stream.flowsMolPerS);
          const lower = streamOf(
            mixture,
            stream.temperatureK,
            (stream.pressurePa / 1e5) * part,
            stream.flowsMolPerS,
          );
          mixture.settleAtEnthalpy(lower, stream.enthalpyW);
          expect(mixture.entropy(lower) - before, label).toBeGreaterThan(-1e-6 * whole);
          const warmer = streamOf(
            mixture,
            stream.temperatureK + 40,
            stream.pressurePa / 1e5,
            stream.flowsMolPerS,
          );
          const mixed = streamOf(
            mixture,
            stream.temperatureK + 20,
            stream.pressurePa / 1e5,
            stream.flowsMolPerS.map((n) => 2 * n),
          );
          const hot = mixture.entropy(warmer);
          mixture.settleAtEnthalpy(mixed, stream.enthalpyW + warmer.enthalpyW);
          expect(mixture.entropy(mixed) - before - hot, label).toBeGreaterThan(-1e-6 * whole);
        },
      ),
      { numRuns: 100 },
    );
  });
});
