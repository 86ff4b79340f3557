import { existsSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import { Worker } from 'node:worker_threads';
import type { PathTable } from '../study/sweep.ts';
import { openJob, type SweepJob } from './sweep-job.ts';
import { createSlots, type PathMade, type WorkerJob } from './sweep-slots.ts';

/** Without --workers: so long the first paths are made here, and what is left must take so long to start workers [ms]. */
const ALONE_MS = 400;
const WORTH_MS = 1500;
/** Paths that may be finished ahead of the one that is written next, for each worker. */
const AHEAD = 6;
/** Paths that a worker has before it: while it waits for its next one, it does nothing. */
const IN_HAND = 2;

/** A worker thread ended before its work did. */
export class WorkerLost extends Error {
  constructor(why: string) {
    super(why);
    this.name = 'WorkerLost';
  }
}

export interface PathsWanted {
  /** paths [from, to) */
  readonly from: number;
  readonly to: number;
  /** worker threads; undefined: as many as there are processors, where that is worth it */
  readonly workers: number | undefined;
  /** ends the work between two paths */
  readonly signal?: AbortSignal | undefined;
}

/**
 * Of what a path leaves behind, little lives on: with the usual room for young objects each worker would take 50 MB more, and
 * with the usual one for old objects it would let them pile up to four times what it needs before it looks [MB].
 */
const HEAP = { maxYoungGenerationSizeMb: 8, maxOldGenerationSizeMb: 1000 };

/**
 * Make the paths of a job and hand them over in their order, whoever finishes first.
 *
 * @param take  what it is handed is good until it returns
 * @throws WorkerLost; the reason of the signal; what `take` throws
 */
export async function makePaths(
  job: SweepJob,
  wanted: PathsWanted,
  take: (table: PathTable) => void,
): Promise<void> {
  const { to, signal } = wanted;
  let next = wanted.from;
  let workers = wanted.workers ?? Number.POSITIVE_INFINITY;
  const entry = workerEntry();
  if (workers === 1 || entry === null || wanted.workers === undefined) {
    const sweep = await openJob(job);
    const began = performance.now();
    while (next < to) {
      take(sweep(next++));
      // Signals and the progress bar have their turn between two paths.
      await new Promise(setImmediate);
      if (signal?.aborted) break;
      if (wanted.workers !== undefined || entry === null) continue;
      const spent = performance.now() - began;
      if (spent > ALONE_MS && (spent / (next - wanted.from)) * (to - next) > WORTH_MS) break;
    }
    workers = availableParallelism();
  }
  signal?.throwIfAborted();
  if (next < to)
    await withWorkers(job, entry!, { from: next, to, signal }, Math.min(workers, to - next), take);
}

/** The bundled worker lies beside the command line; run from its sources, a sweep works in one thread. */
function workerEntry(): string | null {
  const places = ['./sweep-worker.js', '../sweep-worker.js'];
  return places.map((place) => fileURLToPath(new URL(place, import.meta.url))).find(existsSync) ?? null;
}

function withWorkers(
  job: SweepJob,
  entry: string,
  { from, to, signal }: Omit<PathsWanted, 'workers'>,
  count: number,
  take: (table: PathTable) => void,
): Promise<void> {
  return new Promise((resolve, reject) => {
    const slots = createSlots(job, AHEAD * count);
    const workerData: WorkerJob = { job, slots: AHEAD * count, memory: slots.memory };
    const waiting = new Map<number, PathMade>();
    /** workers, each as often as it can be given a path */
    const ready: Worker[] = [];
    let given = from;
    let due = from;
    const workers = Array.from(
      { length: count },
      () => new Worker(entry, { workerData, resourceLimits: HEAP }),
    );
    let ended = false;
    const end = (finish: () => void) => {
      ended = true;
      signal?.removeEventListener('abort', stop);
      for (const worker of workers) void worker.terminate();
      finish();
    };
    const stop = () => end(() => reject(signal?.reason));
    signal?.addEventListener('abort', stop);
    const giveOut = () => {
      while (ready.length > 0 && given < to && given < due + AHEAD * count)
        ready.shift()!.postMessage(given++);
    };
    for (let hand = 0; hand < IN_HAND; hand++) ready.push(...workers);
    for (const worker of workers) {
      worker.on('error', (error: NodeJS.ErrnoException) => {
        const isMemory = error.code === 'ERR_WORKER_OUT_OF_MEMORY';
        end(() => reject(isMemory ? new WorkerLost('it ran out of memory') : error));
      });
      worker.on('exit', (code) => {
        if (!ended) end(() => reject(new WorkerLost(`it ended by itself with code ${code}`)));
      });
      worker.on('message', (made: PathMade) => {
        if (ended) return;
        waiting.set(made.path, made);
        ready.push(worker);
        try {
          for (let next = waiting.get(due); next !== undefined; next = waiting.get(due)) {
            waiting.delete(due++);
            take(slots.table(next));
          }
        } catch (error) {
          end(() => reject(error));
          return;
        }
        if (due === to) end(resolve);
        else giveOut();
      });
    }
    giveOut();
  });
}
