import { expect, test } from 'vitest';
import { formatReaction, parseReaction } from '../../src/chemistry/reaction-text.ts';
import { coefficients, loopGas } from './stubs.ts';

function read(text: string): Float64Array {
  const parsed = parseReaction(text, loopGas);
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.faults));
  return parsed.coefficients;
}

function faults(text: string) {
  const parsed = parseReaction(text, loopGas);
  if (parsed.ok) throw new Error(`${text} was accepted`);
  return parsed.faults;
}

test.each([
  'N2 + 3 H2 <=> 2 NH3',
  'N2 + 3 H2 = 2 NH3',
  'N2+3H2->2NH3',
  'N2 + 3*H2 ⇌ 2 * NH3',
  'N2 + 3.0 H2 <-> 2. NH3',
  '  H2 + N2 + 2 H2 <=> 2NH3  ',
  'N2 + 4 H2 <=> 2 NH3 + H2',
])('"%s" is the synthesis of two ammonia', (text) => {
  expect(read(text)).toEqual(coefficients({ N2: -1, H2: -3, NH3: 2 }));
});

test('fractions are read as such, and graphite takes part', () => {
  expect(read('1/2 N2 + 3/2 H2 <=> NH3')).toEqual(coefficients({ N2: -0.5, H2: -1.5, NH3: 1 }));
  expect(read('1/3 N2 + H2 = 2/3 NH3')).toEqual(coefficients({ N2: -1 / 3, H2: -1, NH3: 2 / 3 }));
  expect(read('2 CO = C_gr + CO2')).toEqual(coefficients({ CO: -2, C_gr: 1, CO2: 1 }));
});

test('a reaction is printed the way it is written', () => {
  expect(formatReaction(read('1/2N2+1.5H2=NH3'), loopGas)).toBe('3/2 H2 + 1/2 N2 <=> NH3');
  expect(formatReaction(coefficients({ CO: -1.37, CO2: 1.37 }), loopGas)).toBe('1.37 CO <=> 1.37 CO2');
});

test('an unbalanced reaction is refused with what is missing and what would balance it', () => {
  expect(faults('N2 + 2 H2 <=> 2 NH3')).toEqual([
    {
      code: 'unbalanced-reaction',
      what: 'The reaction N2 + 2 H2 <=> 2 NH3 does not balance.',
      why: 'it has 2 more H on the right',
      mend: 'write N2 + 3 H2 <=> 2 NH3',
      offset: 0,
      length: 19,
    },
  ]);
});

test('each element that does not balance is counted', () => {
  expect(faults('CH4 + O2 <=> CO2 + H2O')[0]).toMatchObject({
    why: 'it has 2 more H on the left and 1 more O on the right',
    mend: 'write CH4 + 2 O2 <=> CO2 + 2 H2O',
  });
  expect(faults('NH3 + O2 <=> N2 + H2O')[0]!.mend).toBe('write 4 NH3 + 3 O2 <=> 2 N2 + 6 H2O');
});

test('where nothing positive balances the two sides, no coefficients are invented', () => {
  expect(faults('N2 + H2 <=> CH4')[0]).toMatchObject({
    why: 'it has 2 more N on the left, 2 more H on the right and 1 more C on the right',
    mend: 'check the components and coefficients: no positive coefficients that balance these sides were found',
  });
});

test('a coefficient rounded to a few digits does not pass as balanced', () => {
  expect(faults('0.3333 N2 + H2 <=> 0.6667 NH3')[0]!.code).toBe('unbalanced-reaction');
});

test('an unknown component is pointed at, with the nearest name', () => {
  expect(faults('N2 + 3 H2 <=> 2 NH4')).toEqual([
    {
      code: 'unknown-component',
      what: 'The reaction names the component "NH4", which is not in the list of components.',
      why: 'no component of that name; the nearest one is NH3',
      mend: 'write NH3, or add NH4 to components',
      offset: 16,
      length: 3,
    },
  ]);
});

test('several faults come at once', () => {
  expect(faults('N2 + 3 Hx8 + -1 Ar <=> 2 Q9').map((f) => [f.code, f.offset, f.length])).toEqual([
    ['reaction-syntax', 13, 5],
    ['unknown-component', 7, 3],
    ['unknown-component', 25, 2],
  ]);
});

test('a component that cancels out is refused', () => {
  expect(faults('N2 + 3 H2 + Ar <=> 2 NH3 + Ar')).toEqual([
    {
      code: 'idle-component',
      what: 'Ar stands on both sides of the reaction with the same amount.',
      why: 'it cancels out and takes no part',
      mend: 'take Ar out of the reaction; a component that is merely present needs no mention',
      offset: 12,
      length: 2,
    },
  ]);
});

test.each([
  ['N2 + 3 H2', 'there is no arrow between the two sides', 0, 9],
  ['N2 = H2 = NH3', 'there is more than one arrow', 8, 1],
  ['N2 + + H2 <=> NH3', 'a component is missing there', 4, 1],
  ['N2 + 3 H2 <=>', 'a component is missing there', 12, 1],
  ['N2 + 0 H2 <=> NH3', 'every component of a reaction takes part with a positive amount on its side', 5, 4],
  [
    'N2 + 3/0 H2 <=> NH3',
    'every component of a reaction takes part with a positive amount on its side',
    5,
    6,
  ],
  ['N2 + three H2 <=> NH3', 'a term is a positive number, or none, and a component id', 5, 8],
  ['', 'there is no arrow between the two sides', 0, 0],
])('"%s" is no equation', (text, why, offset, length) => {
  expect(faults(text)[0]).toMatchObject({ code: 'reaction-syntax', why, offset, length });
});
