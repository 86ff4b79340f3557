import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  type AlphaRoot,
  hydrogenAlpha,
  pengRobinsonSlope,
  soaveSlope,
  squareRootAlpha,
} from '../../src/properties/cubic-alpha.ts';

const forms: readonly { name: string; alpha: AlphaRoot }[] = [
  { name: 'nitrogen, Soave', alpha: squareRootAlpha(126.192, soaveSlope(0.0372)) },
  { name: 'ammonia, Soave', alpha: squareRootAlpha(405.56, soaveSlope(0.25569)) },
  { name: 'hydrogen, Graboski and Daubert', alpha: hydrogenAlpha(33.145) },
  { name: 'hydrogen, Peng-Robinson', alpha: squareRootAlpha(33.145, pengRobinsonSlope(-0.219)) },
  { name: 'helium, classical constants', alpha: squareRootAlpha(10.47, soaveSlope(0)) },
  { name: 'a gas with acentric factor −0.38', alpha: squareRootAlpha(5.2, pengRobinsonSlope(-0.38)) },
];

describe.each(forms)('the attraction of $name', ({ alpha }) => {
  test('is positive and never rises from 50 K to 3000 K', () => {
    fc.assert(
      fc.property(fc.double({ min: 50, max: 2999, noNaN: true }), (T) => {
        expect(alpha.value(T)).toBeGreaterThan(0);
        expect(alpha.slope(T)).toBeLessThanOrEqual(0);
        expect(alpha.value(T + 1)).toBeLessThanOrEqual(alpha.value(T));
      }),
    );
  });

  test('has the slope that finite differences give', () => {
    fc.assert(
      fc.property(fc.double({ min: 60, max: 2500, noNaN: true }), (T) => {
        const h = 1e-4 * T;
        const difference = (alpha.value(T + h) - alpha.value(T - h)) / (2 * h);
        // the joint of the continuation has a step in the second derivative: error of order h there
        expect(Math.abs(difference - alpha.slope(T))).toBeLessThan(1e-3 * Math.abs(alpha.slope(T)) + 1e-12);
      }),
    );
  });
});

test.each(forms)('the curvature of $name is the slope of its slope', ({ alpha }) => {
  fc.assert(
    fc.property(fc.double({ min: 60, max: 2500, noNaN: true }), (T) => {
      const h = 1e-4 * T;
      // the joint of the continuation is the one place with a step in the curvature
      if (alpha.value(T - h) > 0.1 && alpha.value(T + h) < 0.1) return;
      const difference = (alpha.slope(T + h) - alpha.slope(T - h)) / (2 * h);
      expect(Math.abs(difference - alpha.curvature(T))).toBeLessThan(
        1e-5 * Math.abs(alpha.curvature(T)) + 1e-15,
      );
    }),
  );
});

test('at the critical temperature the square-root form is 1', () => {
  expect(squareRootAlpha(405.56, soaveSlope(0.25569)).value(405.56)).toBe(1);
});

test('hydrogen follows 1.202 exp(−0.30288 Tr)', () => {
  expect(hydrogenAlpha(33.145).value(331.45) ** 2).toBeCloseTo(1.202 * Math.exp(-3.0288), 12);
});
