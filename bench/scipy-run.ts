import { spawnSync } from 'node:child_process';
import type { ScipyProblem } from './scipy-problem.ts';

/** What one method of scipy made of the loop. */
export interface ScipySolve {
  readonly method: string;
  /** first guess of the recycle: the makeup, or nothing */
  readonly start: 'feed' | 'empty';
  /** the answer is right to the tolerance asked for */
  readonly converged: boolean;
  /** passes of the loop */
  readonly evaluations: number;
  /** null where it did not converge */
  readonly ms: number | null;
  /** recycle by component [mol/s] */
  readonly answer: readonly number[] | null;
  /** that scipy was given: the loosest that gives the right answer */
  readonly tolerance: number | null;
  /** why it did not converge */
  readonly note: string;
}

/** What scipy_loop.py says. */
export interface ScipyRun {
  readonly versions: { readonly python: string; readonly numpy: string; readonly scipy: string };
  /** recycle to the last digits [mol/s] */
  readonly answer: readonly number[];
  readonly pass_ms: number;
  readonly results: readonly ScipySolve[];
}

/** Why the comparison cannot be made here; null where it can. */
export function scipyMissing(): string | null {
  const { error, status } = spawnSync('python3', ['-c', 'import numpy, scipy'], { stdio: 'ignore' });
  if (error) return 'python3 is not installed (Debian: apt install python3 python3-numpy python3-scipy)';
  if (status !== 0) return 'python3-scipy is not installed (Debian: apt install python3-numpy python3-scipy)';
  return null;
}

/** @param script  path of scipy_loop.py */
export function runScipy(problem: ScipyProblem, script: string): ScipyRun {
  const { error, status, stdout, stderr } = spawnSync('python3', [script], {
    input: JSON.stringify(problem),
    encoding: 'utf8',
  });
  if (error || status !== 0) throw new Error(`${script} failed: ${error?.message ?? stderr}`);
  return JSON.parse(stdout) as ScipyRun;
}
