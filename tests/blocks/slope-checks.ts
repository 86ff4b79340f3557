import { expect } from 'vitest';
import { type BlockSlopes, blockSlopes } from '../../src/blocks/slopes.ts';
import type { StreamState } from '../../src/model/stream.ts';
import type { Mixture } from '../../src/properties/mixture.ts';
import { copyOf, type Trial } from './helpers.ts';

/** Sizes of flows, temperature and pressure that differences are small against. */
export interface Sizes {
  readonly flow: number;
  readonly kelvin: number;
  readonly pascal: number;
}

/** How many entries were compared and how many lie on a kink of the block. */
export interface Compared {
  columns: number;
  kinks: number;
}

/** The slopes of a block that has passed; null where it has none. */
export function slopesOf(t: Trial, mixture: Mixture): BlockSlopes | null {
  const slopes = blockSlopes(mixture.size + 2, t.outlets.length, t.inlets.length);
  return t.unit.slopes?.(t.inlets, t.outlets, slopes) ? slopes : null;
}

/**
 * Compares the slopes of a block with differences of its passes, in units of the sizes: what an outlet gains per
 * gain of an inlet. A column where the differences to both sides do not agree is left out and counted.
 */
export function compareWithDifferences(
  t: Trial,
  mixture: Mixture,
  slopes: BlockSlopes,
  sizes: Sizes,
  tolerance = 1e-5,
): Compared {
  const { width } = slopes;
  const n = mixture.size;
  const sizeOf = (k: number) => (k < n ? sizes.flow : k === n ? sizes.kelvin : sizes.pascal);
  const compared = { columns: 0, kinks: 0 };
  const base = t.outlets.map((out) => read(out, n));
  t.inlets.forEach((inlet, at) => {
    const kept = copyOf(inlet);
    for (let k = 0; k < width; k++) {
      const passAt = (change: number): Float64Array[] | null => {
        write(inlet, kept, k, change, n);
        mixture.settle(inlet);
        try {
          t.unit.pass(t.inlets, t.outlets);
        } catch {
          return null;
        }
        return t.outlets.map((out) => read(out, n));
      };
      // a trace may be taken away only as far as it goes
      const most = k < n ? 0.2 * kept.flowsMolPerS[k]! : Number.POSITIVE_INFINITY;
      const step = Math.min(2e-5 * sizeOf(k), most);
      if (step < 1e-6 * sizeOf(k)) continue;
      const points = [-step, -0.5 * step, 0.5 * step, step].map(passAt);
      write(inlet, kept, k, 0, n);
      mixture.settle(inlet);
      if (points.some((point) => point === null)) continue;
      const [far, near, nearUp, farUp] = points as Float64Array[][];
      const scaled = (from: Float64Array, to: Float64Array, i: number, span: number) =>
        (((to[i]! - from[i]!) / span) * sizeOf(k)) / sizeOf(i);
      // By how much the differences to both sides disagree: a smooth curve halves it with the step, a kink does not.
      const gap = (down: Float64Array, here: Float64Array, up: Float64Array, i: number, span: number) =>
        scaled(down, here, i, span) - scaled(here, up, i, span);
      const sides = base.map((here, o) =>
        here.map((_, i) => {
          const wide = gap(far![o]!, here, farUp![o]!, i, step);
          const close = gap(near![o]!, here, nearUp![o]!, i, 0.5 * step);
          return Math.max(Math.abs(wide) * (tolerance / 1e-2), 2 * Math.abs(2 * close - wide));
        }),
      );
      const wanted = base.map((here, o) =>
        here.map((_, i) => {
          const wide = scaled(far![o]!, farUp![o]!, i, 2 * step);
          return (4 * scaled(near![o]!, nearUp![o]!, i, step) - wide) / 3;
        }),
      );
      if (sides.some((out) => out.some((one) => one > tolerance))) {
        compared.kinks++;
        continue;
      }
      compared.columns++;
      wanted.forEach((column, o) => {
        column.forEach((want, i) => {
          const got = (slopes.of[o]![at]![i * width + k]! * sizeOf(k)) / sizeOf(i);
          const allowed = tolerance * Math.max(1, Math.abs(want));
          expect(
            Math.abs(got - want),
            `outlet ${o} variable ${i} by inlet ${at} variable ${k}: ${got}, by differences ${want}`,
          ).toBeLessThanOrEqual(allowed);
        });
      });
    }
  });
  t.unit.pass(t.inlets, t.outlets);
  return compared;
}

/** Flows, temperature and pressure of a stream. */
function read(stream: StreamState, n: number): Float64Array {
  const values = new Float64Array(n + 2);
  values.set(stream.flowsMolPerS);
  values[n] = stream.temperatureK;
  values[n + 1] = stream.pressurePa;
  return values;
}

function write(stream: StreamState, kept: StreamState, k: number, change: number, n: number): void {
  stream.flowsMolPerS.set(kept.flowsMolPerS);
  stream.temperatureK = kept.temperatureK;
  stream.pressurePa = kept.pressurePa;
  if (k < n) stream.flowsMolPerS[k] = stream.flowsMolPerS[k]! + change;
  else if (k === n) stream.temperatureK += change;
  else stream.pressurePa += change;
}
