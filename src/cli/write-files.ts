import {
  closeSync,
  fsyncSync,
  openSync,
  realpathSync,
  renameSync,
  rmSync,
  type Stats,
  statSync,
  writeFileSync,
} from 'node:fs';
import { basename, dirname, join, resolve } from 'node:path';
import { type Refusal, usageRefusal } from './refusal.ts';

export interface Output {
  readonly path: string;
  readonly content: string | Uint8Array;
}

/**
 * Refuse outputs that cannot be meant: the input itself, one file twice, a folder, a folder that is not there.
 * Called before any work is done, so that nobody waits for a result that has nowhere to go.
 */
export function checkOutputs(paths: readonly string[], input: string | null): void {
  const seen = new Set<string>();
  for (const path of paths) {
    if (path.trim() === '') {
      throw usageRefusal(
        'bad-output',
        'An output has no name.',
        '--out needs a file name',
        'write --out NAME',
        '--out',
      );
    }
    const target = realTarget(path);
    if (seen.has(target)) throw sameTwice(path);
    seen.add(target);
    if (input !== null && input !== '-' && isSameFile(target, input)) throw overwritesInput(path);
    const there = statOf(target);
    if (there?.isDirectory()) {
      throw usageRefusal('bad-output', `${path} is a folder.`, '--out names a file', 'add a file name', path);
    }
    if (!statOf(dirname(target))?.isDirectory()) {
      throw usageRefusal(
        'bad-output',
        `${path} cannot be written.`,
        `there is no folder ${dirname(path)}`,
        'make the folder first, or name another one',
        path,
      );
    }
  }
}

/**
 * Write all outputs or none: every file is first written whole under a temporary name in its own folder, then
 * all are renamed. A file that is not a plain one (a pipe, /dev/stdout) is written to directly.
 */
export function writeOutputs(outputs: readonly Output[]): void {
  const pending: { readonly temporary: string; readonly target: string; readonly path: string }[] = [];
  let current = outputs[0]?.path ?? '';
  try {
    for (const { path, content } of outputs) {
      current = path;
      const target = realTarget(path);
      const there = statOf(target);
      if (there && !there.isFile()) {
        writeFileSync(target, content);
        continue;
      }
      const temporary = join(dirname(target), `.${basename(target)}.${process.pid}.tmp`);
      pending.push({ temporary, target, path });
      writeWhole(temporary, content, there ? there.mode & 0o777 : 0o666);
    }
    while (pending.length > 0) {
      const { temporary, target, path } = pending[0]!;
      current = path;
      renameSync(temporary, target);
      pending.shift();
    }
  } catch (error) {
    throw cannotWrite(current, error as NodeJS.ErrnoException);
  } finally {
    for (const { temporary } of pending) rmSync(temporary, { force: true });
  }
}

function writeWhole(path: string, content: string | Uint8Array, mode: number): void {
  const handle = openSync(path, 'w', mode);
  try {
    writeFileSync(handle, content);
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
}

/** The file a path leads to, through links; the path itself where nothing is there yet. */
function realTarget(path: string): string {
  try {
    return realpathSync(path);
  } catch {
    try {
      return join(realpathSync(dirname(path)), basename(path));
    } catch {
      return resolve(path);
    }
  }
}

function isSameFile(target: string, input: string): boolean {
  const a = statOf(target);
  const b = statOf(input);
  return a !== null && b !== null && a.dev === b.dev && a.ino === b.ino;
}

function statOf(path: string): Stats | null {
  return statSync(path, { throwIfNoEntry: false }) ?? null;
}

function sameTwice(path: string): Refusal {
  return usageRefusal(
    'bad-output',
    `${path} is named twice.`,
    'two sheets cannot be written to one file',
    'give each --out a name of its own',
    path,
  );
}

function overwritesInput(path: string): Refusal {
  return usageRefusal(
    'bad-output',
    `${path} is the flowsheet itself.`,
    'the sheet would overwrite the file it is made from',
    'give --out another name',
    path,
  );
}

function cannotWrite(path: string, error: NodeJS.ErrnoException): unknown {
  if (error.code === undefined) return error;
  return usageRefusal(
    'cannot-write',
    `${path} cannot be written.`,
    error.code === 'EACCES' || error.code === 'EPERM'
      ? 'the system denies access to it'
      : error.code === 'ENOSPC'
        ? 'the disk is full'
        : `the system says ${error.code}`,
    'check the folder and its permissions, or name another file; nothing was changed',
    path,
  );
}
