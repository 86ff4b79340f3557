import fc from 'fast-check';
import { expect, test } from 'vitest';
import { localNumbers, typedText } from '../../src/live/local-numbers.ts';

test.each([
  ['en-US', '16938 kmol/h, 3.178 mol', '16,938 kmol/h, 3.178 mol'],
  ['de-DE', '16938 kmol/h, 3.178 mol', '16.938 kmol/h, 3,178 mol'],
  ['fr-FR', '-1234567.5 kW', '-1\u202f234\u202f567,5 kW'],
  ['de-DE', '5330.00 and 1.2e-12', '5330,00 and 1,2e-12'],
  ['no-such-locale-at-all', '12345.6', '12,345.6'],
])('in %s the numbers of "%s" read "%s"', (locale, text, shown) => {
  expect(localNumbers(locale).words(text)).toBe(shown);
});

test('digits that are part of a name, a unit or a version stay as they are', () => {
  const { words } = localNumbers('de-DE');
  for (const text of ['S12345 in bed12345', 'Nm3/h', 'CH3OH', 'v0.1.0', '10.1.2'])
    expect(words(text)).toBe(text);
});

test.each([
  ['-5', 'de-DE', '-5 degC'],
  ['-5,5', 'en-US', '-5.5 degC'],
  ['-5.5', 'de-DE', '-5.5 degC'],
  ['−5 degF', 'en-US', '-5 degF'],
  ['1.234,5', 'en-US', '1234.5 degC'],
  ['1,234,567', 'de-DE', '1234567 degC'],
  ['12 345,6 K', 'fr-FR', '12345.6 K'],
  ["12'345.6", 'de-CH', '12345.6 degC'],
  ['1.5e-3 K', 'de-DE', '1.5e-3 K'],
  ['much', 'en-US', 'much'],
  ['', 'en-US', ''],
])('"%s" typed in %s means "%s"', (typed, locale, text) => {
  expect(typedText(typed, 'degC', localNumbers(locale))).toBe(text);
});

test('where a mark may part thousands or decimals nothing is guessed', () => {
  expect(typedText('5,330', 'kmol/h', localNumbers('en-US'))).toBeNull();
  expect(typedText('5.330 kmol/h', 'kmol/h', localNumbers('de-DE'))).toBeNull();
  expect(typedText('5.330', 'kmol/h', localNumbers('en-US'))).toBe('5.330 kmol/h');
});

test('what is shown in a field is taken back as it was, in every format', () => {
  const locales = fc.constantFrom('en-US', 'de-DE', 'fr-FR', 'de-CH', 'en-IN', 'pt-BR');
  fc.assert(
    fc.property(locales, fc.double({ noNaN: true, min: -1e6, max: 1e6 }), (locale, drawn) => {
      const number = Number(drawn.toPrecision(10));
      const numbers = localNumbers(locale);
      const text = typedText(String(number).replace('.', numbers.decimal), 'K', numbers);
      expect(text === null ? Number.NaN : Number(text.replace(' K', ''))).toBe(number);
    }),
  );
});
