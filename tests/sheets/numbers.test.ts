import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  closureText,
  decimalsFor,
  fixed,
  percent,
  settingText,
  significant,
} from '../../src/sheets/numbers.ts';

describe('a number on a sheet', () => {
  test.each([
    [0, '0'],
    [6500, '6500.0'],
    [123456.789, '123457'],
    [99999.96, '100000'],
    [0.123456, '0.12346'],
    [-48210.44, '-48210'],
    [1.26e-7, '1.3e-7'],
    [3.2e12, '3.2e+12'],
    [Number.NaN, '-'],
    [null, '-'],
  ])('%d reads %s', (value, text) => {
    expect(significant(value)).toBe(text);
  });

  test('keeps its value to the digits shown, whatever its size', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e8, max: 1e8, noNaN: true }), (value) => {
        fc.pre(Math.abs(value) > 1e-3);
        expect(Math.abs(Number(significant(value, 5)) - value) / Math.abs(value)).toBeLessThan(0.6e-4);
      }),
    );
  });

  test('is never shown as minus zero, and a trace is never shown as nothing', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), fc.nat(4), (value, decimals) => {
        const text = fixed(value, decimals);
        expect(text).not.toMatch(/^-0\.?0*$/);
        if (value !== 0) expect(Number(text)).not.toBe(0);
      }),
    );
  });

  test('in a column: noise is 0, a trace has an exponent, the rest the same decimals', () => {
    expect([6500, 0.8, 3.1e-5, 2e-13, 0, Number.NaN].map((value) => fixed(value, 2, 1e-10))).toEqual([
      '6500.00',
      '0.80',
      '3.1e-5',
      '0',
      '0',
      '-',
    ]);
  });

  test('the decimals of a column follow its largest number', () => {
    expect(decimalsFor([26547.1, 0.3], 6, 2, 4)).toBe(2);
    expect(decimalsFor([1.5], 6, 2, 4)).toBe(4);
    expect(decimalsFor([], 6, 2, 4)).toBe(2);
  });

  test('a fraction is shown in per cent, a closure with one decimal and an exponent', () => {
    expect(percent(0.97314)).toBe('97.31 %');
    expect(percent(1e-6)).toBe('1.0e-4 %');
    expect(closureText(-1.234e-12)).toBe('-1.2e-12');
    expect(closureText(0)).toBe('0');
  });

  test('a setting is shown in the unit the trade uses, an approach stays a difference', () => {
    expect(settingText('condenser.temperature', 268.15, 'K')).toBe('-5.00 degC');
    expect(settingText('converter.reactions.synthesis.approach', 10, 'K')).toBe('10.000 K');
    expect(settingText('circulator.pressure', 2e7, 'Pa')).toBe('200.00 bar');
    expect(settingText('purge.fractions.bleed', 0.031, '')).toBe('3.10 %');
  });
});
