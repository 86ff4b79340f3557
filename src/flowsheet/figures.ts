import type { UserFigure } from '../model/flowsheet.ts';
import type { Reading } from './findings.ts';
import type { FormulaWorld } from './formula-scope.ts';
import { readFormula } from './formulas.ts';
import { checkPart } from './issues.ts';
import { checkName } from './names.ts';
import { figureSchema } from './schema.ts';
import { optionalEntries } from './section.ts';
import { nodeAt, type YamlScalar } from './yaml-tree.ts';

/** The user's own figures; each may name those above it. */
export function readFigures(reading: Reading, world: FormulaWorld | null): readonly UserFigure[] {
  const figures: UserFigure[] = [];
  const above: string[] = [];
  for (const { key, keyPlace } of optionalEntries(
    reading,
    'figures',
    'figures: {slip: {formula: streams.S6.flow, unit: kmol/h}}',
  )) {
    checkName(reading.findings, key, keyPlace, 'a figure');
    const entry = checkPart(reading, figureSchema, ['figures', key]);
    if (entry !== undefined) {
      const node = nodeAt(reading.root, ['figures', key, 'formula']) as YamlScalar;
      const here = world === null ? null : { ...world, figures: [...above] };
      const read = readFormula(reading, here, `figure ${key}`, node);
      if (read !== null) figures.push({ name: key, formula: read.formula, unit: entry.unit ?? '' });
    }
    above.push(key);
  }
  return figures;
}
