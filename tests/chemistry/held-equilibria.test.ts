import fc from 'fast-check';
import { expect, test } from 'vitest';
import { holdBackEquilibria } from '../../src/chemistry/held-equilibria.ts';
import { builtInComponent } from '../../src/properties/components.ts';

const ids = ['CO', 'H2', 'CO2', 'H2O', 'CH3OH'];
const components = ids.map((id) => builtInComponent(id)!);
const methanol = Float64Array.of(-1, -2, 0, 0, 1);
const shift = Float64Array.of(1, -1, -1, 1, 0);
const feed = Float64Array.of(10, 60, 8, 1, 0.5);
const held = (first: number, second: number) => [
  { name: 'methanol', coefficients: methanol, fraction: first },
  { name: 'reverse_shift', coefficients: shift, fraction: second },
];
const at = (one: number, two: number) => feed.map((n, i) => n + methanol[i]! * one + shift[i]! * two);

test('each reaction keeps its share of its extent', () => {
  const share = fc.double({ min: 0, max: 1, noNaN: true });
  fc.assert(
    fc.property(share, share, (first, second) => {
      const amounts = at(4, 3);
      const extents = Float64Array.of(4, 3);
      holdBackEquilibria(held(first, second), components, amounts, extents);
      expect([...extents]).toEqual([4 * first, 3 * second]);
      at(4 * first, 3 * second).forEach((n, i) => {
        expect(Math.abs(amounts[i]! - n)).toBeLessThan(1e-12);
      });
    }),
  );
});

test('a fraction of 1 changes not a digit', () => {
  const amounts = at(4, 3);
  holdBackEquilibria(held(1, 1), components, amounts, Float64Array.of(4, 3));
  expect(amounts).toEqual(at(4, 3));
});

test('a reactant that another, held back, has not made is refused', () => {
  // all 10 CO and 2 more from the shift go to methanol; with the shift held back to nothing they are not there
  expect(() => holdBackEquilibria(held(1, 0), components, at(12, 3), Float64Array.of(12, 3))).toThrow(
    expect.objectContaining({
      code: 'reactant-used-up',
      message: 'The fractions of equilibrium of methanol, reverse_shift leave less than nothing of CO.',
      why: 'one of them takes CO that another, held back, has not made',
      mend: 'give the reactions in which CO takes part the same fraction_of_equilibrium',
    }),
  );
});
