import type { Optimised } from '../study/optimise.ts';
import { caution } from './cautions.ts';
import { csvCell } from './csv.ts';
import { escaped, table } from './markdown.ts';
import { moveUnits } from './move-units.ts';
import { answerLine, optimiseParts } from './optimise.ts';

/** Forms of a written optimum by the extension of the file. */
export const optimiseRenderers: ReadonlyMap<string, (found: Optimised) => string> = new Map([
  ['.csv', optimiseCsv],
  ['.md', optimiseMarkdown],
]);

/**
 * One rectangle, numbers in full: the cases of the trade-off, or the best case and those around it. Settings stand in
 * the units of their bounds, goals in those of formulas.
 */
export function optimiseCsv(found: Optimised): string {
  const { objective, flowsheet, front, curve, best } = found;
  const columns = moveUnits(flowsheet, objective.moves).map(({ column }) => column);
  const head = [
    'row',
    ...columns.map(({ head: text }) => text),
    ...objective.goals.map(({ text, unit }) => (unit === '' ? text : `${text} [${unit}]`)),
    'limits broken',
  ];
  const line = (
    name: string,
    settings: readonly number[],
    goals: readonly (number | null)[],
    broken: string,
  ) => [name, ...columns.map(({ number }, i) => number(settings[i]!)), ...goals, broken];
  const limitTexts = (indices: readonly number[]) => indices.map((k) => objective.limits[k]!.text).join('; ');
  const missed = best === null ? [] : Array.from(best.case.c.keys()).filter((k) => best.case.c[k]! > 1e-6);
  const rows =
    objective.goals.length > 1 && found.outcome === 'found'
      ? front.map((point) => line('trade-off', point.settings, point.case.goals, ''))
      : [
          ...(best === null ? [] : [line('best', best.settings, best.case.goals, limitTexts(missed))]),
          ...curve.map(({ move, value, goal, broken }) =>
            line('around', best!.settings.with(move, value), [goal], limitTexts(broken)),
          ),
        ];
  return [head, ...rows].map((row) => `${row.map(csvCell).join(',')}\r\n`).join('');
}

/** The text as Markdown. */
export function optimiseMarkdown(found: Optimised): string {
  const line = answerLine(found);
  return [
    `# ${escaped(found.flowsheet.title) || 'Untitled flowsheet'}: best settings`,
    `${escaped(line.charAt(0).toUpperCase() + line.slice(1))}.`,
    ...optimiseParts(found).map(
      ({ title, rows, left }) => `## ${escaped(title)}\n\n${table(rows, left[0] === 0 ? 1 : 0, left.at(-1))}`,
    ),
    `---\n\n${caution}`,
  ]
    .join('\n\n')
    .concat('\n');
}
