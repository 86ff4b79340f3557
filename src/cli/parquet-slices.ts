import { createHash } from 'node:crypto';
import { statSync } from 'node:fs';
import { asyncBufferFromFile, type FileMetaData, parquetMetadataAsync, parquetReadObjects } from 'hyparquet';
import type { PathTable } from '../study/sweep.ts';
import { createParquetSink, NO_SUM, SLICE_KEY } from './parquet-file.ts';
import { changed, copyBytes, noSlice, type Slice } from './slice-file.ts';
import { type SliceMark, writeRenamed } from './table-file.ts';

/** Rows that are unpacked at once. */
const STEP_ROWS = 5000;

/** Behind the metadata of a Parquet file: their length and four letters. @source the Parquet format */
const TAIL_BYTES = 8;

/** @throws Refusal where the file is no slice, or not as it was written */
export async function openParquetSlice(path: string): Promise<Slice> {
  const metadata = await metadataOf(path);
  const found = metadata === null ? null : markOf(metadata);
  if (metadata === null || found === null) throw noSlice(path);
  const { sha256, ...mark } = found;
  const rows = mark.last - mark.first + 1;
  if (Number(metadata.num_rows) !== rows || sumOf(path, metadata.metadata_length, sha256) !== sha256)
    throw changed(path);
  return {
    path,
    mark,
    head: JSON.stringify(headsOf(metadata)),
    copyRows() {
      throw new Error('rows of a Parquet slice are not copied');
    },
  };
}

function markOf({ key_value_metadata }: FileMetaData): (SliceMark & { readonly sha256: string }) | null {
  try {
    const mark = JSON.parse(key_value_metadata?.find(({ key }) => key === SLICE_KEY)?.value ?? '');
    const { part, first, last, total, sweep, sha256 } = mark;
    const isMark =
      [part, sweep, sha256].every((word) => typeof word === 'string') &&
      [first, last, total].every((row) => Number.isSafeInteger(row) && row > 0);
    return isMark ? { part, first, last, total, sweep, sha256 } : null;
  } catch {
    return null;
  }
}

/** Checksum of a file in whose metadata `stated` has not been filled in yet. */
function sumOf(path: string, metadataLength: number, stated: string): string {
  const { size } = statSync(path);
  const end = Math.max(0, size - metadataLength - TAIL_BYTES);
  const sum = createHash('sha256');
  copyBytes(path, 0, end, (bytes) => sum.update(bytes));
  const pieces: Uint8Array[] = [];
  copyBytes(path, end, size, (bytes) => pieces.push(bytes));
  const metadata = Buffer.concat(pieces);
  const at = metadata.lastIndexOf(stated);
  if (at >= 0) metadata.write(NO_SUM, at, 'latin1');
  return sum.update(metadata).digest('hex');
}

/** Unpack the slices and pack them again as the whole sweep would have been. */
export async function joinParquet(slices: readonly Slice[], out: string): Promise<void> {
  await writeRenamed(out, async (write) => {
    const sink = createParquetSink(JSON.parse(slices[0]!.head), write);
    for (const { path, mark } of slices) {
      const file = await asyncBufferFromFile(path);
      const metadata = await parquetMetadataAsync(file);
      const rows = mark.last - mark.first + 1;
      for (let rowStart = 0; rowStart < rows; rowStart += STEP_ROWS) {
        const rowEnd = Math.min(rowStart + STEP_ROWS, rows);
        sink.add(tableOf(await parquetReadObjects({ file, metadata, rowStart, rowEnd }), headsOf(metadata)));
      }
    }
    sink.end(null);
  });
}

async function metadataOf(path: string): Promise<FileMetaData | null> {
  const file = await asyncBufferFromFile(path);
  try {
    return await parquetMetadataAsync(file);
  } catch {
    return null; // no Parquet file, or the beginning of one
  }
}

function headsOf({ schema }: FileMetaData): string[] {
  return schema.slice(1).map(({ name }) => name);
}

function tableOf(rows: Record<string, unknown>[], heads: readonly string[]): PathTable {
  const numbers = heads.slice(0, -3);
  const cells = new Float64Array(rows.length * numbers.length);
  rows.forEach((row, r) => {
    numbers.forEach((name, c) => {
      cells[r * numbers.length + c] = (row[name] as number | null) ?? Number.NaN;
    });
  });
  return {
    path: 0,
    rows: rows.length,
    cells,
    converged: Uint8Array.from(rows, ({ converged }) => Number(converged)),
    passes: Int32Array.from(rows, ({ passes }) => Number(passes)),
    notes: rows.map(({ note }) => String(note)),
  };
}
