import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { liquidRoot, vapourRoot } from '../../src/properties/cubic-root.ts';

const forms = [
  { name: 'Soave-Redlich-Kwong', u: 1, w: 0 },
  { name: 'Peng-Robinson', u: 2, w: -1 },
];

function residual(Z: number, A: number, B: number, u: number, w: number): number {
  const c2 = (u - 1) * B - 1;
  const c1 = A + w * B * B - u * B * (B + 1);
  const c0 = -(A * B + w * B * B * (B + 1));
  return ((Z + c2) * Z + c1) * Z + c0;
}

describe.each(forms)('the vapour root of $name', ({ u, w }) => {
  test('solves the cubic, lies above B, and no larger root exists', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -9, max: 1, noNaN: true }),
        fc.double({ min: 0, max: 12, noNaN: true }),
        (logB, ratio) => {
          const B = 10 ** logB;
          const A = ratio * B;
          const Z = vapourRoot(A, B, u, w);
          const scale = 1 + A + 10 * B + B * B + B * B * B;
          expect(Z).toBeGreaterThan(B);
          expect(Math.abs(residual(Z, A, B, u, w))).toBeLessThan(1e-13 * scale * Math.max(1, Z ** 2));
          // the cubic is positive beyond its largest root
          for (const factor of [1 + 1e-5, 1.01, 1.5, 4]) {
            expect(residual(Z * factor, A, B, u, w)).toBeGreaterThan(-1e-13 * scale * Math.max(1, Z ** 2));
          }
        },
      ),
      { numRuns: 2000 },
    );
  });

  test('goes to 1 + B − A at low pressure', () => {
    expect(vapourRoot(3e-7, 1e-7, u, w)).toBeCloseTo(1 - 2e-7, 12);
  });
});

test('at the critical point of Soave-Redlich-Kwong the triple root is 1/3', () => {
  const Z = vapourRoot(0.42748023354034137, 0.08664034996495773, 1, 0);
  // a triple root is only found to the cube root of the machine's precision
  expect(Z).toBeCloseTo(1 / 3, 4);
});

test('just either side of critical the root stays finite and moves little', () => {
  for (const factor of [1 - 1e-9, 1, 1 + 1e-9]) {
    const Z = vapourRoot(0.42748023354034137 * factor, 0.08664034996495773, 1, 0);
    expect(Math.abs(Z - 1 / 3)).toBeLessThan(2e-3);
  }
});

describe.each(forms)('the liquid root of $name', ({ u, w }) => {
  test('solves the cubic, lies above B, and no smaller root lies there', () => {
    let apart = 0;
    fc.assert(
      fc.property(
        fc.integer({ min: -9000, max: 1000 }),
        fc.integer({ min: 0, max: 12_000 }),
        (logB, ratio) => {
          const B = 10 ** (logB / 1000);
          const A = (ratio / 1000) * B;
          const Z = liquidRoot(A, B, u, w);
          expect(Z).toBeGreaterThan(B);
          expect(Z).toBeLessThanOrEqual(vapourRoot(A, B, u, w) * (1 + 1e-7));
          if (Z < 0.9 * vapourRoot(A, B, u, w)) apart += 1;
          // between B and the root the cubic keeps its sign: -2 B² at B
          for (const part of [0.1, 0.5, 0.9, 0.999]) {
            expect(residual(B + part * (Z - B), A, B, u, w)).toBeLessThan(1e-13 * Z * (Z + A));
          }
          // of a dense liquid to nearly all digits, however small it is beside the vapour's root
          const slope =
            (residual(Z * (1 + 1e-6), A, B, u, w) - residual(Z * (1 - 1e-6), A, B, u, w)) / (2e-6 * Z);
          if (Z < 2 * B) expect(Math.abs(residual(Z, A, B, u, w) / slope)).toBeLessThan(1e-12 * Z);
        },
      ),
      { numRuns: 2000, endOnFailure: true },
    );
    expect(apart).toBeGreaterThan(100);
  });

  test("is the vapour's where there is no other", () => {
    expect(liquidRoot(3e-7, 1e-7, u, w)).toBe(vapourRoot(3e-7, 1e-7, u, w));
    expect(liquidRoot(2, 0.9, u, w)).toBe(vapourRoot(2, 0.9, u, w));
  });
});
