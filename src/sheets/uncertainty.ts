import type { Percentile } from '../study/statistics.ts';
import type { DrawnSpread, FigureSpread, Share, Uncertainty } from '../study/uncertainty.ts';
import { formatQuantity } from '../units/quantity.ts';
import { significant } from './numbers.ts';
import { plainText, wrapped } from './plain.ts';
import { noPaint, type SheetOptions } from './sheet.ts';
import { aligned, columnGroups, pickColumns } from './table.ts';

const WIDTH = 100;

/** What the spreads make of the figures: percentiles, how sure they are, what causes them, and what did not close. */
export function uncertaintyText(found: Uncertainty, options: SheetOptions = {}): string {
  const paint = options.paint ?? noPaint;
  const { flowsheet, figures } = found;
  const name = plainText(flowsheet.title) || 'Untitled flowsheet';
  const section = (title: string, lines: readonly string[]) =>
    lines.length === 0 ? [] : ['', paint.head(title), ...lines];
  const failed = failureLines(found);
  return [
    paint.head(name),
    '='.repeat(Math.min(WIDTH, [...name].length)),
    `case: ${flowsheet.caseName === null ? 'as in the file' : plainText(flowsheet.caseName)}`,
    sampleLine(found),
    ...section('What was spread', spreadLines(found)),
    ...section('What becomes of the figures', figureLines(figures)),
    ...section('How far chance may have moved the percentiles, 95 % confidence', rangeLines(figures)),
    ...section('What each figure follows: rank correlation, and share of the variance of ranks', [
      ...rankLines(figures),
      ...overlapNote(found),
      ...chanceNote(found),
    ]),
    ...(found.extraCases === 0
      ? []
      : section(
          `Sobol indices: share of the variance alone / with others, from ${found.extraCases} extra cases`,
          sobolLines(figures),
        )),
    ...(failed.length === 0
      ? []
      : ['', paint.alarm('Did not close, and has no part in the numbers above'), ...failed]),
    '',
  ].join('\n');
}

/** How many cases were drawn, how, and how many closed. */
export function sampleLine({ options, failed, extraCases, spreads }: Uncertainty): string {
  const { samples, method, seed } = options;
  const closed = failed === 0 ? 'all closed' : `${samples - failed} closed, ${failed} did not`;
  const extra = extraCases === 0 ? '' : `; ${extraCases} extra cases for the Sobol indices`;
  const how = method === 'sobol' ? 'Sobol sequence' : 'Latin hypercube';
  return `${samples} samples of ${spreads.length} ${spreads.length === 1 ? 'spread' : 'spreads'} (${how}, seed ${seed}), ${closed}${extra}`;
}

function spreadLines({ spreads, flowsheet }: Uncertainty): string[] {
  const notes = [
    ...flowsheet.correlations.map(
      ({ between: [one, other], value }) => `${one} and ${other} move together: rank correlation ${value}.`,
    ),
    ...spreads.flatMap(cutNotes),
    ...(spreads.some(({ setting }) => setting.path.includes('.composition.'))
      ? [
          'A part of a composition keeps its drawn share; the parts that are not spread make room in proportion.',
        ]
      : []),
  ];
  return [
    ...aligned(
      spreads.map((one) => [plainText(one.spread.path), one.spread.shape.kind, shapeText(one)]),
      { left: [0, 1, 2], indent: 2 },
    ),
    ...notes.flatMap((note) => wrapped(note, WIDTH, '  ', '  ')),
  ];
}

/** What the bounds of a setting cut off a spread, in sentences. */
export function cutNotes({ spread, setting, distribution }: DrawnSpread): string[] {
  const { low, high } = setting.bounds;
  const note = (share: number, side: string, bound: number) =>
    share === 0
      ? []
      : [
          `${spread.path} is cut off ${side} ${valueText(setting, bound)}: ${significant(100 * share, 2)} % of it lay beyond.`,
        ];
  return [...note(distribution.cutBelow, 'below', low), ...note(distribution.cutAbove, 'above', high)];
}

/** A spread in the natural unit of its setting. */
export function shapeText({ spread: { shape }, setting }: DrawnSpread): string {
  const value = (x: number) => valueText(setting, x);
  switch (shape.kind) {
    case 'normal':
      return `mean ${value(shape.mean)}, sd ${significant(shape.sd / setting.unitSI, 3)}${unitText(setting.unit)}`;
    case 'uniform':
      return `${value(shape.low)} to ${value(shape.high)}`;
    case 'triangular':
      return `${value(shape.low)}, mostly ${value(shape.mode)}, up to ${value(shape.high)}`;
    case 'log-normal':
      return `median ${value(shape.median)}, a factor of ${significant(shape.factor, 4)} for one sd`;
  }
}

function valueText({ dimension, unit, unitSI, path }: DrawnSpread['setting'], value: number): string {
  if (path.includes('.composition.')) return `${Number((value / unitSI).toPrecision(6))} %`;
  if (dimension === 'temperature') return formatQuantity(value, dimension);
  return `${Number((value / unitSI).toPrecision(6))}${unitText(unit)}`;
}

function unitText(unit: string): string {
  return unit === '1' ? '' : ` ${unit}`;
}

/** An expression without the word that all key figures begin with. */
export function shortName(expression: string): string {
  return plainText(expression).replace(/^figures\.(?=[\w.]+$)/, '');
}

function figureLines(figures: readonly FigureSpread[]): string[] {
  const percents = figures.find(({ summary }) => summary !== null)?.summary?.percentiles ?? [];
  const partial = figures.some(({ summary }) => summary === null || summary.count < mostCounted(figures));
  const rows = [
    [
      'figure',
      'in the file',
      'mean',
      'sd',
      ...percents.map(({ percent }) => `${percent} %`),
      ...(partial ? ['cases'] : []),
    ],
    ...figures.map(({ expression, asInFile, summary }) => [
      shortName(expression),
      significant(asInFile, 4),
      significant(summary?.mean, 4),
      summary?.steady === true ? '0' : significant(summary?.sd, 3),
      ...percents.map((_, p) => significant(summary?.percentiles[p].value, 4)),
      ...(partial ? [String(summary?.count ?? 0)] : []),
    ]),
  ];
  return inGroups(rows);
}

function mostCounted(figures: readonly FigureSpread[]): number {
  return Math.max(...figures.map(({ summary }) => summary?.count ?? 0));
}

function rangeLines(figures: readonly FigureSpread[]): string[] {
  const known = figures.filter(({ summary }) => summary !== null);
  const varying = known.filter(({ summary }) => !summary!.steady);
  const rows = [
    ['figure', ...(varying[0]?.summary?.percentiles ?? []).map(({ percent }) => `${percent} %`)],
    ...varying.map(({ expression, summary }) => [
      shortName(expression),
      ...summary!.percentiles.map(rangeText),
    ]),
  ];
  const unknown = varying.some(({ summary }) =>
    summary!.percentiles.some(({ low, high }) => low === null || high === null),
  );
  const notes = unknown ? ['-  too few samples to tell how far out this percentile may lie'] : [];
  return [
    ...(varying.length === 0 ? [] : inGroups(rows)),
    ...notes.map((note) => `  ${note}`),
    ...steadyLines(known),
  ];
}

/** The wider side of the range of a percentile. */
function rangeText({ value, low, high }: Percentile): string {
  return low === null || high === null ? '-' : `± ${significant(Math.max(value - low, high - value), 2)}`;
}

/** The figures that have one value in all cases, each with the reason where an aim is it. */
function steadyLines(known: readonly FigureSpread[]): string[] {
  return known.flatMap(({ expression, summary, heldBy }) =>
    summary!.steady ? wrapped(`${shortName(expression)}: ${steadyText(heldBy)}`, WIDTH, '  ', '    ') : [],
  );
}

function steadyText(heldBy: string | null): string {
  return heldBy === null ? 'the same in all cases' : `held by the aim ${plainText(heldBy)}`;
}

/** Shares of less than this are told as a rest [-]. */
const SMALL_SHARE = 0.005;

/** For each figure the spreads that it follows, the strongest first; those that vary together stand side by side. */
function rankLines(figures: readonly FigureSpread[]): string[] {
  return causeLines(
    figures,
    ({ rankShare }) => rankShare ?? 0,
    (share, shares) => {
      const group = shares
        .filter(({ path }) => share.together.includes(path))
        .toSorted((a, b) => Math.abs(b.rankCorrelation ?? 0) - Math.abs(a.rankCorrelation ?? 0));
      if (group[0] !== share) return [];
      const members = group.map(
        ({ path, rankCorrelation: r }) =>
          `${plainText(path)}\u00a0${r! < 0 ? '-' : '+'}${Math.abs(r!).toFixed(2)}`,
      );
      const part = `${(100 * share.rankShare!).toFixed(0)}\u00a0%`;
      return members.length === 1
        ? [`${members[0]}\u00a0(${part})`]
        : [`${members.join(' with ')} (together\u00a0${part})`];
    },
  );
}

/** Why spreads that vary together have one share. */
function overlapNote({ figures }: Uncertainty): string[] {
  const overlaps = figures.some(({ shares }) => shares.some(({ together }) => together.length > 1));
  if (!overlaps) return [];
  const note =
    'Spreads that move together have one share: the squares of their correlations would count twice what they have in common.';
  return wrapped(note, WIDTH, '  ', '  ');
}

/**
 * The square of a rank correlation that one in twenty samples of independent numbers goes beyond, times their count.
 * @source M. G. Kendall & J. D. Gibbons, Rank Correlation Methods, 5th ed., 1990 (from memory): variance 1/(n − 1)
 */
const CHANCE = 1.96 ** 2;

/** Below which a share of so few samples says nothing; silent where that is less than is shown. */
function chanceNote({ figures }: Uncertainty): string[] {
  const count = mostCounted(figures);
  const share = CHANCE / Math.max(1, count - 1);
  if (count === 0 || share < 2 * SMALL_SHARE) return [];
  return [`  Of ${count} samples, a share below ${Math.min(100, Math.ceil(100 * share))} % may be chance.`];
}

function sobolLines(figures: readonly FigureSpread[]): string[] {
  return causeLines(
    figures,
    ({ sobol }) => Math.max(sobol?.first ?? 0, sobol?.total ?? 0),
    ({ path, sobol }) => {
      const { first, firstError, total, totalError } = sobol!;
      const share = (value: number, error: number) =>
        `${(100 * value).toFixed(0)}\u00a0±\u00a0${(100 * error).toFixed(0)}`;
      const both = `${share(first, firstError)}\u00a0/\u00a0${share(total, totalError)}\u00a0%`;
      return [`${plainText(path)}\u00a0${both}`];
    },
  );
}

function causeLines(
  all: readonly FigureSpread[],
  sizeOf: (share: Share) => number,
  texts: (share: Share, shares: readonly Share[]) => readonly string[],
): string[] {
  const figures = all.filter(({ summary }) => summary !== null);
  const names = figures.map(({ expression }) => shortName(expression));
  const width = Math.min(30, Math.max(...names.map((name) => name.length)));
  return figures.flatMap(({ shares, summary, heldBy }, f) => {
    const lead = `  ${names[f].padEnd(width)}  `;
    const print = (text: string) => wrapped(text, WIDTH, lead, ' '.repeat(width + 4));
    if (summary!.steady) return print(steadyText(heldBy));
    const large = shares.filter((share) => sizeOf(share) >= SMALL_SHARE);
    const list = large
      .toSorted((a, b) => sizeOf(b) - sizeOf(a))
      .flatMap((share) => texts(share, shares))
      .join(', ');
    return print(list === '' ? 'follows none of them' : list);
  });
}

/** A table broken into tables that fit the width, a blank line between them. */
function inGroups(rows: readonly (readonly string[])[]): string[] {
  return columnGroups(rows, WIDTH - 2).flatMap((columns, g) => [
    ...(g === 0 ? [] : ['']),
    ...aligned(pickColumns(rows, columns), { indent: 2 }),
  ]);
}

function failureLines({ failures, options }: Uncertainty): string[] {
  return failures.flatMap(({ reason, count, first }) => {
    const where = first > options.samples ? `extra case ${first - options.samples}` : `sample ${first}`;
    const lead = `  ${count} x  `;
    return wrapped(`${plainText(reason)}; first in ${where}`, WIDTH, lead, ' '.repeat(lead.length));
  });
}
