import { all, create } from 'mathjs';
import { describe, expect, test } from 'vitest';
import { compileFormula } from '../../src/units/formula.ts';
import { formulaFunctions } from '../../src/units/formula-functions.ts';
import { loadUnitEngine, parseQuantity } from '../../src/units/quantity.ts';

const math = create(all, {}) as unknown as Record<string, unknown>;
/** Everything that an expression of mathjs could name: functions, constants, units with their prefixes, parser words. */
const offered = [
  ...new Set([
    ...Object.keys(math),
    ...Object.keys(math['expression'] as object),
    ...Object.keys((math['expression'] as { docs?: object }).docs ?? {}),
    ...Object.keys((math['Unit'] as { UNITS: object }).UNITS),
    ...Object.getOwnPropertyNames(Object.prototype),
    ...Object.getOwnPropertyNames(Function.prototype),
    ...Object.getOwnPropertyNames(globalThis),
    ...[
      'true',
      'false',
      'null',
      'undefined',
      'end',
      'this',
      'new',
      'ans',
      'require',
      'module',
      'eval',
      'let',
      'not',
    ],
  ]),
].filter((name) => /^[A-Za-z_]\w*$/.test(name));
const listed: readonly string[] = [...formulaFunctions.keys()];
const constants = ['pi', 'e'];

test('a formula has ten functions and two constants', () => {
  expect(listed).toEqual(['abs', 'min', 'max', 'sqrt', 'exp', 'log', 'ln', 'log10', 'pow', 'round']);
  for (const name of constants) expect(compileFormula(name, ['T']).ok, name).toBe(true);
});

test('mathjs offers hundreds of names, each of which is refused unless it is listed', () => {
  expect(offered.length).toBeGreaterThan(500);
  for (const name of [
    'import',
    'createUnit',
    'evaluate',
    'parse',
    'compile',
    'simplify',
    'derivative',
    'factorial',
  ]) {
    expect(offered).toContain(name);
  }
  const roots = ['streams', 'blocks', 'figures'];
  const accepted = new Set<string>();
  for (const name of offered) {
    for (const values of ['', '1', '1, 2', '1, 2, 3', 'streams.S1.T']) {
      if (compileFormula(`${name}(${values})`, roots).ok) accepted.add(name);
    }
    for (const text of [name, `${name}.x`, `streams.${name}(1)`, `2 * ${name}`, `1 ${name} 2`, `2 ${name}`]) {
      if (compileFormula(text, roots).ok && !constants.includes(name)) accepted.add(text);
    }
  }
  expect([...accepted].toSorted()).toEqual(listed.filter((name) => offered.includes(name)).toSorted());
});

test('a function takes as many values as the list says, and no text, list or function', () => {
  for (const [name, { least, most }] of formulaFunctions) {
    const call = (count: number) =>
      compileFormula(`${name}(${Array.from({ length: count }, () => '2').join(',')})`, []).ok;
    for (let count = 0; count <= most + 1; count++) {
      expect(call(count), `${name} of ${count}`).toBe(count >= least && count <= most);
    }
    for (const value of ['"2"', '[2]', '{a: 2}', name, 'x -> x', '2:3', '()']) {
      expect(compileFormula(`${name}(${value})`, []).ok, `${name}(${value})`).toBe(false);
    }
  }
});

describe('a formula costs little whatever it says:', () => {
  const hostile: Readonly<Record<string, string>> = {
    'brackets 100,000 deep': `${'('.repeat(100_000)}1${')'.repeat(100_000)}`,
    'brackets as deep as its length allows': `${'('.repeat(499)}1${')'.repeat(499)}`,
    'functions inside functions': `${'abs('.repeat(190)}1${')'.repeat(190)}`,
    'signs in a row': '-'.repeat(999),
    'powers of powers': '9^'.repeat(499),
    'a million names': 'streams.S1.T+'.repeat(77_000),
    'a name of a million letters': 'a'.repeat(1_000_000),
    'a name of 300 parts': `streams${'.a'.repeat(300)}(1)`,
    'commas without end': `min(${'1,'.repeat(480)}1)`,
    'digits without end': '9'.repeat(1_000_000),
  };
  test.each(Object.keys(hostile))('%s', (name) => {
    const start = performance.now();
    expect(compileFormula(hostile[name]!, ['streams']).ok).toBe(false);
    expect(performance.now() - start).toBeLessThan(500);
  });

  test('the largest that is accepted is evaluated in no time, to a number or to none', () => {
    const largest = [
      '9^9^9^9^9^9',
      `${'9^'.repeat(29)}9`,
      `1${'+pow(9,9)'.repeat(110)}`,
      'exp(exp(exp(9)))',
      'round(1, 400)',
    ];
    for (const text of largest) {
      const compiled = compileFormula(text, []);
      if (!compiled.ok) throw new Error(`${text}: ${compiled.what}`);
      const start = performance.now();
      for (let k = 0; k < 1000; k++) expect(typeof compiled.evaluate({})).toBe('number');
      expect(performance.now() - start).toBeLessThan(2000);
    }
  });
});

test('names are looked up among the own parts of a scope, with a prototype or without', () => {
  const compiled = compileFormula('streams.S1.T', ['streams']);
  if (!compiled.ok) throw new Error(compiled.what);
  const own = Object.assign(Object.create(null), { streams: { S1: { T: 300 } } });
  expect(compiled.evaluate(own)).toBe(300);
  expect(compiled.evaluate(Object.create(own))).toBeNaN();
  expect(compiled.evaluate({ streams: Object.create({ S1: { T: 300 } }) })).toBeNaN();
  expect(compiled.evaluate({ streams: { S1: { T: () => 300 } } })).toBeNaN();
});

describe('no expression hides in a unit:', () => {
  test.each([
    '5 import("fs")',
    '5 import({bar: 1})',
    '5 createUnit("foo")',
    '5 createUnit(foo)',
    '5 evaluate(bar)',
    '5 bar + 5 bar',
    '5 bar; createUnit("x")',
    '5 [bar, bar]',
    '5 {bar: 1}',
    '5 sqrt(bar^2)',
    '5 bar to Pa',
    '5 bar in Pa',
    '5 9^9^9 bar',
    '9^9^9 bar',
    '5 bar^9^9^9',
    '5 bar^999999999',
    '5 bar^(1/0)',
    '5 bar^-99999',
    '5 bar/bar/bar*bar*bar*bar^5',
    '1e999 bar',
    '5 2 bar',
    '5 bar bar',
    '5 toString',
    '5 constructor',
    '5 __proto__',
    '5 hasOwnProperty',
    '5 (((((((((((((((((((((((((((((((((((bar',
    `5 ${'('.repeat(10_000)}bar`,
    `5 ${'bar*'.repeat(10_000)}bar`,
    `5 ${'kilo'.repeat(10_000)}bar`,
    `${'5'.repeat(400)} bar`,
    '5 bar\u0000',
    '5 bar\n6 bar',
    '5 $bar',
    '5 `bar`',
    '5 bar//bar*bar',
    '5 /bar',
    '5 ^2 bar',
  ])('%j', async (text) => {
    await loadUnitEngine();
    const start = performance.now();
    expect(parseQuantity(text, 'pressure').ok).toBe(false);
    expect(performance.now() - start).toBeLessThan(500);
  });

  test('units of mathjs stay as they are, whatever was asked', async () => {
    await loadUnitEngine();
    for (const text of ['5 createUnit(brr)', '5 bar = 3 Pa', '5 import(brr)'])
      parseQuantity(text, 'pressure');
    expect(parseQuantity('5 brr', 'pressure').ok).toBe(false);
    expect(parseQuantity('5 decibar', 'pressure')).toEqual({ ok: true, value: 50_000 });
  });
});
