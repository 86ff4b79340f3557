import type { Flowsheet } from '../model/flowsheet.ts';
import { heads, number, text } from './xlsx-looks.ts';
import { type Page, put } from './xlsx-model.ts';
import { cellTerm, type Range, type Term } from './xlsx-term.ts';

export interface ComponentCells {
  /** kg/kmol */
  readonly molarMass: ReadonlyMap<string, Term>;
  /** lower heating values, kJ/mol, of all components */
  readonly lowerHeating: Range;
  /** atoms per molecule, by element, of all components */
  readonly atoms: ReadonlyMap<string, Range>;
}

/** Elements of a flowsheet in the order of the alphabet, as the closures name them. */
export function elementsOf({ components }: Flowsheet): string[] {
  return [...new Set(components.flatMap((c) => Object.keys(c.elements)))].sort();
}

/** What the other sheets weigh their flows with: molar masses, heating values, atoms. */
export function fillComponents(page: Page, flowsheet: Flowsheet): ComponentCells {
  const { components } = flowsheet;
  const elements = elementsOf(flowsheet);
  const first = page.rows.length + 1;
  const FIXED = 5;
  put(
    page,
    heads(
      [
        'component',
        'name',
        'formula',
        'molar mass, kg/kmol',
        'lower heating value, kJ/mol',
        ...elements.map((element) => `atoms ${element}`),
      ],
      3,
    ),
  );
  for (const c of components) {
    put(page, [
      text(c.id),
      text(c.name),
      text(c.formula),
      number(1e3 * c.molarMassKgPerMol, { format: '0.0000' }),
      number(c.lowerHeatingJPerMol / 1e3, { format: '0.00' }),
      ...elements.map((element) => number(c.elements[element] ?? 0)),
    ]);
  }
  const column = (c: number): Range => ({ page, from: [first, c], to: [first + components.length - 1, c] });
  return {
    molarMass: new Map(components.map(({ id }, k) => [id, cellTerm(page, first + k, 3)])),
    lowerHeating: column(4),
    atoms: new Map(elements.map((element, k) => [element, column(FIXED + k)])),
  };
}
