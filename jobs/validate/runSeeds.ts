/** Spreads the seeds over as many processes as there are processors; each has its own draws, so order decides nothing. */
import { fork, type ChildProcess } from 'node:child_process';
import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import type { SeedResult, Seeds } from './validation.ts';

const PROCESS = fileURLToPath(new URL('./seedProcess.ts', import.meta.url));

interface Answer {
  readonly seed: number;
  readonly result: SeedResult;
}

/** In the order of the seeds. Rejects where a process ends before its seeds are done. */
export async function runSeeds(
  { from, to }: Seeds,
  progress: (done: number) => void,
): Promise<readonly SeedResult[]> {
  const count = to - from + 1;
  const waiting = Array.from({ length: count }, (_, k) => from + k);
  const results = new Map<number, SeedResult>();
  const work = async (): Promise<void> => {
    const child = fork(PROCESS, { serialization: 'advanced' });
    try {
      for (let seed = waiting.shift(); seed !== undefined; seed = waiting.shift()) {
        const answer = await asked(child, seed);
        results.set(answer.seed, answer.result);
        progress(results.size);
      }
    } finally {
      child.kill();
    }
  };
  await Promise.all(Array.from({ length: Math.min(availableParallelism(), count) }, work));
  return Array.from({ length: count }, (_, k) => results.get(from + k)!);
}

const asked = (child: ChildProcess, seed: number): Promise<Answer> =>
  new Promise((done, failed) => {
    const ended = (code: number | null): void => failed(new Error(`seed ${seed} ended with ${code}`));
    child.once('exit', ended);
    child.once('message', (answer) => {
      child.off('exit', ended);
      done(answer as unknown as Answer);
    });
    child.send(seed);
  });
