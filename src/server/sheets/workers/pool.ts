/**
 * Two warm workers read files, so that a slow or hostile one holds up nobody but itself. Each file has five seconds
 * and 256 MB; then its worker is ended and another takes its place. Files beyond two wait their turn.
 */
import { join } from 'node:path';
import { Worker } from 'node:worker_threads';
import type { Reading } from '#core/statements/workbookReading.ts';
import { programFolder } from './programFolder.ts';
import { READY, type ReadingAnswer, type ReadingJob } from './readingJob.ts';

const WORKERS = 2;
export const READING_LIMIT_MILLISECONDS = 5_000;
const MEMORY_MEGABYTES = 256;
const YOUNG_MEMORY_MEGABYTES = 64;

/** How a file's turn ended without a reading, by the file's own doing. */
export type ReadingEnd = 'took-too-long' | 'out-of-memory';

interface Turn {
  readonly job: ReadingJob;
  readonly done: (result: Reading | ReadingEnd) => void;
  readonly failed: (error: Error) => void;
}

interface Seat {
  readonly worker: Worker;
  turn: Turn | null;
  timer: NodeJS.Timeout | null;
  ready: boolean;
}

export class ReadingPool {
  private readonly seats: Seat[] = [];
  private readonly waiting: Turn[] = [];
  private readonly limit: number;
  private lastId = 0;
  private closed = false;

  constructor(limitMilliseconds: number = READING_LIMIT_MILLISECONDS) {
    this.limit = limitMilliseconds;
  }

  read(job: Omit<ReadingJob, 'id'>): Promise<Reading | ReadingEnd> {
    if (this.closed) return Promise.reject(new Error('the reading workers are stopped'));
    this.lastId += 1;
    const numbered = { ...job, id: this.lastId };
    return new Promise((done, failed) => {
      this.waiting.push({ job: numbered, done, failed });
      this.fill();
      this.serve();
    });
  }

  /** Starts the workers ahead of the first file. */
  warm(): void {
    this.fill();
  }

  async close(): Promise<void> {
    this.closed = true;
    for (const turn of this.waiting.splice(0)) turn.failed(new Error('the reading workers are stopped'));
    await Promise.all(this.seats.map(({ worker }) => worker.terminate()));
  }

  private fill(): void {
    while (!this.closed && this.seats.length < WORKERS) this.seats.push(this.newSeat());
  }

  private newSeat(): Seat {
    const worker = new Worker(join(programFolder(), 'src/server/sheets/workers/boot.mjs'), {
      resourceLimits: {
        maxOldGenerationSizeMb: MEMORY_MEGABYTES,
        maxYoungGenerationSizeMb: YOUNG_MEMORY_MEGABYTES,
      },
      execArgv: [],
      name: 'reading',
    });
    const seat: Seat = { worker, turn: null, timer: null, ready: false };
    worker.on('message', (message: typeof READY | ReadingAnswer) => this.hear(seat, message));
    worker.on('error', (error) => this.lose(seat, error));
    worker.on('exit', () => this.lose(seat, new Error('a reading worker ended')));
    worker.unref();
    return seat;
  }

  private hear(seat: Seat, message: typeof READY | ReadingAnswer): void {
    if (message === READY) {
      seat.ready = true;
      this.serve();
      return;
    }
    const { turn } = seat;
    if (!turn || turn.job.id !== message.id) return;
    this.leave(seat);
    if ('fault' in message) turn.failed(new Error(`a file could not be read: ${message.fault}`));
    else turn.done(message.reading);
    this.serve();
  }

  private serve(): void {
    for (const seat of this.seats) {
      const turn = seat.ready && !seat.turn ? this.waiting.shift() : undefined;
      if (!turn) continue;
      seat.turn = turn;
      seat.timer = setTimeout(() => this.end(seat, 'took-too-long'), this.limit);
      seat.worker.postMessage(turn.job);
    }
    this.hold();
  }

  /** Workers keep the program alive only while there is a file to read. */
  private hold(): void {
    for (const { worker, turn } of this.seats) {
      if (turn || this.waiting.length > 0) worker.ref();
      else worker.unref();
    }
  }

  private leave(seat: Seat): void {
    if (seat.timer) clearTimeout(seat.timer);
    seat.timer = null;
    seat.turn = null;
    this.hold();
  }

  private end(seat: Seat, how: ReadingEnd): void {
    const { turn } = seat;
    this.remove(seat);
    void seat.worker.terminate();
    turn?.done(how);
  }

  /** A worker that ends by itself: by its memory limit while it reads, else by a fault. */
  private lose(seat: Seat, error: Error): void {
    if (!this.seats.includes(seat)) return;
    const { turn } = seat;
    const neverStarted = !seat.ready;
    this.remove(seat);
    if ('code' in error && error.code === 'ERR_WORKER_OUT_OF_MEMORY') turn?.done('out-of-memory');
    else turn?.failed(error);
    if (neverStarted && !this.closed) for (const waiting of this.waiting.splice(0)) waiting.failed(error);
  }

  private remove(seat: Seat): void {
    this.leave(seat);
    this.seats.splice(this.seats.indexOf(seat), 1);
    if (this.waiting.length > 0) this.fill();
  }
}
