import { existsSync, rmSync } from 'node:fs';
import { sweepHeads } from '../study/sweep.ts';
import { type Lock, takeLock } from './lock.ts';
import { openSlice } from './open-slice.ts';
import { createProgress } from './progress.ts';
import { Refusal } from './refusal.ts';
import { Stopped, stoppable, tellStopped } from './stop-signals.ts';
import { isPage } from './study-page.ts';
import { planOf } from './sweep-job.ts';
import type { Journal } from './sweep-journal.ts';
import { createPageSink } from './sweep-page.ts';
import { makePaths, WorkerLost } from './sweep-pool.ts';
import {
  checkRoom,
  fingerprintOf,
  identityOf,
  openJournal,
  workerLost,
  writeTrouble,
} from './sweep-resume.ts';
import { counter, type Run, rowsOf, summary, type Tallied } from './sweep-run.ts';
import { tableKind, tableKinds, writeRenamed } from './table-file.ts';
import { print, printJson, say } from './terminal.ts';

type FileRun = Run & { readonly out: string };

/**
 * The table of a sweep into a file, by way of its side file.
 *
 * @returns null where it was stopped, or where the slice was there already
 */
export async function toFile(run: FileRun): Promise<Tallied | null> {
  const { options, out } = run;
  const lock = lockOf(run);
  try {
    if (options.resume && !existsSync(`${out}.part`) && existsSync(out) && (await isDone(run))) return null;
    return await stoppable((signal) => calculated(run, signal));
  } catch (error) {
    if (!(error instanceof Stopped)) throw error;
    tellStopped(
      error,
      `what is done so far is kept in ${out}.part; the same command with --resume goes on with it`,
    );
    return null;
  } finally {
    lock.release();
  }
}

function lockOf({ out, options }: FileRun): Lock {
  const path = `${out}.part.lock`;
  let lock: Lock;
  try {
    lock = takeLock(path, out);
  } catch (error) {
    throw writeTrouble(path, error, false);
  }
  const { takenOverFrom } = lock;
  if (takenOverFrom !== null && !options.quiet)
    say(`${path} was left by process ${takenOverFrom}, which is gone: taken over`);
  return lock;
}

/**
 * A finished slice says which sweep it is of, and needs no second calculation. A whole table says nothing but its rows, so
 * that of another flowsheet could not be told from it.
 */
async function isDone(run: FileRun): Promise<boolean> {
  const { job, part, options, out } = run;
  if (part.of > 1) {
    const identity = identityOf(job, `${part.part}/${part.of}`);
    const mark = sliceMark(run, fingerprintOf(identity));
    if (JSON.stringify(await markOf(out)) === JSON.stringify(mark)) {
      const cases = mark.last - mark.first + 1;
      if (options.json) printJson({ table: out, cases, not_converged: null, note: [], already_whole: true });
      else if (!options.quiet)
        say(`${out} is whole already: ${cases} cases of this sweep; nothing was calculated`);
      return true;
    }
  }
  if (!options.quiet) say(`${out} does not say that it is whole and of this sweep: it is calculated again`);
  return false;
}

async function markOf(out: string): Promise<unknown> {
  try {
    const { part, first, last, total, sweep } = (await openSlice(out)).mark;
    return { part, first, last, total, sweep };
  } catch (error) {
    if (error instanceof Refusal) return null;
    throw error;
  }
}

async function calculated(run: FileRun, signal: AbortSignal): Promise<Tallied> {
  const { flowsheet, added, job, grid, from, to, part, reading, warnings, options, out } = run;
  const heads = sweepHeads(planOf(job));
  checkRoom(out, rowsOf(grid, from, to), heads.length - 3);
  const identity = identityOf(job, `${part.part}/${part.of}`);
  const journal = openJournal(out, identity, from, options.resume === true);
  const count = counter();
  try {
    for (const { converged } of journal.tables()) count.add(converged);
    await calculateRest(run, journal, count, signal);
    await writeRenamed(out, async (write) => {
      const sink = isPage(out)
        ? createPageSink({ flowsheet, added, job, heads, reading, warnings, out, write })
        : await tableKinds.get(tableKind(out))!(heads, write);
      for (const rows of journal.tables()) {
        reading.add(rows);
        sink.add(rows);
      }
      sink.end(part.of === 1 ? null : sliceMark(run, fingerprintOf(identity)));
    });
  } catch (error) {
    if (error instanceof WorkerLost) {
      throw workerLost(
        error,
        `; what is done so far is kept in ${out}.part`,
        'repeat the command with --resume, and fewer --workers',
      );
    }
    throw writeTrouble(`${out}.part`, error, true);
  } finally {
    journal.close();
  }
  rmSync(`${out}.part`);
  const note = reading.lines();
  if (options.json) printJson({ table: out, cases: count.cases, not_converged: count.notClosed, note });
  else print(note.map((line) => `${line}\n`).join(''));
  if (!options.quiet && !options.json) say(`${out}: ${summary(count)}${share(run)}`);
  return count;
}

async function calculateRest(
  { job, grid, from, to, options }: FileRun,
  journal: Journal,
  count: ReturnType<typeof counter>,
  signal: AbortSignal,
): Promise<void> {
  const progress = await createProgress(rowsOf(grid, from, to), count.cases, options.quiet === true);
  try {
    const wanted = { from: from + journal.paths, to, workers: options.workers, signal };
    await makePaths(job, wanted, (rows) => {
      journal.add(rows);
      count.add(rows.converged);
      progress.tell(count.cases, count.notClosed);
    });
  } finally {
    progress.end();
  }
}

/** What a slice has of the whole; silent for the whole. */
function share(run: Run): string {
  if (run.part.of === 1) return '';
  const { first, last, total } = sliceMark(run, '');
  return `; rows ${first} to ${last} of ${total}`;
}

function sliceMark({ grid, from, to, part }: Run, sweep: string) {
  return {
    part: `${part.part}/${part.of}`,
    first: from * grid.pathRows + 1,
    last: Math.min(to * grid.pathRows, grid.size),
    total: grid.size,
    sweep,
  };
}
