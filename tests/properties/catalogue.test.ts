import { expect, test } from 'vitest';
import { catalogueEntry, catalogueList } from '../../src/properties/catalogue.ts';
import { builtInIds } from '../../src/properties/components.ts';

test('the list names every component once', () => {
  expect(catalogueList().map((line) => line.id)).toEqual(builtInIds);
  expect(catalogueList().find((line) => line.id === 'NH3')).toEqual({
    id: 'NH3',
    name: 'ammonia',
    formula: 'NH3',
    cas: '7664-41-7',
    molarMassGPerMol: 17.031,
    boilingK: 239.83,
    criticalK: 405.56,
    note: '',
  });
});

test('every datum of every component carries its source', () => {
  for (const id of builtInIds) {
    for (const row of catalogueEntry(id)!.rows) {
      expect(row.source, `${id}: ${row.quantity}`).not.toBe('');
      if (typeof row.value === 'number') expect(row.value, `${id}: ${row.quantity}`).not.toBeNaN();
    }
  }
});

test('ammonia shows both formation enthalpies, its Antoine sets and the gases it dissolves', () => {
  const { rows } = catalogueEntry('NH3')!;
  const quantities = rows.map((row) => row.quantity);
  expect(rows.find((row) => row.quantity === 'formation enthalpy, NASA')!.value).toBe(-45.94);
  expect(rows.find((row) => row.quantity === 'formation enthalpy, used')!.value).toBe(-45.558);
  expect(quantities.filter((q) => q === 'Antoine set')).toHaveLength(3);
  expect(quantities.filter((q) => q.startsWith('as solvent of'))).toEqual([
    'as solvent of H2',
    'as solvent of N2',
    'as solvent of Ar',
    'as solvent of CH4',
    'as solvent of CO',
  ]);
});

test('a gas shows the liquids it dissolves in', () => {
  const quantities = catalogueEntry('H2')!.rows.map((row) => row.quantity);
  expect(quantities.filter((q) => q.startsWith('dissolved in'))).toEqual([
    'dissolved in NH3',
    'dissolved in CH3OH',
    'dissolved in H2O',
  ]);
});

test('an unknown component has no entry', () => {
  expect(catalogueEntry('NH4')).toBeUndefined();
});
