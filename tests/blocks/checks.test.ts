import { expect, test } from 'vitest';
import { exactlyOne, knownComponents, listed, pressureAfterDrop } from '../../src/blocks/checks.ts';
import { components, troubleOf } from './helpers.ts';

const examples = { temperature: 'temperature: 5 degC', adiabatic: 'adiabatic: true', duty: 'duty: 1 kW' };

test('one of several settings is enough; a false one does not count', () => {
  expect(exactlyOne({ temperature: 278.15 }, examples)).toEqual([]);
  expect(exactlyOne({ temperature: 278.15, adiabatic: false }, examples)).toEqual([]);
  expect(exactlyOne({ duty: 0 }, examples)).toEqual([]);
});

test('none or several are a fault that lists them', () => {
  expect(exactlyOne({}, examples)).toEqual([
    {
      path: [],
      code: 'missing-setting',
      what: 'None of temperature, adiabatic and duty is given.',
      why: 'one of them fixes what this block does',
      mend: 'add one, e.g. temperature: 5 degC',
    },
  ]);
  expect(exactlyOne({ adiabatic: true, duty: 5 }, examples)).toEqual([
    {
      path: ['duty'],
      code: 'too-many-settings',
      what: 'adiabatic and duty are given together.',
      why: 'only one of temperature, adiabatic and duty can be free to choose; the others follow from the balance',
      mend: 'keep one and take out the rest',
    },
  ]);
});

test('an unknown component is named with its place and the nearest known', () => {
  const faults = knownComponents(['NH3', 'NH33', 'unobtainium'], components('H2', 'NH3'), (_, index) => [
    'condense',
    index,
  ]);
  expect(faults).toEqual([
    {
      path: ['condense', 1],
      code: 'unknown-component',
      what: '"NH33" is not a component of this flowsheet.',
      why: 'the nearest component is NH3',
      mend: 'write NH3',
    },
    {
      path: ['condense', 2],
      code: 'unknown-component',
      what: '"unobtainium" is not a component of this flowsheet.',
      why: 'the components are H2, NH3',
      mend: 'add unobtainium to components or take it out here',
    },
  ]);
});

test('a pressure drop leaves a pressure above zero or is refused', () => {
  expect(pressureAfterDrop(2e5, undefined)).toBe(2e5);
  expect(pressureAfterDrop(2e5, 5e4)).toBe(1.5e5);
  expect(troubleOf(() => pressureAfterDrop(2e5, 2e5))).toBe('pressure-drop');
});

test('names are listed as one says them', () => {
  expect([listed([]), listed(['a']), listed(['a', 'b']), listed(['a', 'b', 'c'])]).toEqual([
    '',
    'a',
    'a and b',
    'a, b and c',
  ]);
});
