import { createHash } from 'node:crypto';
import { closeSync, fsyncSync, openSync, renameSync, rmSync, statSync, writeSync } from 'node:fs';
import { basename, dirname, extname, join } from 'node:path';
import { type SweepFormat, sweepCsv, sweepNdjson } from '../sheets/sweep.ts';
import type { PathTable } from '../study/sweep.ts';
import { realTarget } from './write-files.ts';

/** What a slice of a sweep says of itself, so that `gather` can tell where it belongs. */
export interface SliceMark {
  /** as asked for: k/n */
  readonly part: string;
  /** rows of the whole table that it holds, counted from 1, both ends among them */
  readonly first: number;
  readonly last: number;
  readonly total: number;
  /** fingerprint of flowsheet, options and version */
  readonly sweep: string;
}

/** A mark as it goes into the checksum of its slice, behind the rows. */
export function markText({ part, first, last, total, sweep }: SliceMark): string {
  return `${part} ${first} ${last} ${total} ${sweep}`;
}

/** Takes the pieces of a table in their order. */
export interface TableSink {
  add(table: PathTable): void;
  /** @param mark  null for a whole table */
  end(mark: SliceMark | null): void;
}

export type Write = (bytes: Uint8Array) => void;

/** Kinds of table by the ending of the file's name. */
export const tableKinds: ReadonlyMap<string, (heads: readonly string[], write: Write) => Promise<TableSink>> =
  new Map([
    ['.csv', async (heads, write) => textSink(sweepCsv, heads, write, csvMark)],
    ['.ndjson', async (heads, write) => textSink(sweepNdjson, heads, write, ndjsonMark)],
    ['.parquet', async (heads, write) => (await import('./parquet-file.ts')).createParquetSink(heads, write)],
  ]);

/**
 * The last line of a slice: behind the rows, so that the heads stay in the first line and a spreadsheet opens it as it
 * opens the whole; a slice without it is not whole.
 */
export function csvMark({ part, first, last, total, sweep }: SliceMark, sha256: string): string {
  return `# looptally slice ${part} rows ${first}-${last} of ${total} sweep ${sweep} sha256 ${sha256}\r\n`;
}

export function ndjsonMark(mark: SliceMark, sha256: string): string {
  return `${JSON.stringify({ looptally_slice: { ...mark, sha256 } })}\n`;
}

function textSink(
  format: SweepFormat,
  heads: readonly string[],
  write: Write,
  markLine: (mark: SliceMark, sha256: string) => string,
): TableSink {
  const sum = createHash('sha256');
  const put = (text: string) => {
    const bytes = Buffer.from(text);
    sum.update(bytes);
    write(bytes);
  };
  put(format.head(heads));
  return {
    add: (table) => put(format.rows(table, heads)),
    end: (mark) => {
      if (mark !== null) write(Buffer.from(markLine(mark, sum.update(markText(mark)).digest('hex'))));
    },
  };
}

/**
 * Write a file under a temporary name beside its own, and rename it when it is whole. What the body throws leaves
 * nothing behind. A link is followed; what is no plain file (a pipe, a device) is written to directly.
 */
export async function writeRenamed(path: string, body: (write: Write) => Promise<void>): Promise<void> {
  const target = realTarget(path);
  const isPlain = statSync(target, { throwIfNoEntry: false })?.isFile() ?? true;
  const temporary = isPlain ? join(dirname(target), `.${basename(target)}.${process.pid}.tmp`) : target;
  const file = openSync(temporary, 'w', 0o666);
  let open = true;
  try {
    await body((bytes) => {
      for (let done = 0; done < bytes.length; ) done += writeSync(file, bytes, done, bytes.length - done);
    });
    if (isPlain) fsyncSync(file);
    closeSync(file);
    open = false;
    if (isPlain) renameSync(temporary, target);
  } catch (error) {
    if (open) closeSync(file);
    if (isPlain) rmSync(temporary, { force: true });
    throw error;
  }
}

export function tableKind(path: string): string {
  return extname(path).toLowerCase();
}
