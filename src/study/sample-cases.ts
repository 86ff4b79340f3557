import type { Flowsheet, Formula } from '../model/flowsheet.ts';
import { createCaseRunner } from './case-runner.ts';
import type { DrawnSettings } from './drawn-settings.ts';

/**
 * Cases in a row that start from one another. The next begins at the case of the file, closed from the feeds, so that no
 * case depends on many others.
 */
const CHAIN = 64;
/** Digits of what is recorded: warm starts move those behind them. */
const DIGITS = 12;

/** Drawn cases and what came of them, row by row. */
export interface SampleTable {
  readonly rows: number;
  /** one value per spread [SI] */
  readonly drawn: Float64Array;
  /** one value per recorded expression, in the units of formulas; NaN where there is none */
  readonly found: Float64Array;
  /** 1 where the case closed */
  readonly converged: Uint8Array;
  readonly passes: Int32Array;
  readonly notes: readonly string[];
}

/**
 * Close every drawn case, in order.
 *
 * @param inFile  what is spread, as the file has it
 */
export function runCases(
  flowsheet: Flowsheet,
  settings: DrawnSettings,
  record: readonly Formula[],
  inFile: Float64Array,
  drawn: Float64Array,
  progress: (done: number, total: number, failed: number) => void,
): SampleTable {
  const size = flowsheet.spreads.length;
  const rows = drawn.length / size;
  const runner = createCaseRunner(flowsheet, { settings: settings.paths, record });
  const values = new Float64Array(settings.paths.length);
  const one = new Float64Array(record.length);
  const found = new Float64Array(rows * record.length).fill(Number.NaN);
  const converged = new Uint8Array(rows);
  const passes = new Int32Array(rows);
  const notes = new Array<string>(rows).fill('');
  let failed = 0;
  for (let row = 0; row < rows; row++) {
    if (row % CHAIN === 0) {
      settings.fill(inFile, values);
      runner.run(values, one, { warm: false });
    }
    notes[row] = settings.fill(drawn.subarray(row * size, (row + 1) * size), values);
    if (notes[row] === '') {
      const outcome = runner.run(values, one);
      converged[row] = outcome.converged ? 1 : 0;
      passes[row] = outcome.passes;
      notes[row] = outcome.note;
      for (let r = 0; r < one.length; r++) {
        if (Number.isFinite(one[r])) found[row * one.length + r] = Number(one[r].toPrecision(DIGITS));
      }
    }
    if (converged[row] === 0) failed += 1;
    progress(row + 1, rows, failed);
  }
  return { rows, drawn, found, converged, passes, notes };
}
