import { numericSettings } from '../flowsheet/numeric-settings.ts';
import type { FigureLimit, Flowsheet } from '../model/flowsheet.ts';
import { type Axis, readAxis } from './axis.ts';
import { createGrid, gridSize } from './grid.ts';
import { createReading } from './reading.ts';
import { createSweeper, type PathTable } from './sweep.ts';

/** A whole sweep in memory. */
export interface SweptTable {
  readonly axes: readonly Axis[];
  /** expressions as written */
  readonly record: readonly string[];
  readonly rows: number;
  /** row by row: the settings in the units of their axes, then what was recorded; NaN where there is no value */
  readonly cells: Float64Array;
  readonly converged: Uint8Array;
  readonly passes: Int32Array;
  readonly notes: readonly string[];
}

/** Put the paths of a sweep together, in their order. */
export function joinedPaths(
  axes: readonly Axis[],
  record: readonly string[],
  paths: readonly PathTable[],
): SweptTable {
  const rows = paths.reduce((sum, path) => sum + path.rows, 0);
  const width = axes.length + record.length;
  const cells = new Float64Array(rows * width);
  const converged = new Uint8Array(rows);
  const passes = new Int32Array(rows);
  let at = 0;
  for (const path of paths) {
    cells.set(path.cells, at * width);
    converged.set(path.converged, at);
    passes.set(path.passes, at);
    at += path.rows;
  }
  return { axes, record, rows, cells, converged, passes, notes: paths.flatMap(({ notes }) => notes) };
}

/** The study of a file, made here and now: its table and the sentences that read it. */
export interface FileStudy {
  readonly swept: SweptTable;
  readonly lines: readonly string[];
}

/**
 * Sweep the grid of a file's study, with what the limits of its objective need recorded as well.
 *
 * @param most  larger grids are not begun
 * @returns null where the file has no study over a grid, or a larger one
 */
export function sweepOfStudy(flowsheet: Flowsheet, most: number): FileStudy | null {
  const { study } = flowsheet;
  if (study === null || study.over.length === 0 || study.record.length === 0) return null;
  const settings = numericSettings(flowsheet);
  const axes = study.over.flatMap(({ path, text }) => {
    const setting = settings.find((one) => one.path === path);
    const axis = setting === undefined ? null : readAxis(path, text, setting.dimension);
    return axis === null || 'code' in axis ? [] : [axis];
  });
  // A study that cannot be swept is told by the sweep command, where it is asked for.
  if (axes.length < study.over.length || gridSize(axes) > most) return null;
  const limits = limitsToRecord(
    flowsheet,
    study.record.map(({ text }) => text.trim()),
  );
  const record = [...study.record, ...limits.map(({ formula }) => formula)];
  const grid = createGrid(axes);
  const sweep = createSweeper(flowsheet, { grid, record });
  const columns = [
    ...axes.map(({ path: name, unit }) => ({ name, unit, swept: true })),
    ...record.map(({ text }) => ({ name: text.trim(), unit: '', swept: false })),
  ];
  const reading = createReading(study.note, columns);
  const paths = Array.from({ length: grid.paths }, (_, path) => sweep(path));
  for (const path of paths) reading.add(path);
  const texts = record.map(({ text }) => text.trim());
  return { swept: joinedPaths(axes, texts, paths), lines: reading.lines() };
}

/** Limits of the file's objective whose figures are not recorded anyway, each figure once. */
export function limitsToRecord({ objective }: Flowsheet, record: readonly string[]): FigureLimit[] {
  const known = new Set(record);
  return (objective?.limits ?? []).filter(({ formula }) => {
    const text = formula.text.trim();
    if (known.has(text)) return false;
    known.add(text);
    return true;
  });
}

/**
 * How far each row is from breaking a limit of the objective, relative to the size of the bound: below zero one is
 * broken. NaN where a limited figure has no value; null where the file has no limits or their figures are not recorded.
 */
export function limitMargins({ objective }: Flowsheet, swept: SweptTable): Float64Array | null {
  const limits = (objective?.limits ?? []).map((limit) => ({
    ...limit,
    column: swept.record.indexOf(limit.formula.text.trim()),
  }));
  if (limits.length === 0 || limits.some(({ column }) => column < 0)) return null;
  return Float64Array.from({ length: swept.rows }, (_, row) =>
    Math.min(
      ...limits.map(({ side, bound, column }) => {
        const over = (cellOf(swept, row, column) - bound) / (Math.abs(bound) || 1);
        return side === 'below' ? -over : over;
      }),
    ),
  );
}

/** A recorded value of a row. */
export function cellOf({ axes, record, cells }: SweptTable, row: number, column: number): number {
  return cells[row * (axes.length + record.length) + axes.length + column]!;
}
