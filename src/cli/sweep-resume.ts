import { createHash } from 'node:crypto';
import { existsSync, rmSync, statfsSync } from 'node:fs';
import { dirname } from 'node:path';
import { exitCodes } from './exit-codes.ts';
import { type Refusal, usageRefusal, usageRefusals } from './refusal.ts';
import type { SweepJob } from './sweep-job.ts';
import {
  createJournal,
  type Identity,
  isBarelyBegun,
  type Journal,
  readIdentity,
  resumeJournal,
} from './sweep-journal.ts';
import { version } from './version.ts';
import { systemSays } from './write-files.ts';

/** What a sweep is made from: where one of these differs, the rows would. */
export function identityOf(job: SweepJob, part: string): Identity {
  return {
    looptally: version,
    flowsheet: digest(job.text),
    '--case': job.case ?? 'none',
    '--set': job.set.join(' ') || 'nothing',
    '--over': job.axes
      .map(({ path, unit, numbers }) => {
        const ends = [numbers[0], numbers.at(-1)].map((number) => `${number} ${unit}`.trim()).join(' to ');
        return `${path} ${ends} in ${numbers.length} (${digest(numbers.join(' ')).slice(0, 8)})`;
      })
      .join(', '),
    '--record': job.record.join(', '),
    '--method': job.method ?? 'as in the file',
    '--tolerance': String(job.tolerance ?? 'as in the file'),
    '--max-passes': String(job.maxPasses ?? 'as in the file'),
    '--part': part,
  };
}

/** The fingerprint that all slices of one sweep share. */
export function fingerprintOf(identity: Identity): string {
  const { '--part': _, ...rest } = identity;
  return digest(JSON.stringify(rest)).slice(0, 16);
}

/** Begin a side file, or go on with the one that is there. @throws Refusal */
export function openJournal(out: string, identity: Identity, firstPath: number, resume: boolean): Journal {
  const path = `${out}.part`;
  try {
    if (!existsSync(path)) return createJournal(path, identity, firstPath);
    if (!resume) throw unfinished(out, path);
    if (isBarelyBegun(path, identity)) {
      rmSync(path);
      return createJournal(path, identity, firstPath);
    }
    const found = readIdentity(path);
    if (found === null) throw noSideFile(path);
    const different = Object.keys(identity).filter((key) => found.identity[key] !== identity[key]);
    if (different.length > 0) throw otherSweep(path, different, found.identity, identity);
    return resumeJournal(path, found.begins, firstPath);
  } catch (error) {
    throw writeTrouble(path, error, false);
  }
}

/** Room that the side file and the table take: an estimate on the safe side [bytes]. */
export function checkRoom(out: string, rows: number, numbers: number): void {
  const wanted = rows * (numbers * (8 + 14) + 40);
  const { bavail, bsize } = statfsSync(dirname(out) || '.');
  if (wanted <= bavail * bsize) return;
  throw usageRefusal(
    'cannot-write',
    `There is no room for ${out}.`,
    `a table of ${rows} rows takes about ${megabytes(wanted)}, and ${megabytes(bavail * bsize)} are free`,
    'make room, record fewer expressions, or write it elsewhere',
    out,
  );
}

/** What the system says when a table cannot be written, in words; everything else as it came. */
export function writeTrouble(path: string, error: unknown, begun: boolean): unknown {
  const why = systemSays(error);
  if (why === null) return error;
  return usageRefusal(
    'cannot-write',
    `${path} cannot be written.`,
    begun ? `${why}; what is done so far is kept` : why,
    begun ? 'make room and repeat the command with --resume' : 'check the folder, or name another file',
    path.replace(/\.part$/, ''),
  );
}

/** A worker is gone: neither the user nor the flowsheet did that, and going on by itself might only repeat it. */
export function workerLost({ message }: Error, kept: string, mend: string): Refusal {
  return usageRefusals(
    [
      {
        code: 'worker-lost',
        what: 'a thread of this sweep ended before its work was done.',
        why: `${message}${kept}`,
        mend,
        at: null,
      },
    ],
    exitCodes.fault,
  );
}

function unfinished(out: string, path: string): Refusal {
  return usageRefusal(
    'unfinished-sweep',
    `${path} holds a sweep that was not finished.`,
    'it would be lost',
    `add --resume to go on with it, or delete it to begin anew`,
    out,
  );
}

function noSideFile(path: string): Refusal {
  return usageRefusal(
    'other-sweep',
    `${path} is no unfinished sweep.`,
    'it does not begin as one',
    'delete it, or give --out another name',
    path.replace(/\.part$/, ''),
  );
}

function otherSweep(path: string, different: readonly string[], was: Identity, is: Identity): Refusal {
  const said = different.map((key) =>
    key === 'flowsheet'
      ? 'the flowsheet has changed since'
      : key === 'looptally'
        ? `it was begun by Looptally ${was[key]}, and this is ${is[key]}`
        : `${key} was ${was[key] ?? 'not known'}, and is ${is[key]}`,
  );
  return usageRefusal(
    'other-sweep',
    `${path} belongs to another sweep.`,
    said.join('; '),
    'repeat the command with the flowsheet and options it was begun with, or delete it to begin anew',
    path.replace(/\.part$/, ''),
  );
}

function megabytes(bytes: number): string {
  return `${(bytes / 1e6).toPrecision(3)} MB`;
}

function digest(text: string): string {
  return createHash('sha256').update(text).digest('hex');
}
