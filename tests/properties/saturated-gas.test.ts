import { expect, test } from 'vitest';
import { builtInIds } from '../../src/properties/components.ts';
import { saturatedGasCompressibility } from '../../src/properties/saturated-gas.ts';
import { readTable } from '../published/read-table.ts';
import { expectRelative } from './expect-relative.ts';
import { componentsOf } from './mixture-of.ts';

const rows = readTable('liquid-saturation.csv');
const tabulated = componentsOf(...builtInIds).filter((c) => (c.liquid?.tableK.length ?? 0) > 1);

test('the saturated gas has the compressibility of its table', () => {
  let checked = 0;
  for (const c of tabulated) {
    for (const row of rows.filter((one) => one['id'] === c.id && one['Z_vapour'] !== '')) {
      // a row on the table's end may differ from it in the last printed digit of T
      expectRelative(saturatedGasCompressibility(c, Number(row['T_K']))!, Number(row['Z_vapour']), 2e-4);
      checked += 1;
    }
  }
  expect(checked).toBeGreaterThan(300);
});

test('it never jumps, from deep cold to far above the critical temperature', () => {
  for (const c of tabulated) {
    const criticalK = c.critical!.temperatureK;
    let last = saturatedGasCompressibility(c, 0.2 * criticalK)!;
    const step = 1e-5 * criticalK;
    for (let T = 0.2 * criticalK; T < 1.1 * criticalK; T += step) {
      const Z = saturatedGasCompressibility(c, T)!;
      // the square root before the critical point falls by a tenth of a per cent in the last such step
      expect(Math.abs(Z - last), `${c.id} at ${T} K`).toBeLessThan(0.006);
      last = Z;
    }
  }
});

test('at the critical point it comes to what a dense fluid has there', () => {
  // Critical compressibilities of normal and polar fluids lie between 0.22 and 0.31 (common practice); the way from
  // 0.97 of the critical temperature is a guess and ends somewhat above.
  for (const c of tabulated) {
    const Z = saturatedGasCompressibility(c, c.critical!.temperatureK)!;
    expect(Z, c.id).toBeGreaterThan(0.22);
    expect(Z, c.id).toBeLessThan(0.37);
  }
});

test('without a table nothing is said', () => {
  const [c] = componentsOf('SO3');
  expect(saturatedGasCompressibility(c!, 300)).toBeNull();
});
