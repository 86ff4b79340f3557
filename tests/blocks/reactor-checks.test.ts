import { expect, test } from 'vitest';
import { reactionFaults } from '../../src/blocks/reactor-checks.ts';
import { components, reaction } from './helpers.ts';

const list = components('CO', 'CO2', 'H2', 'H2O', 'CH3OH');
const known = {
  components: list,
  reactions: [
    reaction('methanol', 'CO + 2 H2 <=> CH3OH', list),
    reaction('shift', 'CO + H2O <=> CO2 + H2', list),
    reaction('from_dioxide', 'CO2 + 3 H2 <=> CH3OH + H2O', list),
  ],
};

test('sound settings have no fault', () => {
  expect(reactionFaults({ methanol: { approach: 10 }, shift: { conversion: 0.3, of: 'CO' } }, known)).toEqual(
    [],
  );
});

test('a reactor without a reaction is a vessel that does nothing', () => {
  expect(reactionFaults({}, known)).toEqual([
    {
      path: ['reactions'],
      code: 'missing-setting',
      what: 'The reactor runs no reaction.',
      why: 'a vessel without reaction changes nothing',
      mend: 'name at least one reaction, e.g. reactions: {synthesis: {approach: 10 K}}',
    },
  ]);
});

test('a mistyped reaction brings the nearest name', () => {
  expect(reactionFaults({ methanl: {} }, known)).toEqual([
    {
      path: ['reactions', 'methanl'],
      code: 'unknown-reaction',
      what: 'There is no reaction "methanl" in this flowsheet.',
      why: 'the nearest reaction is methanol',
      mend: 'write methanol',
    },
  ]);
});

test('a reaction runs to a conversion or to equilibrium, not both', () => {
  expect(reactionFaults({ shift: { conversion: 0.3, of: 'CO', approach: 5 } }, known)).toEqual([
    {
      path: ['reactions', 'shift', 'approach'],
      code: 'too-many-settings',
      what: 'Reaction shift has both a conversion and an approach.',
      why: 'a reaction runs either to a set conversion or to equilibrium',
      mend: 'take one of them out',
    },
  ]);
});

test('a key reactant without a conversion is idle', () => {
  expect(reactionFaults({ shift: { of: 'CO' } }, known).map(({ code, path }) => [code, path])).toEqual([
    ['idle-setting', ['reactions', 'shift', 'of']],
  ]);
});

test('a conversion needs its key reactant, and that must be one', () => {
  expect(reactionFaults({ shift: { conversion: 0.3 } }, known)).toEqual([
    {
      path: ['reactions', 'shift'],
      code: 'missing-setting',
      what: 'The conversion of shift does not say what it refers to.',
      why: 'the reactants of CO + H2O <=> CO2 + H2 are CO and H2O',
      mend: 'write of: CO',
    },
  ]);
  expect(
    reactionFaults({ shift: { conversion: 0.3, of: 'H2' } }, known).map(({ code, what }) => [code, what]),
  ).toEqual([['not-a-reactant', 'H2 is not a reactant of shift.']]);
});

test('an equilibrium that is the sum of two others is named; as a conversion it may stay', () => {
  expect(reactionFaults({ methanol: {}, shift: {}, from_dioxide: {} }, known)).toEqual([
    {
      path: ['reactions', 'from_dioxide'],
      code: 'dependent-reaction',
      what: 'Equilibrium from_dioxide is a sum of the other equilibria of this reactor.',
      why: 'it follows from them, and with another constant or approach it would contradict them',
      mend: 'take it out; the others already carry it',
    },
  ]);
  expect(
    reactionFaults({ methanol: {}, shift: {}, from_dioxide: { conversion: 0.1, of: 'CO2' } }, known),
  ).toEqual([]);
});
