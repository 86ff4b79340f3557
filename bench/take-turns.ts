import { type ChildProcess, spawn } from 'node:child_process';
import { rmSync, statSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import { median } from './measure.ts';

/** Turn of each, and how many turns [ms]. */
const TURN_MS = 400;
const TURNS = 30;

/** A sweep that goes on for longer than it is watched; its side file tells how far it has come. */
export interface LongSweep {
  readonly args: readonly string[];
  /** the table it would write */
  readonly out: string;
}

/**
 * How many times as fast the second of two sweeps is as the first, both warmed up. They take turns, the one stopped while
 * the other runs, so that neither has the quieter half of the machine's day: between one minute and the next, the same work
 * may take half as long again.
 *
 * @param warmBytes  what each has done before it is watched, as its side file counts
 * @returns the median over the turns; NaN where the system cannot stop a process for a while
 */
export async function speedRatio(first: LongSweep, second: LongSweep, warmBytes: number): Promise<number> {
  if (process.platform === 'win32') return Number.NaN;
  const runs = [begin(first), begin(second)];
  try {
    for (const run of runs) {
      run.child.kill('SIGCONT');
      while (run.done() < warmBytes) await watch(run.child, 20);
      run.child.kill('SIGSTOP');
    }
    const ratios: number[] = [];
    for (let turn = 0; turn < TURNS; turn++) {
      const [one, other] = [await rateOf(runs[0]!), await rateOf(runs[1]!)];
      ratios.push(other / one);
    }
    return median(ratios);
  } finally {
    for (const { child, clear } of runs) {
      child.kill('SIGKILL');
      clear();
    }
  }
}

interface Running {
  readonly child: ChildProcess;
  /** bytes of its side file */
  done(): number;
  clear(): void;
}

function begin({ args, out }: LongSweep): Running {
  const child = spawn(process.execPath, [...args, '--out', out], { stdio: ['ignore', 'ignore', 'inherit'] });
  child.kill('SIGSTOP');
  return {
    child,
    done: () => statSync(`${out}.part`, { throwIfNoEntry: false })?.size ?? 0,
    clear() {
      for (const left of [`${out}.part`, `${out}.part.lock`]) rmSync(left, { force: true });
    },
  };
}

async function rateOf({ child, done }: Running): Promise<number> {
  const before = done();
  const began = performance.now();
  child.kill('SIGCONT');
  await watch(child, TURN_MS);
  child.kill('SIGSTOP');
  return (done() - before) / (performance.now() - began);
}

async function watch(child: ChildProcess, ms: number): Promise<void> {
  await sleep(ms);
  if (child.exitCode !== null) throw new Error(`a sweep ended by itself with ${child.exitCode}`);
}
