import fc from 'fast-check';
import { expect, test } from 'vitest';
import { countSlips, nearest } from '../../src/diagnostics/nearest.ts';

test.each([
  ['reacter', ['mixer', 'reactor', 'heater'], 'reactor'],
  ['condensor', ['converter', 'condenser'], 'condenser'],
  ['nh3', ['N2', 'NH3'], 'NH3'],
  ['NH', ['N2', 'NH3'], 'NH3'],
  ['temprature', ['pressure', 'temperature'], 'temperature'],
  ['mixre', ['mixer'], 'mixer'],
])('%s was meant from %j to be %s', (name, candidates, meant) => {
  expect(nearest(name, candidates)).toBe(meant);
});

test('a name like none of them is not guessed at', () => {
  expect(nearest('distillation', ['mixer', 'reactor'])).toBeNull();
  expect(nearest('x', [])).toBeNull();
});

test('a swap of neighbours is one slip, and slips count the same both ways', () => {
  expect(countSlips('ab', 'ba')).toBe(1);
  fc.assert(
    fc.property(fc.string({ maxLength: 12 }), fc.string({ maxLength: 12 }), (a, b) => {
      expect(countSlips(a, b)).toBe(countSlips(b, a));
      expect(countSlips(a, a)).toBe(0);
      expect(countSlips(a, b)).toBeLessThanOrEqual(Math.max(a.length, b.length));
    }),
  );
});

test('equal but for upper and lower case goes before fewer slips', () => {
  expect(nearest('SRK', ['SR', 'srk'])).toBe('srk');
});
