import { parentPort, workerData } from 'node:worker_threads';
import { openJob, type SweepJob } from './sweep-job.ts';

/** A worker of a sweep: told the number of a path, it sends back the rows of it. */
const port = parentPort!;
const sweep = await openJob(workerData as SweepJob);
port.on('message', (path: number) => {
  const table = sweep(path);
  const { cells, converged, passes } = table;
  port.postMessage(table, [cells.buffer, converged.buffer, passes.buffer] as ArrayBuffer[]);
});
