import { Worker } from 'node:worker_threads';
import type { Judged, WorkerData } from './worker.ts';

export interface RunWanted extends WorkerData {
  /** the bundled worker */
  readonly entry: string;
  /** number of the first case, and the step to the next one */
  readonly from: number;
  readonly step: number;
  /** asked before each case */
  readonly more: (done: number) => boolean;
  readonly take: (judged: Judged) => void;
}

/** Longest time a case may take [CPU ms of this process]: what others on the machine do does not count. */
export const LONGEST_MS = 2000;
const LOOK_MS = 50;

/** Run cases in a thread of their own, one after another; one that does not end is a finding, and its thread is ended. */
export async function runCases(wanted: RunWanted): Promise<void> {
  let index = wanted.from;
  for (let done = 0; wanted.more(done); ) {
    done += await withWorker(wanted, index, done);
    index = wanted.from + done * wanted.step;
  }
}

/** @returns cases that were judged before the thread had to be ended, that one among them */
function withWorker(wanted: RunWanted, first: number, before: number): Promise<number> {
  const { flowsheets, scratch, seed, step, more, take } = wanted;
  return new Promise((resolve, reject) => {
    const worker = new Worker(wanted.entry, { workerData: { flowsheets, scratch, seed } });
    let index = first;
    let done = 0;
    let began = process.cpuUsage();
    const end = () => {
      clearInterval(watchdog);
      worker.removeAllListeners();
      void worker.terminate().then(() => resolve(done), reject);
    };
    const next = () => {
      if (!more(before + done)) end();
      else {
        began = process.cpuUsage();
        worker.postMessage(index);
      }
    };
    const judged = (one: Judged) => {
      take(one);
      done++;
      index += step;
    };
    const spent = () => {
      const { user, system } = process.cpuUsage(began);
      return (user + system) / 1e3;
    };
    let ready = false;
    const watchdog = setInterval(() => {
      if (!ready || spent() < LONGEST_MS) return;
      const finding = `no end after ${LONGEST_MS} ms`;
      judged({ index, kind: 'hang', outcome: 'broken', finding, ms: spent() });
      end();
    }, LOOK_MS);
    worker.on('message', (message: Judged | 'ready') => {
      if (message === 'ready') ready = true;
      else judged({ ...message, ms: spent() });
      next();
    });
    worker.on('error', (error) => {
      judged({
        index,
        kind: 'thread',
        outcome: 'broken',
        finding: error.stack ?? error.message,
        ms: spent(),
      });
      end();
    });
  });
}
