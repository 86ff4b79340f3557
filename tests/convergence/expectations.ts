import { expect } from 'vitest';

/** Largest |found − wanted| / max(1, |wanted|): the size that tolerances without a scale of their own refer to. */
export function scaledDistance(found: ArrayLike<number>, wanted: ArrayLike<number>): number {
  expect(found.length).toBe(wanted.length);
  let most = 0;
  for (let i = 0; i < wanted.length; i++) {
    most = Math.max(most, Math.abs(found[i] - wanted[i]) / Math.max(1, Math.abs(wanted[i])));
  }
  return most;
}
