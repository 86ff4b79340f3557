import type { FigureLimit } from '../model/flowsheet.ts';
import type { Optimised } from '../study/optimise.ts';
import { type FigureDisplay, shownStep, shownWithUnit } from './figure-display.ts';
import { formulaDisplay } from './formula-display.ts';
import { type MoveUnit, moveUnits } from './move-units.ts';
import { significant } from './numbers.ts';
import { plainText, wrapped } from './plain.ts';
import { noPaint, type SheetOptions } from './sheet.ts';
import { aligned, columnGroups, pickColumns, type Rows } from './table.ts';

const WIDTH = 100;

/** One titled table of what `optimise` found. */
export interface OptimisePart {
  readonly title: string;
  readonly rows: Rows;
  /** columns that stand to the left */
  readonly left: readonly number[];
  /** columns that are repeated where the table is wider than the page */
  readonly fixed: number;
}

/** What `optimise` found, for a terminal: the answer, what holds it, what it earns, and how flat it is. */
export function optimiseText(found: Optimised, options: SheetOptions = {}): string {
  const paint = options.paint ?? noPaint;
  const { flowsheet, outcome } = found;
  const title = plainText(flowsheet.title) || 'Untitled flowsheet';
  const answer = wrapped(answerLine(found), WIDTH);
  return [
    paint.head(title),
    '='.repeat(Math.min(WIDTH, [...title].length)),
    `case: ${flowsheet.caseName === null ? 'as in the file' : plainText(flowsheet.caseName)}`,
    ...(outcome === 'found' ? answer : answer.map(paint.alarm)),
    ...optimiseParts(found).flatMap((part) => ['', paint.head(part.title), ...partLines(part)]),
    ...caseLines(found, paint.head),
    '',
  ].join('\n');
}

/** A table in as many groups of columns as the width takes. */
function partLines({ rows, left, fixed }: OptimisePart): string[] {
  return columnGroups(rows, WIDTH - 2, fixed).flatMap((group, index) => [
    ...(index === 0 ? [] : ['']),
    ...aligned(pickColumns(rows, group), {
      indent: 2,
      left: left.flatMap((column) => group.flatMap((one, i) => (one === column ? [i] : []))),
    }),
  ]);
}

/** The answer in one sentence. */
export function answerLine(found: Optimised): string {
  const { objective, outcome, best, front, failure, evaluations, passes, flowsheet } = found;
  const spent = `${evaluations} closings, ${passes} passes`;
  const two = objective.goals.length > 1;
  const asked = objective.goals
    .map(({ sense, text }, g) => `${two ? `goal ${g + 1}: ` : ''}${sense} ${plainText(text)}`)
    .join(', ');
  if (outcome === 'not-closed') return `${asked}: NOT CLOSED at any start (${spent}): ${plainText(failure)}`;
  if (outcome === 'limits-not-met') {
    return `${asked}: LIMITS NOT MET by any settings within their bounds (${spent}); below is the case that misses them least`;
  }
  if (objective.goals.length > 1) {
    const points = front.length === 1 ? 'one case is best in both' : `${front.length} cases of the trade-off`;
    return `${asked}: ${points} (${spent})`;
  }
  const [goal] = objective.goals;
  const value = shownWithUnit(best!.case.goals[0]!, formulaDisplay(goal!.text, flowsheet));
  return `${asked}: ${value}, all limits kept (${spent})`;
}

/** The tables in the order of reading; those that do not apply are left out. */
export function optimiseParts(found: Optimised): OptimisePart[] {
  const units = moveUnits(found.flowsheet, found.objective.moves);
  const single = found.objective.goals.length === 1 || found.outcome !== 'found';
  const goals = found.objective.goals.length;
  const money = `Money, ${found.flowsheet.prices?.currency ?? ''}/h`;
  const around = 'Around the best case, one setting at a time';
  const parts: OptimisePart[] = [
    ...(single ? [{ title: 'Settings', rows: settingRows(found, units), left: [0, 3], fixed: 1 }] : []),
    { title: 'Limits', rows: limitRows(found, single), left: [0, 1, 3], fixed: 1 },
    ...(single ? [{ title: money, rows: moneyRows(found), left: [0, 1], fixed: 1 }] : []),
    {
      title: 'Trade-off, from end to end',
      rows: frontRows(found, units),
      left: [goals + units.length],
      fixed: goals,
    },
    { title: 'Each limit by itself', rows: reachRows(found, units), left: [0, 1], fixed: 1 },
    { title: around, rows: curveRows(found, units), left: [0, 4], fixed: 2 },
    { title: 'Starts', rows: startRows(found, units), left: [], fixed: 2 },
  ];
  return parts.filter(({ rows }) => rows.length > 1);
}

function settingRows({ best, objective }: Optimised, units: readonly MoveUnit[]): string[][] {
  if (best === null) return [];
  return [
    ['setting', 'value', 'bounds', ''],
    ...units.map(({ path, text }, i) => {
      const [low, high] = objective.moves[i]!.between;
      const at = best.atBound[i];
      const where = at === null ? '' : `at its ${at === 'low' ? 'lower' : 'upper'} bound`;
      return [plainText(path), text(best.settings[i]!), `${text(low)} to ${text(high)}`, where];
    }),
  ];
}

/** The limits by their numbers, and how the best case stands to them. */
function limitRows(found: Optimised, single: boolean): string[][] {
  const { best, objective, flowsheet, worth } = found;
  if (best === null) return [];
  const head = ['', 'limit', ...(single ? ['got', ''] : [])];
  return [
    head,
    ...objective.limits.map((limit, k) => {
      const name = [`${k + 1}`, plainText(limit.text)];
      if (!single) return name;
      const display = formulaDisplay(limit.formula.text, flowsheet);
      const value = best.case.figures[k]!;
      const note =
        best.case.c[k]! > 1e-6
          ? `MISSED by ${sizeOf(value - limit.bound, display)}`
          : best.active[k]
            ? `active${worthText(found, limit, worth[k] ?? 0)}`
            : 'kept';
      return [...name, shownWithUnit(value, display), note];
    }),
  ];
}

/** A difference without its sign, in points or its unit. */
function sizeOf(difference: number, { factor, step }: FigureDisplay): string {
  return `${significant(Math.abs(difference) * factor, 3)} ${step}`.trimEnd();
}

/** e.g. ; one point more is worth 55.6 EUR/h */
function worthText(
  { objective, flowsheet }: Optimised,
  { formula, side }: FigureLimit,
  worth: number,
): string {
  if (worth <= 0) return '';
  const display = formulaDisplay(formula.text, flowsheet);
  const goal = formulaDisplay(objective.goals[0]!.text, flowsheet);
  const step = display.step === 'points' ? '1 point' : `1 ${display.step}`.trimEnd();
  const gain = significant((worth / display.factor) * goal.factor, 3);
  return `; ${step} ${side === 'below' ? 'more' : 'less'} is worth ${gain} ${goal.step}`.trimEnd();
}

function moneyRows({ best, flowsheet }: Optimised): string[][] {
  if (best === null || flowsheet.prices === null) return [];
  const items = flowsheet.prices.items.map(({ name, price, income }, k) => [
    plainText(name),
    plainText(price),
    significant((income ? 1 : -1) * best.case.money[k]!),
  ]);
  const sum = flowsheet.prices.items.reduce(
    (all, { income }, k) => all + (income ? 1 : -1) * best.case.money[k]!,
    0,
  );
  return [['item', 'price', 'per hour'], ...items, ['together', '', significant(sum)]];
}

function frontRows({ front, objective, flowsheet }: Optimised, units: readonly MoveUnit[]): string[][] {
  if (front.length === 0) return [];
  return [
    [
      ...objective.goals.map((_, g) => `goal ${g + 1}`),
      ...units.map(({ path }) => plainText(path)),
      'held by',
    ],
    ...front.map((point) => [
      ...objective.goals.map(({ text }, g) =>
        shownWithUnit(point.case.goals[g]!, formulaDisplay(text, flowsheet)),
      ),
      ...units.map(({ text }, i) => text(point.settings[i]!)),
      [
        ...units.filter((_, i) => point.atBound[i] !== null).map(({ path }) => plainText(path)),
        ...limitNumbers(objective.limits.flatMap((_, k) => (point.active[k] ? [k] : []))),
      ].join(', '),
    ]),
  ];
}

function reachRows({ reach, objective, flowsheet }: Optimised, units: readonly MoveUnit[]): string[][] {
  return [
    ['', '', 'at best', ...units.map(({ path }) => plainText(path))],
    ...reach.map(({ limit, nearest, settings, canBeMet }) => {
      const { formula, bound } = objective.limits[limit]!;
      const display = formulaDisplay(formula.text, flowsheet);
      return [
        `${limit + 1}`,
        canBeMet ? 'can be met alone' : `CANNOT BE MET: ${sizeOf(nearest - bound, display)} short`,
        shownWithUnit(nearest, display),
        ...units.map(({ text }, i) => text(settings[i]!)),
      ];
    }),
  ];
}

/** e.g. limit 1 */
function limitNumbers(indices: readonly number[]): string[] {
  return indices.length === 0 ? [] : [`limit ${indices.map((k) => k + 1).join(' and ')}`];
}

function curveRows({ curve, best, objective, flowsheet }: Optimised, units: readonly MoveUnit[]): string[][] {
  const [goal] = objective.goals;
  const display = formulaDisplay(goal!.text, flowsheet);
  return [
    ['setting', 'value', plainText(goal!.text), 'change', ''],
    ...curve.map(({ move, value, goal: got, broken }) => {
      const here = best!.case.goals[0]!;
      const note =
        got === null
          ? 'does not close'
          : limitNumbers(broken)
              .map((text) => `breaks ${text}`)
              .join('');
      return [
        plainText(units[move]!.path),
        units[move]!.text(value),
        shownWithUnit(got, display),
        shownStep(got === null ? null : got - here, display.factor),
        note,
      ];
    }),
  ];
}

function startRows({ starts, objective, flowsheet }: Optimised, units: readonly MoveUnit[]): string[][] {
  const [goal] = objective.goals;
  const list = (values: readonly number[]) => units.map(({ text }, i) => text(values[i]!)).join(', ');
  return [
    ['from', 'to', plainText(goal!.text)],
    ...starts.map(({ start, settings, goal: got, meetsLimits }) => [
      list(start),
      list(settings),
      `${shownWithUnit(got, formulaDisplay(goal!.text, flowsheet))}${meetsLimits ? '' : ', limits missed'}`,
    ]),
  ];
}

/** The optimum as a case of the file. */
export function caseLines(
  { outcome, best, objective, flowsheet }: Optimised,
  head: (text: string) => string,
): string[] {
  if (outcome !== 'found' || best === null || objective.goals.length > 1) return [];
  const units = moveUnits(flowsheet, objective.moves);
  const settings = units.map(({ path, yaml }, i) => `${path}: ${yaml(best.settings[i]!)}`);
  return ['', head('To put under cases: in the file'), `  optimum: {${settings.join(', ')}}`];
}
