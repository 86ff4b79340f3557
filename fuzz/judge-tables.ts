import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import { openParquetSlice } from '../src/cli/parquet-slices.ts';
import { Refusal } from '../src/cli/refusal.ts';
import { openTextSlice } from '../src/cli/slice-file.ts';
import { createJournal, readIdentity, resumeJournal } from '../src/cli/sweep-journal.ts';
import { tableKinds } from '../src/cli/table-file.ts';
import type { PathTable } from '../src/study/sweep.ts';

/** What a sweep leaves behind, whole, for mutants of it to be judged against. */
export interface Tables {
  readonly paths: readonly PathTable[];
  readonly journal: Uint8Array;
  /** slices by the ending of their name */
  readonly slices: ReadonlyMap<string, Uint8Array>;
}

const HEADS = ['condenser.temperature', 'figures.recycle_ratio', 'converged', 'passes', 'note'];
const IDENTITY = { looptally: 'any', flowsheet: 'any' };
const MARK = { part: '1/2', first: 1, last: 24, total: 48, sweep: '0123456789abcdef' };

export async function createTables(scratch: string): Promise<Tables> {
  const paths = [0, 1, 2].map((path): PathTable => {
    const rows = 8;
    const cells = Float64Array.from({ length: 2 * rows }, (_, k) => (k === 5 ? Number.NaN : k / 3 - path));
    const notes = Array.from({ length: rows }, (_, row) => (row === 2 ? 'no-way-out: "A, B"\n=1' : ''));
    return {
      path,
      rows,
      cells,
      notes,
      passes: new Int32Array(rows).fill(4),
      converged: new Uint8Array(rows).fill(1),
    };
  });
  const file = `${scratch}/whole.part`;
  const journal = createJournal(file, IDENTITY, 0);
  for (const table of paths) journal.add(table);
  journal.close();
  const slices = new Map<string, Uint8Array>();
  for (const [kind, createSink] of tableKinds) {
    const chunks: Uint8Array[] = [];
    const sink = await createSink(HEADS, (bytes) => chunks.push(Uint8Array.from(bytes)));
    for (const table of paths) sink.add(table);
    sink.end(MARK);
    slices.set(kind, Buffer.concat(chunks));
  }
  const bytes = readFileSync(file);
  rmSync(file);
  return { paths, journal: bytes, slices };
}

/** A damaged side file is refused, or gives the paths up to the damage as they were. */
export function judgeJournal(bytes: Uint8Array, { paths }: Tables, scratch: string): string {
  const file = `${scratch}/mutant.part`;
  writeFileSync(file, bytes);
  const found = readIdentity(file);
  if (found === null) return 'refused';
  const journal = resumeJournal(file, found.begins, 0);
  try {
    const kept = [...journal.tables()];
    if (kept.length !== journal.paths) throw new Error('the side file miscounts its paths');
    kept.forEach((table, k) => {
      if (said(table) !== said(paths[k]))
        throw new Error(`path ${k} of the side file is not as it was written`);
    });
    return kept.length === paths.length ? 'whole' : 'cut short';
  } finally {
    journal.close();
  }
}

/** A slice is refused, or has the rows that it was written with. */
export async function judgeSlice(
  bytes: Uint8Array,
  kind: string,
  whole: Uint8Array,
  scratch: string,
): Promise<string> {
  const file = `${scratch}/mutant${kind}`;
  writeFileSync(file, bytes);
  try {
    if (kind === '.parquet') {
      const { mark, head } = await openParquetSlice(file);
      if (JSON.stringify(mark) !== JSON.stringify(MARK) || head !== JSON.stringify(HEADS))
        throw new Error('a slice with another mark was taken for whole');
      return 'opened';
    }
    const slice = openTextSlice(file);
    const rows: Uint8Array[] = [Buffer.from(slice.head)];
    slice.copyRows((piece) => rows.push(Uint8Array.from(piece)));
    const all = Buffer.concat(rows);
    if (!all.equals(whole.subarray(0, all.length)))
      throw new Error('a slice with other rows was taken for whole');
    return 'opened';
  } catch (error) {
    if (error instanceof Refusal) return 'refused';
    throw error;
  }
}

function said(table: PathTable | undefined): string {
  if (table === undefined) return 'nothing';
  const { path, rows, cells, passes, converged, notes } = table;
  return [path, rows, [...cells], [...passes], [...converged], notes.join('|')].join(' ');
}
