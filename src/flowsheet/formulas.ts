import type { Formula } from '../model/flowsheet.ts';
import { compileFormula, type FormulaName } from '../units/formula.ts';
import type { Reading } from './findings.ts';
import { type FormulaWorld, formulaRoots, misnamed } from './formula-scope.ts';
import { placeInside, type YamlScalar } from './yaml-tree.ts';

export interface ReadFormula {
  readonly formula: Formula;
  readonly names: readonly FormulaName[];
}

/**
 * Compile a formula and check what it names.
 *
 * @param world  null where parts of the file could not be read: then names are not judged
 * @param text  the formula; stands at `offset` in the text of the node
 */
export function readFormula(
  reading: Reading,
  world: FormulaWorld | null,
  owner: string,
  node: YamlScalar,
  text: string = node.text,
  offset = 0,
): ReadFormula | null {
  const compiled = compileFormula(text, [...formulaRoots, ...(world?.money ?? [])]);
  if (!compiled.ok) {
    const { what, why, mend } = compiled;
    const where = placeInside(node, offset + compiled.offset, compiled.length);
    reading.findings.error(where, { code: 'bad-formula', what: `${owner}: ${what}`, why, mend });
    return null;
  }
  const wrong = world === null ? null : misnamed(compiled.names, world);
  if (wrong !== null) {
    const where = placeInside(node, offset + wrong.name.offset, wrong.name.length);
    reading.findings.error(where, { ...wrong.fault, what: `${owner}: ${wrong.fault.what}` });
    return null;
  }
  return { formula: { text, evaluate: compiled.evaluate }, names: compiled.names };
}
