import { closeSync, openSync, readFileSync, renameSync, rmSync, writeSync } from 'node:fs';
import { hostname } from 'node:os';
import { type Refusal, usageRefusal } from './refusal.ts';

/** Held while a run writes a file, so that no second run writes it too. */
export interface Lock {
  /** the run that left it behind and is gone; null where nobody had it */
  readonly takenOverFrom: number | null;
  release(): void;
}

interface Holder {
  readonly pid: number;
  readonly host: string;
  /** when that process began, as its system counts it: a number of a process is given again; null where not known */
  readonly began: string | null;
}

/**
 * Take the lock `path`, a small file that says who has it. One left by a run of this machine that is gone (killed, power cut)
 * is taken over; of another machine that cannot be told, so its lock is left alone.
 *
 * @throws Refusal where another run has it; what the system says where it cannot be written
 */
export function takeLock(path: string, out: string): Lock {
  const left = create(path) ? null : takeOver(path, out);
  return { takenOverFrom: left, release: () => rmSync(path, { force: true }) };
}

function create(path: string): boolean {
  let file: number;
  try {
    file = openSync(path, 'wx');
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'EEXIST') return false;
    throw error;
  }
  try {
    writeSync(file, JSON.stringify({ pid: process.pid, host: hostname(), began: beganAt(process.pid) }));
  } catch (error) {
    rmSync(path, { force: true });
    throw error;
  } finally {
    closeSync(file);
  }
  return true;
}

/** @returns the process that is gone */
function takeOver(path: string, out: string): number {
  const text = textOf(path);
  const holder = holderIn(text);
  if (holder === null || !isGone(holder)) throw held(path, out, holder);
  // Of several that find it at once, the one that moves it away has it; a lock made in the meantime is put back.
  const aside = `${path}.${process.pid}`;
  try {
    renameSync(path, aside);
  } catch {
    throw held(path, out, holderIn(textOf(path)));
  }
  if (textOf(aside) !== text) {
    renameSync(aside, path);
    throw held(path, out, holderIn(textOf(path)));
  }
  rmSync(aside);
  if (!create(path)) throw held(path, out, holderIn(textOf(path)));
  return holder.pid;
}

function textOf(path: string): string {
  try {
    return readFileSync(path, 'utf8');
  } catch {
    return '';
  }
}

function holderIn(text: string): Holder | null {
  try {
    const { pid, host, began } = JSON.parse(text) as Holder;
    return Number.isSafeInteger(pid) && pid > 0 && typeof host === 'string' ? { pid, host, began } : null;
  } catch {
    return null;
  }
}

function isGone({ pid, host, began }: Holder): boolean {
  if (host !== hostname()) return false;
  try {
    process.kill(pid, 0);
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'ESRCH';
  }
  const now = beganAt(pid);
  return began !== null && now !== null && now !== began;
}

/** Field 22 of /proc/PID/stat, behind the name in brackets: its start in ticks of the system. @source proc(5) */
function beganAt(pid: number): string | null {
  const text = textOf(`/proc/${pid}/stat`);
  return text.slice(text.lastIndexOf(')') + 2).split(' ')[19] ?? null;
}

function held(path: string, out: string, holder: Holder | null): Refusal {
  const who = holder === null ? 'another run' : `process ${holder.pid} on ${holder.host}`;
  return usageRefusal(
    'held-by-another',
    `${out} is being written by another run.`,
    `${path} says that ${who} has it; two runs would spoil each other's work`,
    `wait for it, or name another file; if no such run is there any more, delete ${path}`,
    out,
  );
}
