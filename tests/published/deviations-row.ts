import { type Deviation, mean, NOTHING, signedSize, size, table, worst } from './deviations-statistics.ts';

/** One line of the summary: a quantity against its published values. */
export interface Row {
  readonly what: string;
  readonly source: string;
  /** of the deviations: % of the value, or a unit of its own */
  readonly unit: string;
  readonly deviations: readonly Deviation[];
  /** why it is off, or what it does not show */
  readonly remark?: string;
}

/** The summary as a Markdown table. */
export function summaryTable(rows: readonly Row[]): string {
  return table(
    ['what', 'source', 'points', 'mean deviation', 'worst deviation', 'remark'],
    rows.map(({ what, source, unit, deviations, remark = '' }) => {
      const most = worst(deviations);
      const where = Math.abs(most.value) < NOTHING || deviations.length === 1 ? '' : ` (${most.at})`;
      return [
        what,
        source,
        String(deviations.length),
        `${size(mean(deviations))} ${unit}`,
        `${signedSize(most.value)} ${unit}${where}`,
        remark,
      ];
    }),
    [0, 1, 4, 5],
  );
}
