/** A reading worker: takes one file after the other, and never keeps anything of them. */
import { parentPort } from 'node:worker_threads';
import { readBytes } from '../read/readBytes.ts';
import { READY, type ReadingAnswer, type ReadingJob } from './readingJob.ts';

const port = parentPort;
if (!port) throw new Error('a reading worker is started by the pool');

port.on('message', (job: ReadingJob) => {
  readBytes(job).then(
    (reading) => port.postMessage({ id: job.id, reading } satisfies ReadingAnswer),
    (error: unknown) => {
      const fault = error instanceof Error ? (error.stack ?? error.message) : String(error);
      port.postMessage({ id: job.id, fault } satisfies ReadingAnswer);
    },
  );
});
port.postMessage(READY);
