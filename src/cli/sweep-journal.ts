import { createHash } from 'node:crypto';
import { closeSync, ftruncateSync, openSync, readFileSync, readSync, statSync, writeSync } from 'node:fs';
import type { PathTable } from '../study/sweep.ts';

/**
 * The side file of a sweep, NAME.part: what has been calculated, path after path, each with its checksum, behind a line
 * that says which sweep it belongs to. It is only ever added to. Whatever stops the program, at worst the last record is
 * torn, and its checksum tells; the table itself comes into being when all is there.
 *
 *   line of JSON (what the sweep is made from)
 *   record: path, length of the body [uint32 each], checksum [8 bytes], body
 *   body: rows, bytes of the notes [uint32 each], cells [float64], passes [int32], converged [uint8], notes [JSON]
 */
export interface Journal {
  /** paths that are in it, from the first on without a gap */
  readonly paths: number;
  add(table: PathTable): void;
  /** every path again, one at a time */
  tables(): Generator<PathTable>;
  close(): void;
}

/** What a sweep is made from, by name, so that a difference can be told. */
export type Identity = Readonly<Record<string, string>>;

const HEAD = 16;

/** @throws what the system says where the file is there already or cannot be written */
export function createJournal(path: string, identity: Identity, firstPath: number): Journal {
  const file = openSync(path, 'wx+', 0o666);
  const head = headOf(identity);
  writeWhole(file, head, 0);
  return journalOf(file, head.length, head.length, firstPath, 0);
}

/** Was the program stopped before it had said which sweep a side file belongs to? Then nothing is lost with it. */
export function isBarelyBegun(path: string, identity: Identity): boolean {
  const head = headOf(identity);
  const { size } = statSync(path);
  return size < head.length && head.subarray(0, size).equals(readFileSync(path));
}

function headOf(identity: Identity): Buffer {
  return Buffer.from(`${JSON.stringify(identity)}\n`);
}

/** What an existing side file says it belongs to, and where its records begin; null where it is none. */
export function readIdentity(path: string): { readonly identity: Identity; readonly begins: number } | null {
  const file = openSync(path, 'r');
  try {
    const room = Buffer.alloc(1 << 20);
    const length = readSync(file, room, 0, room.length, 0);
    const end = room.subarray(0, length).indexOf(10);
    if (end < 0) return null;
    const identity: unknown = JSON.parse(room.toString('utf8', 0, end));
    if (typeof identity !== 'object' || identity === null || !('looptally' in identity)) return null;
    return { identity: identity as Identity, begins: end + 1 };
  } catch (error) {
    if (error instanceof SyntaxError) return null;
    throw error;
  } finally {
    closeSync(file);
  }
}

/** Go on with a side file: what is whole is kept, a torn end is cut off. */
export function resumeJournal(path: string, begins: number, firstPath: number): Journal {
  const file = openSync(path, 'r+');
  let end = begins;
  let paths = 0;
  for (const { table, next } of records(file, begins, Number.POSITIVE_INFINITY)) {
    if (table.path !== firstPath + paths) break;
    paths++;
    end = next;
  }
  ftruncateSync(file, end);
  return journalOf(file, begins, end, firstPath, paths);
}

function journalOf(file: number, begins: number, from: number, firstPath: number, done: number): Journal {
  let end = from;
  let paths = done;
  const room = createRoom();
  return {
    get paths() {
      return paths;
    },
    add(table) {
      if (table.path !== firstPath + paths) throw new Error(`path ${table.path} came out of turn`);
      const record = encode(table, room);
      writeWhole(file, record, end);
      end += record.length;
      paths++;
    },
    *tables() {
      for (const { table } of records(file, begins, end)) yield table;
    },
    close: () => closeSync(file),
  };
}

function writeWhole(file: number, bytes: Uint8Array, at: number): void {
  for (let done = 0; done < bytes.length; ) {
    done += writeSync(file, bytes, done, bytes.length - done, at + done);
  }
}

function* records(
  file: number,
  begins: number,
  end: number,
): Generator<{ readonly table: PathTable; readonly next: number }> {
  const head = Buffer.alloc(HEAD);
  for (let at = begins; at + HEAD <= end; ) {
    if (readSync(file, head, 0, HEAD, at) < HEAD) return;
    const length = head.readUInt32LE(4);
    // A torn head may ask for anything: what is not there cannot be read, and is not made room for.
    const body = length <= LONGEST_BODY ? Buffer.alloc(length) : null;
    if (body === null || readSync(file, body, 0, length, at + HEAD) < length) return;
    if (!checksum(head.readUInt32LE(0), body).equals(head.subarray(8))) return;
    at += HEAD + length;
    yield { table: decode(head.readUInt32LE(0), body), next: at };
  }
}

/** A path of 256 rows with a thousand columns and a note each is far below. */
const LONGEST_BODY = 1 << 26;

function checksum(path: number, body: Uint8Array): Buffer {
  return createHash('sha256').update(`${path} `).update(body).digest().subarray(0, 8);
}

/** One piece of memory for record after record: as many pieces as paths would lie about until they are collected. */
function createRoom(): (bytes: number) => Buffer {
  let room = Buffer.alloc(0);
  return (bytes) => {
    if (room.length < bytes) room = Buffer.alloc(2 * bytes);
    return room.subarray(0, bytes);
  };
}

/** @returns a record in the room, which the next one will take */
function encode(
  { path, rows, cells, passes, converged, notes }: PathTable,
  room: (bytes: number) => Buffer,
): Buffer {
  const said = Buffer.from(
    JSON.stringify(Object.fromEntries(notes.flatMap((note, row) => (note === '' ? [] : [[row, note]])))),
  );
  const parts = [bytesOf(cells), bytesOf(passes), converged, said];
  const length = parts.reduce((sum, part) => sum + part.length, 8);
  const record = room(HEAD + length);
  record.writeUInt32LE(path, 0);
  record.writeUInt32LE(length, 4);
  record.writeUInt32LE(rows, HEAD);
  record.writeUInt32LE(said.length, HEAD + 4);
  let at = HEAD + 8;
  for (const part of parts) {
    record.set(part, at);
    at += part.length;
  }
  record.set(checksum(path, record.subarray(HEAD)), 8);
  return record;
}

function decode(path: number, body: Buffer): PathTable {
  const rows = body.readUInt32LE(0);
  const said = body.readUInt32LE(4);
  const notesAt = body.length - said;
  const convergedAt = notesAt - rows;
  const passesAt = convergedAt - 4 * rows;
  const copy = (from: number, to: number) => new Uint8Array(body.subarray(from, to)).buffer;
  const notes = new Array<string>(rows).fill('');
  const read = JSON.parse(body.toString('utf8', notesAt)) as Record<string, string>;
  for (const [row, note] of Object.entries(read)) notes[Number(row)] = note;
  return {
    path,
    rows,
    cells: new Float64Array(copy(8, passesAt)),
    passes: new Int32Array(copy(passesAt, convergedAt)),
    converged: new Uint8Array(copy(convergedAt, notesAt)),
    notes,
  };
}

function bytesOf(numbers: Float64Array | Int32Array): Uint8Array {
  return new Uint8Array(numbers.buffer, numbers.byteOffset, numbers.byteLength);
}
