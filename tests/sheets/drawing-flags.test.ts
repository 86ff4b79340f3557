import { expect, test } from 'vitest';
import { pressureDecimals } from '../../src/sheets/drawing/flags.ts';

test.each([
  [[200, 192, 20], 1],
  [[200, 192, 1.5], 2],
  [[32, 29.7, 31.5], 1],
  [[10, 99.9], 1],
  [[9.99, 300], 2],
  [[0.25, 1], 3],
  [[0.0001, 1], 4],
  [[], 1],
])('of pressures %j all have the decimals that the lowest needs', (pressures, decimals) => {
  expect(pressureDecimals(pressures)).toBe(decimals);
});
