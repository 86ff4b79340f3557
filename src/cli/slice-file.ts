import { createHash } from 'node:crypto';
import { closeSync, fstatSync, openSync, readSync } from 'node:fs';
import { usageRefusal } from './refusal.ts';
import { csvMark, markText, ndjsonMark, type SliceMark, tableKind, type Write } from './table-file.ts';

/** A slice that says of itself where it belongs. */
export interface Slice {
  readonly path: string;
  readonly mark: SliceMark;
  /** the line of heads of a CSV, with its end; else empty */
  readonly head: string;
  /** hand over the bytes of its rows, heads and mark left out */
  copyRows(write: Write): void;
}

/** The mark of a slice is looked for in so many bytes at its end, its heads at its beginning. */
const END_BYTES = 4096;
const HEAD_BYTES = 1 << 20;
const CHUNK_BYTES = 1 << 20;

/** Open a slice that is text, and see that it is whole. @throws Refusal */
export function openTextSlice(path: string): Slice {
  const file = openSync(path, 'r');
  try {
    const { size } = fstatSync(file);
    const isCsv = tableKind(path) === '.csv';
    const tail = read(file, Math.max(0, size - END_BYTES), size).toString('utf8');
    const line = tail.slice(tail.lastIndexOf('\n', tail.length - 2) + 1);
    const found = isCsv ? csvMarkOf(line) : ndjsonMarkOf(line);
    if (found === null) throw noSlice(path);
    const end = size - Buffer.byteLength(line);
    const start = read(file, 0, Math.min(end, HEAD_BYTES)).toString('utf8');
    const head = isCsv ? start.slice(0, start.indexOf('\n') + 1) : '';
    const sum = createHash('sha256');
    copyBytes(path, 0, end, (bytes) => sum.update(bytes));
    if (sum.update(markText(found.mark)).digest('hex') !== found.sha256) throw changed(path);
    const from = Buffer.byteLength(head);
    return { path, mark: found.mark, head, copyRows: (write) => copyBytes(path, from, end, write) };
  } finally {
    closeSync(file);
  }
}

export function noSlice(path: string) {
  return usageRefusal(
    'no-slice',
    `${path} is no slice of a sweep, or not all of one.`,
    'a slice ends with the rows it holds and the sweep it belongs to; a whole table needs no joining',
    'make it with looptally sweep ... --part k/n --out NAME',
    path,
  );
}

export function changed(path: string) {
  return usageRefusal(
    'no-slice',
    `${path} is not as it was written.`,
    'its rows do not fit its checksum',
    'calculate this slice again',
    path,
  );
}

function csvMarkOf(line: string): { mark: SliceMark; sha256: string } | null {
  const match =
    /^# looptally slice (\S+) rows (\d+)-(\d+) of (\d+) sweep (\S+) sha256 ([0-9a-f]{64})\r\n$/.exec(line);
  if (match === null) return null;
  const [, part, first, last, total, sweep, sha256] = match as unknown as string[];
  const mark = {
    part: part!,
    first: Number(first),
    last: Number(last),
    total: Number(total),
    sweep: sweep!,
  };
  return csvMark(mark, sha256!) === line ? { mark, sha256: sha256! } : null;
}

function ndjsonMarkOf(line: string): { mark: SliceMark; sha256: string } | null {
  try {
    const { sha256, ...mark } = JSON.parse(line).looptally_slice as SliceMark & { sha256: string };
    return ndjsonMark(mark, sha256) === line ? { mark, sha256 } : null;
  } catch {
    return null;
  }
}

/** Hand over the bytes [from, to) of a file, piece by piece. */
export function copyBytes(path: string, from: number, to: number, write: Write): void {
  const file = openSync(path, 'r');
  try {
    for (let at = from; at < to; at += CHUNK_BYTES) write(read(file, at, Math.min(at + CHUNK_BYTES, to)));
  } finally {
    closeSync(file);
  }
}

function read(file: number, from: number, to: number): Buffer {
  const bytes = Buffer.alloc(to - from);
  let done = 0;
  while (done < bytes.length) {
    const more = readSync(file, bytes, done, bytes.length - done, from + done);
    if (more === 0) break;
    done += more;
  }
  return bytes.subarray(0, done);
}
