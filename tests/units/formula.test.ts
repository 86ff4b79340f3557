import fc from 'fast-check';
import { all, create } from 'mathjs';
import { expect, test } from 'vitest';
import { compileFormula } from '../../src/units/formula.ts';

const roots = ['streams', 'T'];
const scope = { streams: { S2: { y: { Ar: 0.1, CH4: 0.02 }, T: 300 } }, T: 700 };

function evaluated(text: string): number {
  const compiled = compileFormula(text, roots);
  if (!compiled.ok) throw new Error(`${text}: ${compiled.what}`);
  return compiled.evaluate(scope);
}

test.each([
  ['1 + 2 * 3', 7],
  ['-2^2', -4],
  ['2^3^2', 512],
  ['2^-1', 0.5],
  ['8 / 4 / 2', 1],
  ['1 - 2 - 3', -4],
  ['(1 + 2) * 3', 9],
  ['streams.S2.y.Ar + streams.S2.y.CH4', 0.12000000000000001],
  ['4577.8/T - 4.33', 4577.8 / 700 - 4.33],
  ['ln(e)', 1],
  ['log(e)', 1],
  ['log10(1000)', 3],
  ['min(3, 1, 2) + max(3, 1, 2)', 4],
  ['sqrt(16) + abs(-3) + pow(2, 3)', 15],
  ['round(3.14159, 2)', 3.14],
  ['2 * pi', 2 * Math.PI],
])('%s is %d', (text, expected) => {
  expect(evaluated(text)).toBeCloseTo(expected, 12);
});

test('a formula computes what mathjs computes', () => {
  const { evaluate } = create(all, {});
  const { expression } = fc.letrec<{ expression: string }>((tie) => ({
    expression: fc.oneof(
      { depthSize: 'small', withCrossShrink: true },
      fc.double({ min: 0.1, max: 9, noNaN: true }).map((x) => x.toFixed(3)),
      fc.constantFrom('T', 'streams.S2.T', 'pi'),
      fc
        .tuple(tie('expression'), fc.constantFrom('+', '-', '*', '/', ' - ', ' * '), tie('expression'))
        .map((parts) => parts.join('')),
      tie('expression').map((inner) => `(${inner})`),
      tie('expression').map((inner) => `-${inner}`),
      fc.tuple(tie('expression'), fc.constantFrom('2', '-1', '0.5')).map(([base, n]) => `abs(${base})^${n}`),
      fc
        .tuple(fc.constantFrom('exp', 'sqrt', 'log10'), tie('expression'))
        .map(([f, x]) => `${f}(abs(${x})/1000)`),
      fc.tuple(tie('expression'), tie('expression')).map(([a, b]) => `min(${a}, ${b})`),
    ),
  }));
  fc.assert(
    fc.property(expression, (text) => {
      fc.pre(text.length < 900);
      const expected: number = evaluate(text, structuredClone(scope));
      const actual = evaluated(text);
      if (Number.isFinite(expected)) {
        expect(Math.abs(actual - expected)).toBeLessThanOrEqual(1e-12 * Math.abs(expected));
      } else expect(Number.isFinite(actual)).toBe(false);
    }),
    { numRuns: 300 },
  );
});

test('the names of a formula are told with their places', () => {
  const text = ' T * streams.S2.y.Ar';
  const compiled = compileFormula(text, roots);
  expect(compiled.ok && compiled.names).toEqual([
    { parts: ['T'], offset: 1, length: 1 },
    { parts: ['streams', 'S2', 'y', 'Ar'], offset: 5, length: 15 },
  ]);
});

test('a name that leads nowhere is not a number', () => {
  expect(evaluated('streams.S9.y.Ar')).toBeNaN();
  expect(evaluated('streams.S2.y')).toBeNaN();
  expect(evaluated('streams.S2.toString')).toBeNaN();
  expect(evaluated('streams.S2.y.hasOwnProperty')).toBeNaN();
});

test.each([
  'streams.constructor',
  'streams.S2.__proto__.x',
  'streams.S2.prototype',
  '__proto__',
  'constructor.constructor("return process")()',
  'streams.S2.constructor(1)',
  'f(x) = x',
  'a = 1',
  'T = 5',
  'T == 5',
  'T; T',
  'import("fs")',
  'evaluate(1)',
  'parse(1)',
  'createUnit(1)',
  '[1, 2]',
  '{a: 1}',
  '"text"',
  'T ? 1 : 2',
  'T > 3',
  'not T',
  'T to K',
  'T mod 2',
  'T!',
  "T'",
  '5 %',
  '2 T',
  '(T)(3)',
  'streams[T]',
  'streams["S2"]',
  'process.exit(1)',
  'globalThis',
  'this',
  'Infinity',
  'NaN',
  '1e999',
  '0x10',
  '1..2',
  'T +',
  '(1',
  '1)',
  '',
  ' ',
  'abs()',
  'pow(1)',
  'abs',
  '`T`',
  'T\u0000',
  '\u202eT',
  `${'('.repeat(300)}1${')'.repeat(300)}`,
  `${'-'.repeat(400)}1`,
  `1${'+1'.repeat(900)}`,
])('%j is refused', (text) => {
  const compiled = compileFormula(text, roots);
  expect(compiled.ok).toBe(false);
  if (compiled.ok) return;
  expect(compiled.offset).toBeGreaterThanOrEqual(0);
  expect(compiled.offset + compiled.length).toBeLessThanOrEqual(Math.max(text.length, 1));
  for (const part of [compiled.what, compiled.why, compiled.mend]) expect(part.length).toBeGreaterThan(3);
});

test('no text makes the compiler throw', () => {
  const junk = fc.string({
    unit: fc.constantFrom(...'0123456789.eE+-*/^(),T abs streams.S2_%="[]{};:\\'),
    maxLength: 80,
  });
  fc.assert(
    fc.property(fc.oneof(fc.string(), junk), (text) => {
      const compiled = compileFormula(text, roots);
      if (compiled.ok) expect(typeof compiled.evaluate(scope)).toBe('number');
    }),
    { numRuns: 3000 },
  );
});
