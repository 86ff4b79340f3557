import {
  accessSync,
  closeSync,
  constants,
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
    // A device or a pipe is written to as it is; everything else comes into being beside its name.
    if (there === null || there.isFile()) checkFolder(path, dirname(target));
  }
}

function checkFolder(path: string, folder: string): void {
  try {
    accessSync(folder, constants.W_OK);
  } catch (error) {
    throw cannotWrite(path, error as NodeJS.ErrnoException);
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
export function realTarget(path: string): string {
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

/** Do two paths lead to one file that is there? */
export function isSameFile(target: string, input: string): boolean {
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
    `${path} is read and would be written.`,
    'the result would overwrite the file it is made from',
    'give --out another name',
    path,
  );
}

function cannotWrite(path: string, error: NodeJS.ErrnoException): unknown {
  const why = systemSays(error);
  if (why === null) return error;
  return usageRefusal(
    'cannot-write',
    `${path} cannot be written.`,
    why,
    'check the folder and its permissions, or name another file; nothing was changed',
    path,
  );
}

/** What the system says when a file cannot be written, in words; null where the error is not one of the system. */
export function systemSays(error: unknown): string | null {
  const { code } = error as NodeJS.ErrnoException;
  if (code === undefined || !/^E[A-Z]/.test(code)) return null;
  return refusals[code] ?? `the system says ${code}`;
}

const refusals: Readonly<Record<string, string>> = {
  ENOSPC: 'the disk is full',
  EDQUOT: 'the disk is full',
  EFBIG: 'a file may not grow any larger here',
  EACCES: 'the system denies access to it',
  EPERM: 'the system denies access to it',
  EROFS: 'it lies where nothing can be written',
};
