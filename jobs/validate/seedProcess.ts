/** A process of its own that computes one seed after another, as its parent sends them. */
import { seedResult } from './validation.ts';

process.on('message', (seed: number) => {
  process.send?.({ seed, result: seedResult(seed) });
});
