import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { blockSlopes } from '../../src/blocks/slopes.ts';
import { copyStream, type StreamState } from '../../src/model/stream.ts';
import type { Mixture } from '../../src/properties/mixture.ts';
import { copyOf, mixtureOf, streamOf, type Trial, trial, troubleOf } from './helpers.ts';

const ids = ['H2', 'N2', 'NH3', 'Ar', 'H2O'];
const mixtures = { srk: mixtureOf(ids), ideal: mixtureOf(ids, { gas: 'ideal' }) };

/** Inlets of a loop's gas; colder ones hold liquid. */
const inlet = fc.record({
  H2: share(600),
  N2: share(200),
  NH3: share(300),
  Ar: share(50),
  H2O: share(20),
  celsius: fc.integer({ min: -200, max: 900 }).map((n) => n / 5),
  bar: fc.integer({ min: 800, max: 1600 }).map((n) => n / 10),
});
function share(most: number) {
  return fc.integer({ min: 5, max: 10 * most }).map((n) => n / 10);
}

type Case = readonly [name: string, kind: string, settings: unknown, liquid?: true];
const cases: readonly Case[] = [
  ['mixer', 'mixer', {}],
  ['mixer of set pressure', 'mixer', { pressure: '60 bar' }],
  ['splitter by shares', 'splitter', { fractions: { purge: '3 %' } }],
  ['splitter by moles', 'splitter', { flows: { purge: '12 mol/s' } }],
  ['splitter by mass', 'splitter', { flows: { purge: '100 g/s' } }],
  ['heater to a temperature', 'heater', { temperature: '280 degC', pressure_drop: '2 bar' }],
  ['heater by a duty', 'heater', { duty: '1 MW', pressure_drop: '2 bar' }],
  ['condenser', 'condenser', { temperature: '-5 degC', pressure_drop: '2 bar' }],
  ['condenser by a duty', 'condenser', { duty: '-1 MW' }],
  ['flash, adiabatic', 'flash', { pressure: '20 bar', adiabatic: true }],
  ['flash, of set temperature', 'flash', { pressure: '20 bar', temperature: '-10 degC' }],
  ['valve', 'valve', { pressure: '20 bar' }],
  [
    'separator',
    'separator',
    { recover: { hydrogen: { H2: '90 %', N2: '10 %' } }, pressures: { hydrogen: '30 bar' } },
  ],
  ['compressor', 'compressor', { pressure: '200 bar' }],
  ['compressor by a ratio', 'compressor', { ratio: 1.2, efficiency: '80 %' }],
  ['compressor, polytropic', 'compressor', { pressure_rise: '30 bar', polytropic_efficiency: '80 %' }],
  [
    'compressor of three stages',
    'compressor',
    { pressure: '400 bar', stages: 3, intercooling: '10 degC', pressure_drop_per_cooler: '0.5 bar' },
  ],
  ['expander', 'expander', { ratio: 3 }],
  ['expander to a pressure', 'expander', { pressure: '40 bar' }],
  ['pump', 'pump', { pressure: '250 bar' }, true],
];

/** Variables of a stream in a row: flows, T, P. */
function variablesOf(stream: StreamState): number[] {
  return [...stream.flowsMolPerS, stream.temperatureK, stream.pressurePa];
}

/** Which phases the outlets hold: derivatives hold between the kinks only. */
function phasesOf(streams: readonly StreamState[]): string {
  return streams.map((s) => (s.vapourFraction === 0 ? 'l' : s.vapourFraction === 1 ? 'g' : 'b')).join('');
}

/** The outlets with variable j of one inlet moved; null where the block then stands elsewhere. */
function movedOutlets(t: Trial, mixture: Mixture, k: number, j: number, by: number): number[][] | null {
  const inlet = t.inlets[k]!;
  const kept = copyOf(inlet);
  const before = phasesOf([...t.inlets, ...t.outlets]);
  if (j < mixture.size) inlet.flowsMolPerS[j]! += by;
  else if (j === mixture.size) inlet.temperatureK += by;
  else inlet.pressurePa += by;
  mixture.settle(inlet);
  const fails = troubleOf(() => t.unit.pass(t.inlets, t.outlets)) !== 'none';
  const after = phasesOf([...t.inlets, ...t.outlets]);
  const found = t.outlets.map(variablesOf);
  copyStream(kept, inlet);
  t.unit.pass(t.inlets, t.outlets);
  return fails || after !== before ? null : found;
}

const named = cases.map(([name, kind, settings, liquid]) => ({ name, kind, settings, liquid }));

describe.each(named)('$name', ({ kind, settings, liquid }) => {
  test.each(['srk', 'ideal'] as const)('has the derivatives that differences of passes give (%s)', (gas) => {
    const mixture = mixtures[gas];
    const { size } = mixture;
    const width = size + 2;
    let compared = 0;
    let asked = 0;
    fc.assert(
      fc.property(fc.array(inlet, { minLength: 2, maxLength: 2 }), (states) => {
        const streams = states
          .slice(0, kind === 'mixer' ? 2 : 1)
          .map(({ celsius, bar, ...flows }) =>
            streamOf(
              mixture,
              liquid
                ? { celsius: -20, bar, flows: { NH3: flows.NH3, H2O: flows.H2O } }
                : { celsius, bar, flows },
            ),
          );
        if (troubleOf(() => trial(kind, settings, mixture, streams)) !== 'none') return;
        const t = trial(kind, settings, mixture, streams);
        asked++;
        const slopes = blockSlopes(width, t.outlets.length, t.inlets.length);
        if (!t.unit.slopes!(t.inlets, t.outlets, slopes)) return;
        for (let k = 0; k < t.inlets.length; k++) {
          const scales = variablesOf(t.inlets[k]!).map((v, j) =>
            j < size ? mixture.total(t.inlets[k]!) : v,
          );
          for (let j = 0; j < width; j++) {
            const flow = t.inlets[k]!.flowsMolPerS[j];
            if (flow === 0) continue;
            const step = Math.min(2e-4 * scales[j]!, 0.1 * (flow ?? Number.POSITIVE_INFINITY));
            const [up, down, up2, down2] = [1, -1, 0.5, -0.5].map((by) =>
              movedOutlets(t, mixture, k, j, by * step),
            );
            if (!up || !down || !up2 || !down2) continue;
            compared++;
            t.outlets.forEach((out, o) => {
              const outScales = variablesOf(out).map((v, r) => (r < size ? mixture.total(t.inlets[k]!) : v));
              for (let r = 0; r < width; r++) {
                const wide = (up[o]![r]! - down[o]![r]!) / (2 * step);
                const narrow = (up2[o]![r]! - down2[o]![r]!) / step;
                const slope = slopes.of[o]![k]![r * width + j]!;
                const natural = outScales[r]! / scales[j]!;
                expect(
                  Math.abs(slope - (4 * narrow - wide) / 3),
                  `outlet ${o} ${r} by inlet ${k} ${j}: ${slope} against ${narrow}`,
                ).toBeLessThan(3e-6 * (natural + Math.abs(narrow)) + Math.abs(wide - narrow));
              }
            });
          }
        }
      }),
      { numRuns: 5 },
    );
    expect(compared).toBeGreaterThan(0.5 * width * asked);
  });
});
