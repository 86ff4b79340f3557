import { expect, test } from 'vitest';
import { atomicWeight, molarMass, parseFormula } from '../../src/properties/chemical-formula.ts';
import { expectRelative } from './expect-relative.ts';

test.each([
  ['NH3', { N: 1, H: 3 }],
  ['C2H5OH', { C: 2, H: 6, O: 1 }],
  ['Ca(OH)2', { Ca: 1, O: 2, H: 2 }],
  ['N2O4', { N: 2, O: 4 }],
  ['CO', { C: 1, O: 1 }],
  ['Co', { Co: 1 }],
  ['(NH2)2CO', { N: 2, H: 4, C: 1, O: 1 }],
  ['Al2(S(O2)2)3', { Al: 2, S: 3, O: 12 }],
])('%s contains the atoms it names', (text, elements) => {
  expect(parseFormula(text)).toEqual({ ok: true, elements });
});

const mend = 'write element symbols with their counts, brackets allowed, for example C2H5OH or Ca(OH)2';

test.each([
  ['nh3', '"n" cannot stand here', 0, 1],
  ['NH3!', '"!" cannot stand here', 3, 1],
  ['CXy4', '"Xy" is not an element known here', 1, 2],
  ['Ca(OH', 'this bracket is never closed', 2, 1],
  ['CaOH)2', 'this bracket was never opened', 4, 1],
  ['', 'the formula contains no atoms', 0, 1],
  ['H0', 'the formula contains no atoms', 0, 2],
])('the formula "%s" is refused and the place shown', (text, why, offset, length) => {
  expect(parseFormula(text)).toEqual({
    ok: false,
    what: `The formula "${text}" cannot be read.`,
    why,
    mend,
    offset,
    length,
  });
});

test('molar masses are sums of atomic weights', () => {
  // 2 x 14.007 + 4 x 1.008 + 12.011 + 15.999
  expectRelative(molarMass({ N: 2, H: 4, C: 1, O: 1 }), 60.056e-3, 1e-12);
  expect(atomicWeight('Xy')).toBeUndefined();
  expect(() => molarMass({ Xy: 1 })).toThrow('no atomic weight of Xy');
});
