import { mkdtempSync } from 'node:fs';
import { join } from 'node:path';
import { parentPort, workerData } from 'node:worker_threads';
import { makeCase } from './cases.ts';
import { readCorpus } from './corpus.ts';
import { createTables } from './judge-tables.ts';

/** What one case came to; `finding` says how the contract was broken, null where it was kept. */
export interface Judged {
  readonly index: number;
  readonly kind: string;
  readonly outcome: string;
  readonly finding: string | null;
  readonly ms: number;
}

export interface WorkerData {
  readonly flowsheets: string;
  readonly scratch: string;
  readonly seed: number;
}

/** Makes and judges the cases whose numbers it is told; a watchdog in the thread above sees that each ends. */
const { flowsheets, scratch: parent, seed } = workerData as WorkerData;
const port = parentPort!;
const scratch = mkdtempSync(join(parent, 'worker-'));
const bench = { corpus: readCorpus(flowsheets), tables: await createTables(scratch), scratch };
port.on('message', async (index: number) => {
  const began = performance.now();
  let kind = 'unmade';
  let outcome = 'broken';
  let finding: string | null = null;
  try {
    const one = makeCase(bench, seed, index);
    kind = one.kind;
    outcome = await one.judge();
  } catch (error) {
    finding = error instanceof Error ? (error.stack ?? error.message) : String(error);
  }
  port.postMessage({ index, kind, outcome, finding, ms: performance.now() - began } satisfies Judged);
});
port.postMessage('ready');
