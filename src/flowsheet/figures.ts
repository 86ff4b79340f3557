import type { UserFigure } from '../model/flowsheet.ts';
import type { FormulaName } from '../units/formula.ts';
import type { Reading } from './findings.ts';
import type { FormulaWorld } from './formula-scope.ts';
import { readFormula } from './formulas.ts';
import { checkPart } from './issues.ts';
import { checkName } from './names.ts';
import { figureSchema } from './schema-studies.ts';
import { optionalEntries } from './section.ts';
import { unitOfName } from './target.ts';
import { nodeAt, placeOfPath, type YamlScalar } from './yaml-tree.ts';

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
      if (read !== null) {
        checkUnit(reading, key, read.names, node.text, entry.unit ?? '');
        figures.push({ name: key, formula: read.formula, unit: entry.unit ?? '' });
      }
    }
    above.push(key);
  }
  return figures;
}

/** How a fraction may be labelled; only % changes its number. */
const FRACTION_UNITS: readonly string[] = ['%', 'mol/mol', 'kg/kg'];

/**
 * The unit of a figure is what stands behind its number; nothing is converted but a fraction shown in %. Where the
 * formula is a single name, its unit is known, and another one would be a lie.
 */
function checkUnit(
  { root, findings }: Reading,
  figure: string,
  names: readonly FormulaName[],
  formula: string,
  unit: string,
): void {
  const single = names.length === 1 && names[0].length === formula.trim().length;
  const known = single ? unitOfName(names[0].parts) : null;
  if (known === null || unit === '') return;
  const fits = known === '' ? FRACTION_UNITS.includes(unit) : unit === known;
  if (fits) return;
  findings.error(placeOfPath(root, ['figures', figure, 'unit']), {
    code: 'unit-of-figure',
    what: `figure ${figure} is shown in ${unit}.`,
    why: `${formula.trim()} is ${known === '' ? 'a fraction' : `in ${known}`}, and a figure is not converted`,
    mend:
      known === ''
        ? "write unit: '%', or leave it out"
        : `write unit: ${known}, or convert in the formula, e.g. ${formula.trim()} ${known === 'K' ? '- 273.15' : '/ 1000'}`,
  });
}
