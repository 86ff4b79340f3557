import { type Diagnostic, InputError } from '../diagnostics/diagnostic.ts';
import { nearest } from '../diagnostics/nearest.ts';
import type { Fault } from '../flowsheet/findings.ts';
import { formulaRoots, misnamed, worldOf } from '../flowsheet/formula-scope.ts';
import { numericSettings } from '../flowsheet/numeric-settings.ts';
import type { Flowsheet, Formula, MethodName } from '../model/flowsheet.ts';
import { compileFormula } from '../units/formula.ts';
import { type Axis, readAxis } from './axis.ts';
import { createGrid } from './grid.ts';
import { createSweeper } from './sweep.ts';

export interface SweepOptions {
  /** values by setting, as on the command line: `{'condenser.temperature': '-25 degC..10 degC:8'}`; the last runs fastest */
  readonly over: Readonly<Record<string, string>>;
  /** what is read out of every case, e.g. `figures.recycle_ratio` */
  readonly record: readonly string[];
  /** overrules the file */
  readonly method?: MethodName;
  readonly tolerance?: number;
  readonly maxPasses?: number;
  /** Stops the sweep before its next path; the iteration then throws the signal's reason. */
  readonly signal?: AbortSignal;
}

/** One case of a sweep. */
export interface SweptCase {
  /** by setting, in the unit written in `over` */
  readonly settings: Readonly<Record<string, number>>;
  /** by expression, in the units of formulas; null where the case did not close or has no such value */
  readonly recorded: Readonly<Record<string, number | null>>;
  readonly converged: boolean;
  readonly passes: number;
  /** why it failed, empty where it did not */
  readonly note: string;
}

/**
 * Close a flowsheet at every point of a grid, case by case in the order of the table; the numbers are those of
 * `looptally sweep`. Work is done as the cases are asked for, one path of neighbours at a time, and the event loop is
 * let in between.
 *
 * @throws InputError naming every setting, value or expression that is not known; the reason of the signal
 */
export async function* sweepCases(flowsheet: Flowsheet, options: SweepOptions): AsyncGenerator<SweptCase> {
  const { signal, over, record: texts, ...closing } = options;
  const faults: Diagnostic[] = [];
  const note = (key: string, fault: Fault) =>
    faults.push({ ...fault, severity: 'error', where: flowsheet.placeOf(''), what: `${key}: ${fault.what}` });
  const axes = Object.entries(over).flatMap(([path, text]) => axisOf(flowsheet, path, text, note));
  const record = texts.flatMap((text) => formulaOf(flowsheet, text, note));
  if (faults.length > 0) throw new InputError(faults);

  const grid = createGrid(axes);
  const sweep = createSweeper(flowsheet, { grid, record, ...closing });
  const width = axes.length + record.length;
  for (let path = 0; path < grid.paths; path++) {
    await new Promise((resolve) => setTimeout(resolve, 0));
    signal?.throwIfAborted();
    const { rows, cells, converged, passes, notes } = sweep(path);
    for (let row = 0; row < rows; row++) {
      const cell = (k: number) => cells[row * width + k]!;
      yield {
        settings: Object.fromEntries(axes.map((axis, a) => [axis.path, cell(a)])),
        recorded: Object.fromEntries(
          record.map(({ text }, r) => {
            const value = cell(axes.length + r);
            return [text, Number.isNaN(value) ? null : value];
          }),
        ),
        converged: converged[row] === 1,
        passes: passes[row]!,
        note: notes[row]!,
      };
    }
  }
}

type Note = (key: string, fault: Fault) => void;

function axisOf(flowsheet: Flowsheet, path: string, text: string, note: Note): Axis[] {
  const settings = numericSettings(flowsheet);
  const setting = settings.find((one) => one.path === path);
  if (setting === undefined) {
    const near = nearest(
      path,
      settings.map((one) => one.path),
    );
    note('over', {
      code: 'unknown-setting',
      what: `There is no setting ${path} that holds a number.`,
      why: near === null ? 'nothing in the flowsheet has a name like it' : `the nearest is ${near}`,
      mend: near === null ? 'write the path as in --set' : `write ${near}`,
    });
    return [];
  }
  const axis = readAxis(path, text, setting.dimension);
  if ('code' in axis) note(`over ${path}`, axis);
  return 'code' in axis ? [] : [axis];
}

function formulaOf(flowsheet: Flowsheet, text: string, note: Note): Formula[] {
  const compiled = compileFormula(text, formulaRoots);
  if (!compiled.ok) {
    const { what, why, mend } = compiled;
    note('record', { code: 'bad-formula', what, why, mend });
    return [];
  }
  const wrong = misnamed(compiled.names, worldOf(flowsheet));
  if (wrong !== null) note('record', wrong.fault);
  return wrong === null ? [{ text, evaluate: compiled.evaluate }] : [];
}
