import type { PathTable } from '../study/sweep.ts';
import { planOf, type SweepJob } from './sweep-job.ts';

/** What a worker says of a path whose numbers it has put into a slot. */
export interface PathMade {
  readonly path: number;
  readonly rows: number;
  /** null where all are empty: hundreds of them stay at home */
  readonly notes: readonly string[] | null;
}

/** What a worker is begun with. */
export interface WorkerJob {
  readonly job: SweepJob;
  readonly slots: number;
  readonly memory: SharedArrayBuffer;
}

/**
 * Memory that the threads of a sweep share: a slot for each of so many paths after one another, taken in turn. Sent as messages, the numbers of a path would
 * be left behind in the main thread by the megabyte. Nor are they transferred: once an array has been taken away from a
 * thread, its engine looks at every later access of any typed array whether that is still there, and a path takes a tenth
 * longer.
 */
export interface Slots {
  readonly memory: SharedArrayBuffer;
  put(table: PathTable): PathMade;
  /** good until the path is put there that is as many further on as there are slots */
  table(made: PathMade): PathTable;
}

/** @param memory  that of another thread; left out, it is made */
export function createSlots(job: SweepJob, count: number, memory?: SharedArrayBuffer): Slots {
  const { grid, record } = planOf(job);
  const { pathRows } = grid;
  const width = grid.axes.length + record.length;
  // Numbers of eight bytes first; the rest is padded, so that those of the next slot lie as they must.
  const bytes = Math.ceil((pathRows * (8 * width + 4 + 1)) / 8) * 8;
  const shared = memory ?? new SharedArrayBuffer(bytes * count);
  const slots = Array.from({ length: count }, (_, slot) => {
    const passesAt = slot * bytes + 8 * pathRows * width;
    return {
      cells: new Float64Array(shared, slot * bytes, pathRows * width),
      passes: new Int32Array(shared, passesAt, pathRows),
      converged: new Uint8Array(shared, passesAt + 4 * pathRows, pathRows),
    };
  });
  return {
    memory: shared,
    put({ path, rows, cells, passes, converged, notes }) {
      const into = slots[path % count]!;
      into.cells.set(cells);
      into.passes.set(passes);
      into.converged.set(converged);
      return { path, rows, notes: notes.every((note) => note === '') ? null : notes };
    },
    table({ path, rows, notes }) {
      const { cells, passes, converged } = slots[path % count]!;
      return {
        path,
        rows,
        cells: cells.subarray(0, rows * width),
        passes: passes.subarray(0, rows),
        converged: converged.subarray(0, rows),
        notes: notes ?? new Array<string>(rows).fill(''),
      };
    },
  };
}
