import { expect, test } from 'vitest';
import { createImplicitMarch, type Slope } from '../../src/blocks/kinetic-bed-implicit.ts';
import { troubleOf } from './helpers.ts';

const anything = () => true;

function countingEvaluations(slope: Slope) {
  const counted = { evaluations: 0, slope: slope as Slope };
  counted.slope = (z, x, out) => {
    counted.evaluations++;
    slope(z, x, out);
  };
  return counted;
}

test('a decay comes out as the exponential that it is', () => {
  const x = Float64Array.from([1]);
  createImplicitMarch(1, (_z, [y], out) => out.fill(-3 * y!), 1e-10, anything).march(0, 1, x);
  expect(Math.abs(x[0]! - Math.exp(-3))).toBeLessThan(1e-9);
});

test.each([1e2, 1e4, 1e8])(
  'what is pulled to a curve with the rate %d follows it, at no higher cost',
  (pull) => {
    const counted = countingEvaluations((z, [y], out) => {
      out[0] = -pull * (y! - Math.cos(3 * z)) - 3 * Math.sin(3 * z);
    });
    const x = Float64Array.from([1]);
    createImplicitMarch(1, counted.slope, 1e-10, anything).march(0, 1, x);
    expect(Math.abs(x[0]! - Math.cos(3))).toBeLessThan(1e-8);
    expect(counted.evaluations).toBeLessThan(4000);
  },
);

test("Robertson's three species, whose rates differ by nine powers of ten", () => {
  const x = Float64Array.from([1, 0, 0]);
  const slope: Slope = (_z, [a, b, c], out) => {
    const first = 0.04 * a!;
    const back = 1e4 * b! * c!;
    const fast = 3e7 * b! * b!;
    // z from 0 to 1 stands for the first 40 seconds
    out[0] = 40 * (back - first);
    out[1] = 40 * (first - back - fast);
    out[2] = 40 * fast;
  };
  createImplicitMarch(3, slope, 1e-10, anything).march(0, 1, x);
  // H. H. Robertson 1966; 40 s as in the demonstration of A. C. Hindmarsh, LSODE (1980), from memory, four digits
  expect(x[0]).toBeCloseTo(0.7158, 4);
  expect(Math.abs(x[1]! / 9.185e-6 - 1)).toBeLessThan(5e-4);
  expect(x[2]).toBeCloseTo(0.2842, 4);
});

test('in sections it ends where it ends at once', () => {
  const slope: Slope = (z, [y], out) => void out.fill(Math.sin(5 * z) - y! * y!);
  const once = Float64Array.from([1]);
  const march = createImplicitMarch(1, slope, 1e-10, anything);
  march.march(0, 1, once);
  const often = Float64Array.from([1]);
  march.restart();
  for (let section = 0; section < 7; section++) march.march(section / 7, (section + 1) / 7, often);
  expect(Math.abs(often[0]! - once[0]!)).toBeLessThan(1e-8);
});

test('an answer that is impossible is tried again with a shorter step', () => {
  // With long steps the estimate may jump below zero; the exact answer does not.
  const x = Float64Array.from([1]);
  const slope: Slope = (_z, [y], out) => out.fill(-20 * Math.sqrt(Math.max(y!, 0)) * y!);
  createImplicitMarch(1, slope, 1e-10, ([y]) => y! > 0).march(0, 1, x);
  expect(Math.abs(x[0]! - 1 / 121)).toBeLessThan(1e-8);
});

test('what is not finite ends in a trouble that says where', () => {
  const slope: Slope = (z, [y], out) => out.fill(z > 0.5 ? Number.NaN : y!);
  const march = createImplicitMarch(1, slope, 1e-10, anything);
  expect(troubleOf(() => march.march(0, 1, Float64Array.from([1])))).toBe('bed-integration');
});
