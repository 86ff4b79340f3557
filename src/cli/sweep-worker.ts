import { parentPort, workerData } from 'node:worker_threads';
import { openJob } from './sweep-job.ts';
import { createSlots, type WorkerJob } from './sweep-slots.ts';

/** A worker of a sweep: told the number of a path, it puts the rows of it into the slot of that. */
const port = parentPort!;
const { job, slots: count, memory } = workerData as WorkerJob;
const slots = createSlots(job, count, memory);
const sweep = await openJob(job);
port.on('message', (path: number) => {
  port.postMessage(slots.put(sweep(path)));
});
