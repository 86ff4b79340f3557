import { formulaRoots } from '../flowsheet/formula-scope.ts';
import { readFlowsheet } from '../flowsheet/read.ts';
import type { Formula, MethodName } from '../model/flowsheet.ts';
import type { Axis } from '../study/axis.ts';
import { createGrid } from '../study/grid.ts';
import { createSweeper, type PathTable, type SweepPlan } from '../study/sweep.ts';
import { compileFormula } from '../units/formula.ts';

/** All that a worker needs to make paths of a sweep, as plain data. */
export interface SweepJob {
  readonly text: string;
  readonly file: string;
  readonly set: readonly string[];
  readonly case: string | null;
  readonly axes: readonly Axis[];
  readonly record: readonly string[];
  readonly method?: MethodName;
  readonly tolerance?: number;
  readonly maxPasses?: number;
}

/** Read the flowsheet of a checked job again and make it ready. */
export async function openJob(job: SweepJob): Promise<(path: number) => PathTable> {
  const { text, file, set, case: caseName } = job;
  // Its size was judged when the file was opened.
  const { flowsheet } = await readFlowsheet(text, {
    file,
    set,
    case: caseName,
    maxBytes: Number.POSITIVE_INFINITY,
  });
  if (flowsheet === null) throw new Error('the flowsheet of a sweep could not be read again');
  return createSweeper(flowsheet, planOf(job));
}

export function planOf(job: SweepJob): SweepPlan {
  const { axes, record, method, tolerance, maxPasses } = job;
  return {
    grid: createGrid(axes),
    record: record.map(compiled),
    ...(method === undefined ? {} : { method }),
    ...(tolerance === undefined ? {} : { tolerance }),
    ...(maxPasses === undefined ? {} : { maxPasses }),
  };
}

function compiled(text: string): Formula {
  const formula = compileFormula(text, formulaRoots);
  if (!formula.ok) throw new Error(`a checked formula cannot be read: ${text}`);
  return { text, evaluate: formula.evaluate };
}
