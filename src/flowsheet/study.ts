import { nearest } from '../diagnostics/nearest.ts';
import type { StudyBlank, StudySpec } from '../model/flowsheet.ts';
import type { Fault, Reading } from './findings.ts';
import type { FormulaWorld } from './formula-scope.ts';
import { readFormula } from './formulas.ts';
import { checkPart } from './issues.ts';
import { studySchema } from './schema-studies.ts';
import { child, entriesOf, nodeAt, placeInside, type YamlScalar } from './yaml-tree.ts';

/**
 * The sweep that is written down in the file; null where there is none, or one at fault. Its settings and their values
 * are judged when it is run, as those of the command line are.
 *
 * @param world  null where parts of the file could not be read: then names are not judged
 */
export function readStudy(reading: Reading, world: FormulaWorld | null): StudySpec | null {
  const { root } = reading;
  if (child(root, 'study') === undefined) return null;
  const entry = checkPart(reading, studySchema, ['study']);
  if (entry === undefined) return null;
  const over = entriesOf(nodeAt(root, ['study', 'over'])).map(({ key, value }) => {
    const node = value as YamlScalar;
    return {
      path: key,
      text: node.text,
      placeInside: (offset: number, length: number) => placeInside(node, offset, length),
    };
  });
  const record = (entry.record ?? []).flatMap((_, r) => {
    const node = nodeAt(root, ['study', 'record', r]) as YamlScalar;
    const read = readFormula(reading, world, 'study', node);
    return read === null ? [] : [read.formula];
  });
  if (record.length < (entry.record?.length ?? 0)) return null;
  const columns = [...over.map(({ path }) => path), ...record.map(({ text }) => text.trim())];
  const note = (entry.note ?? []).map((line, k) => {
    const at = Array.isArray(entry.note) && nodeAt(root, ['study', 'note', k]);
    const node = (at || nodeAt(root, ['study', 'note'])) as YamlScalar;
    return readLine(reading, node, line, columns);
  });
  return { over, record, note };
}

const BLANK =
  /^(?:(first|last|least|most|ratio)\s+(.+?)|(.+?)\s+(at least|at most)\s+(.+?))(?:\s*;\s*(\S+))?$/;

/** Text and blanks by turns. */
function readLine(reading: Reading, node: YamlScalar, line: string, columns: readonly string[]) {
  return line.split(/(\{[^{}]*\})/).map((piece): string | StudyBlank => {
    if (!piece.startsWith('{')) return piece;
    const blank = blankOf(piece.slice(1, -1).trim(), columns);
    if (!('fault' in blank)) return blank;
    const at = node.text.indexOf(piece);
    reading.findings.error(at < 0 ? node.place : placeInside(node, at, piece.length), {
      ...blank.fault,
      code: 'bad-note',
    });
    return piece;
  });
}

function blankOf(text: string, columns: readonly string[]): StudyBlank | { readonly fault: Fault } {
  const match = BLANK.exec(text);
  if (match === null) {
    const what = `study: {${text}} is no blank.`;
    const why = 'a blank says which number of a column it stands for: first, last, least, most or ratio';
    const mend = 'write {last COLUMN}, {most COLUMN; %} or {COLUMN at most COLUMN}';
    return { fault: { code: 'bad-note', what, why, mend } };
  }
  const column = match[2] ?? match[3]!;
  const of = match[5] ?? column;
  const stranger = [column, of].find((name) => !columns.includes(name));
  if (stranger !== undefined) {
    const near = nearest(stranger, columns);
    const what = `study: ${stranger} is no column of its table.`;
    const why = near === null ? `the columns are ${columns.join(', ')}` : `the nearest column is ${near}`;
    const mend = near === null ? 'record it, or name a column' : `write ${near}`;
    return { fault: { code: 'bad-note', what, why, mend } };
  }
  const which = (match[1] ?? match[4]) as StudyBlank['which'];
  return { which, column, of, unit: match[6] ?? '' };
}
