import { expect } from 'vitest';

/** Expect a value within a relative tolerance of another; `floor` is the size below which it counts absolutely. */
export function expectRelative(actual: number, wanted: number, tolerance: number, floor = 0): void {
  const allowed = tolerance * Math.max(Math.abs(wanted), floor);
  expect(Math.abs(actual - wanted), `${actual} against ${wanted}, allowed ${allowed}`).toBeLessThanOrEqual(
    allowed,
  );
}
