import type { Flowsheet, Formula, MethodName } from '../model/flowsheet.ts';
import { createCaseRunner } from './case-runner.ts';
import { type Grid, indicesOf, rowsOfPath } from './grid.ts';

/** Digits of what a table holds: warm starts move those behind them. */
const DIGITS = 12;

export interface SweepPlan {
  readonly grid: Grid;
  readonly record: readonly Formula[];
  /** overrules the file */
  readonly method?: MethodName;
  readonly tolerance?: number;
  readonly maxPasses?: number;
}

/** The rows of one path, in the order of the table. */
export interface PathTable {
  readonly path: number;
  readonly rows: number;
  /** row by row: the settings in the units of their axes, then what was recorded, to 12 digits; NaN where there is no value */
  readonly cells: Float64Array;
  /** 1 where the case closed */
  readonly converged: Uint8Array;
  readonly passes: Int32Array;
  readonly notes: readonly string[];
}

/** Heads of the table: one per setting with its unit, one per recorded expression as written, then how closing went. */
export function sweepHeads({ grid, record }: SweepPlan): string[] {
  return [
    ...grid.axes.map(({ path, unit }) => (unit === '' ? path : `${path} [${unit}]`)),
    ...record.map(({ text }) => text),
    'converged',
    'passes',
    'note',
  ];
}

/** Makes the cases of one path after another. Each begins at the feeds, so that it owes nothing to the paths before. */
export function createSweeper(flowsheet: Flowsheet, plan: SweepPlan): (path: number) => PathTable {
  const { grid, record } = plan;
  const { axes } = grid;
  const { method, tolerance, maxPasses } = plan;
  const runner = createCaseRunner(flowsheet, {
    settings: axes.map(({ path }) => path),
    record,
    ...(method === undefined ? {} : { method }),
    ...(tolerance === undefined ? {} : { tolerance }),
    ...(maxPasses === undefined ? {} : { maxPasses }),
  });
  const numbers = axes.map((axis) => Float64Array.from(axis.numbers, rounded));
  const indices = new Int32Array(axes.length);
  const values = new Float64Array(axes.length);
  const found = new Float64Array(record.length);
  const width = axes.length + record.length;

  return (path) => {
    const order = rowsOfPath(grid, path);
    const first = path * grid.pathRows;
    const cells = new Float64Array(order.length * width);
    const converged = new Uint8Array(order.length);
    const passes = new Int32Array(order.length);
    const notes = new Array<string>(order.length).fill('');
    for (const [k, row] of order.entries()) {
      indicesOf(grid, first + row, indices);
      for (let a = 0; a < axes.length; a++) {
        values[a] = axes[a]!.values[indices[a]!]!;
        cells[row * width + a] = numbers[a]![indices[a]!]!;
      }
      const outcome = runner.run(values, found, { warm: k > 0 });
      converged[row] = outcome.converged ? 1 : 0;
      passes[row] = outcome.passes;
      notes[row] = outcome.converged ? withoutValue(record, found) : outcome.note;
      for (let r = 0; r < record.length; r++) {
        const value = found[r]!;
        cells[row * width + axes.length + r] = Number.isFinite(value) ? rounded(value) : Number.NaN;
      }
    }
    return { path, rows: order.length, cells, converged, passes, notes };
  };
}

function rounded(value: number): number {
  return Number(value.toPrecision(DIGITS));
}

function withoutValue(record: readonly Formula[], found: Float64Array): string {
  const missing = record.filter((_, r) => !Number.isFinite(found[r]!)).map(({ text }) => text);
  return missing.length === 0 ? '' : `no value: ${missing.join(', ')}`;
}
