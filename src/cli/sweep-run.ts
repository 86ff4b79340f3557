import type { Flowsheet } from '../model/flowsheet.ts';
import type { Grid } from '../study/grid.ts';
import type { StudyReading } from '../study/reading.ts';
import type { SolveOptions } from './solve.ts';
import type { SweepJob } from './sweep-job.ts';
import { say } from './terminal.ts';

export interface SweepOptions extends SolveOptions {
  readonly over?: readonly string[];
  readonly record?: readonly string[];
  readonly out?: string;
  readonly workers?: number;
  readonly resume?: boolean;
  readonly part?: Part;
  readonly yes?: boolean;
}

export interface Part {
  readonly part: number;
  readonly of: number;
}

/** A sweep that has been checked and can begin. */
export interface Run {
  readonly flowsheet: Flowsheet;
  /** limits whose figures are recorded for a page though nobody asked */
  readonly added: readonly string[];
  readonly job: SweepJob;
  readonly grid: Grid;
  readonly from: number;
  readonly to: number;
  readonly part: Part;
  readonly reading: StudyReading;
  /** of the first case */
  readonly warnings: readonly string[];
  readonly options: SweepOptions;
}

export interface Tallied {
  readonly cases: number;
  readonly notClosed: number;
}

export function counter() {
  const count = {
    cases: 0,
    notClosed: 0,
    add(converged: Uint8Array) {
      count.cases += converged.length;
      for (const one of converged) if (one === 0) count.notClosed++;
    },
  };
  return count;
}

export function summary({ cases, notClosed }: Tallied): string {
  const all = `${cases} ${cases === 1 ? 'case' : 'cases'}`;
  return notClosed === 0 ? all : `${all}, ${notClosed} of them not closed; their notes say why`;
}

/** Say what the first case warns of, on standard error. */
export function sayWarnings({ warnings, options }: Run): void {
  if (!options.quiet) for (const warning of warnings) say(`warning, first case: ${warning}`);
}

export function rowsOf({ pathRows, size }: Grid, from: number, to: number): number {
  return Math.min(to * pathRows, size) - from * pathRows;
}
