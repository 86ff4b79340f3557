import { correlate } from './correlate.ts';
import { createRandom, type Random } from './random.ts';
import { createSobol } from './sobol-sequence.ts';

export type SamplingMethod = 'sobol' | 'latin';

/** Which numbers of one seed are drawn for what. */
const STREAMS = { sobol: 1, latin: 2 } as const;

/**
 * Points of the unit cube, row by row: `count` rows of `dimensions` numbers, each above 0 and below 1.
 *   sobol: a scrambled Sobol sequence (sobol-sequence.ts); counts that are powers of two are spread most evenly
 *   latin: a Latin hypercube: of each dimension one number in each of `count` equal parts, the parts in random order
 *
 * @throws RangeError for sobol beyond SOBOL_DIMENSIONS
 * @source Latin hypercube: M. D. McKay, R. J. Beckman & W. J. Conover, Technometrics 21 (1979) 239
 */
export function unitPoints(
  method: SamplingMethod,
  count: number,
  dimensions: number,
  seed: number,
): Float64Array {
  const random = createRandom(seed, STREAMS[method]);
  const points = new Float64Array(count * dimensions);
  if (method === 'latin') fillLatin(points, count, dimensions, random);
  else fillSobol(points, dimensions, random);
  return points;
}

function fillSobol(points: Float64Array, dimensions: number, random: Random): void {
  const sobol = createSobol(dimensions, random);
  const row = new Uint32Array(dimensions);
  for (let at = 0; at < points.length; at += dimensions) {
    sobol.next(row);
    // The middle of the cell: neither 0 nor 1, where quantiles are infinite.
    for (let d = 0; d < dimensions; d++) points[at + d] = (row[d] + 0.5) / 2 ** 32;
  }
}

function fillLatin(points: Float64Array, count: number, dimensions: number, random: Random): void {
  const order = Uint32Array.from({ length: count }, (_, i) => i);
  for (let d = 0; d < dimensions; d++) {
    for (let i = count - 1; i > 0; i--) {
      const j = random.below(i + 1);
      [order[i], order[j]] = [order[j], order[i]];
    }
    for (let i = 0; i < count; i++) points[i * dimensions + d] = (order[i] + random.uniform()) / count;
  }
}

/**
 * Values of every spread, row by row: points of the unit cube, made to move together where `factor` says so, and carried over
 * by the quantiles of the distributions.
 *
 * @param factor  of flowsheet/correlation-matrix.ts; null where all are independent
 */
export function valuesAt(
  points: Float64Array,
  distributions: readonly { quantile(u: number): number }[],
  factor: Float64Array | null,
): Float64Array {
  const size = distributions.length;
  const values = points.slice();
  for (let at = 0; at < values.length; at += size) {
    const row = values.subarray(at, at + size);
    if (factor !== null) correlate(row, factor);
    for (let d = 0; d < size; d++) row[d] = distributions[d].quantile(row[d]);
  }
  return values;
}
