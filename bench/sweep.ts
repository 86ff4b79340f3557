import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { readAxis } from '../src/study/axis.ts';
import { createGrid } from '../src/study/grid.ts';
import { createSweeper } from '../src/study/sweep.ts';
import { compileFormula } from '../src/units/formula.ts';
import { column, cpuMs, median, title } from './measure.ts';
import { FOLDER, openShipped } from './shipped.ts';
import { speedRatio } from './take-turns.ts';

const LOOP = join(FOLDER, 'reference-loop.yaml');
const PROGRAM = 'dist/bench/command/cli.js';
const RECORD = ['figures.overall_yield.value', 'figures.recycle_ratio', 'figures.inerts.converter'];
const ROUNDS = 3;

const temperatures = (count: number) => `-25 degC..10 degC:${count}`;
const PURGE = '0.5 %..10 %:100';

/** A grid over condenser temperature and purge of the reference loop: speed in one thread, gain of two, memory. */
export async function benchSweep(): Promise<void> {
  title('Sweep of the reference loop over condenser temperature and purge, three figures recorded');
  await oneThread();
  const folder = mkdtempSync(join(tmpdir(), 'looptally-bench-'));
  try {
    await command(folder);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function oneThread(): Promise<void> {
  const flowsheet = await openShipped(LOOP);
  const axes = [
    readAxis('condenser.temperature', temperatures(100), 'temperature'),
    readAxis('purge.fractions.bleed', PURGE, 'fraction'),
  ].map((axis) => {
    if ('code' in axis) throw new Error(axis.what);
    return axis;
  });
  const record = RECORD.map((text) => {
    const formula = compileFormula(text, ['figures']);
    if (!formula.ok) throw new Error(formula.what);
    return { text, evaluate: formula.evaluate };
  });
  const grid = createGrid(axes);
  const sweep = createSweeper(flowsheet, { grid, record });
  for (let path = 0; path < 10; path++) sweep(path);
  let passes = 0;
  let failed = 0;
  const times = Array.from({ length: ROUNDS }, () =>
    cpuMs(() => {
      passes = 0;
      failed = 0;
      for (let path = 0; path < grid.paths; path++) {
        const table = sweep(path);
        for (const one of table.passes) passes += one;
        for (const one of table.converged) if (one === 0) failed++;
      }
    }),
  );
  const rate = (grid.size / median(times)) * 1e3;
  console.log(`${column(rate, 8)}  cases a second of one core, after warming up`);
  console.log(`${column(passes / grid.size, 8)}  passes a case, ${failed} of ${grid.size} not closed`);
}

/** Rows of the small and of the large grid along the condenser temperature; each has a hundred of the purge. */
const FEW = 100;
const MANY = 1000;
/** More than is done while it is watched, and what is done first: some 60,000 points of 45 bytes. */
const ENDLESS = 9000;
const WARM_BYTES = 2.7e6;

async function command(folder: string): Promise<void> {
  const rounds: { few: Run; many: Run }[][] = [];
  for (let round = 0; round < ROUNDS; round++) {
    const runs = [];
    for (const workers of [1, 2]) {
      runs.push({ few: await sweep(folder, FEW, workers), many: await sweep(folder, MANY, workers) });
    }
    rounds.push(runs);
  }
  const turns = [1, 2].map((workers) => ({
    args: commandOf(ENDLESS, workers),
    out: join(folder, `turns-${workers}.csv`),
  }));
  const steady = await speedRatio(turns[0]!, turns[1]!, WARM_BYTES);
  console.log(
    `${column(steady, 8)}  times as many cases a second with two workers as with one, both warmed up and taking turns`,
  );
  const gain = (ms: (runs: { few: Run; many: Run }) => number) =>
    column(median(rounds.map(([one, two]) => ms(one!) / ms(two!))), 8);
  console.log(
    `${gain(({ many }) => many.ms)}  times as fast for ${MANY * 100} points, start and table included`,
  );
  console.log(`${gain(({ few }) => few.ms)}  the same for ${FEW * 100} points, where starting takes longest`);
  for (const [workers, name] of ['one worker', 'two workers'].entries()) {
    const peak = (of: 'few' | 'many') =>
      column(Math.max(...rounds.map((runs) => runs[workers]![of].peakMB)), 8);
    console.log(`${peak('few')}  MB at most for ${FEW * 100} points, ${name}`);
    console.log(`${peak('many')}  MB at most for ${MANY * 100} points, ${name}`);
  }
}

interface Run {
  readonly ms: number;
  /** most memory that the process ever held */
  readonly peakMB: number;
}

function sweep(folder: string, count: number, workers: number): Promise<Run> {
  const began = performance.now();
  const out = join(folder, 'table.csv');
  const child = spawn(process.execPath, [...commandOf(count, workers), '--out', out]);
  let peakMB = Number.NaN;
  const watch = setInterval(() => {
    peakMB = peakOf(child.pid) ?? peakMB;
  }, 20);
  return new Promise((resolve, reject) => {
    child.on('exit', (code) => {
      clearInterval(watch);
      if (code === 0) resolve({ ms: performance.now() - began, peakMB });
      else reject(new Error(`the sweep ended with ${code}`));
    });
  });
}

function commandOf(count: number, workers: number): string[] {
  const over = [`condenser.temperature=${temperatures(count)}`, `purge.fractions.bleed=${PURGE}`];
  return [
    PROGRAM,
    'sweep',
    LOOP,
    ...over.flatMap((axis) => ['--over', axis]),
    ...['--record', RECORD.join(','), '--workers', String(workers), '--quiet'],
  ];
}

/** The high-water mark that the system keeps of a process; null where it is gone or the system keeps none. */
function peakOf(pid: number | undefined): number | null {
  try {
    const kB = /VmHWM:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1];
    return kB === undefined ? null : Number(kB) / 1e3;
  } catch {
    return null;
  }
}
