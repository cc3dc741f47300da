/** Reads one damaged file after the other and counts how each ended. */
import type { Reading } from '../../src/core/statements/workbookReading.ts';
import { mutantOf, type Example, type Mutant, type Random } from './mutations.ts';

export interface FuzzFailure {
  /** Its place in the run: --only with the same seed makes it again. */
  readonly number: number;
  readonly file: string;
  readonly how: Mutant['how'];
  readonly what: string;
  readonly bytes: Buffer;
}

export interface FuzzResult {
  readonly count: number;
  /** 'ready', 'questions' or the code of a refusal, to how often. */
  readonly ends: ReadonlyMap<string, number>;
  readonly failures: readonly FuzzFailure[];
}

/** Called after each file with how many have ended. */
type Progress = (done: number) => void;
type Read = (bytes: Buffer, name: string) => Promise<Reading>;
/** As many as there are workers are read at once. */
const AT_ONCE = 2;

export async function fuzz(
  examples: readonly Example[],
  randomOf: (number: number) => Random,
  numbers: readonly number[],
  read: Read,
  progress: Progress = () => undefined,
): Promise<FuzzResult> {
  const ends = new Map<string, number>();
  const failures: FuzzFailure[] = [];
  let done = 0;
  const waiting = [...numbers].reverse();
  const worker = async () => {
    for (let number = waiting.pop(); number !== undefined; number = waiting.pop()) {
      const random = randomOf(number);
      const example = examples[Math.floor(random() * examples.length)] as Example;
      const mutant = mutantOf(example, random);
      const { end, fault } = await endOf(mutant, read);
      ends.set(end, (ends.get(end) ?? 0) + 1);
      done += 1;
      progress(done);
      if (fault)
        failures.push({ number, file: mutant.name, how: mutant.how, what: fault, bytes: mutant.bytes });
    }
  };
  await Promise.all(Array.from({ length: AT_ONCE }, worker));
  return { count: numbers.length, ends, failures };
}

async function endOf({ bytes, name }: Mutant, read: Read): Promise<{ end: string; fault: string | null }> {
  try {
    const first = await read(bytes, name);
    // On a busy machine a reading may be slow once: what hangs, hangs again.
    const reading = first.refusal?.code === 'took-too-long' ? await read(bytes, name) : first;
    return { end: reading.refusal?.code ?? reading.outcome, fault: faultOf(reading) };
  } catch (error) {
    return { end: 'crash', fault: error instanceof Error ? error.message : String(error) };
  }
}

/** A reading that ended has to be one: whole, in its own terms, and in time. */
export function faultOf(reading: Reading): string | null {
  if (reading.refusal?.code === 'took-too-long') return 'the reading hung until it was ended';
  if (reading.refusal && !/Nothing was imported\.$/.test(reading.refusal.message))
    return `a refusal that does not say what was not changed: ${reading.refusal.message}`;
  if (reading.refusal && reading.facts.length > 0) return 'a refused reading has facts';
  const open = new Set(reading.questions.filter(({ answer }) => answer === null).map(({ key }) => key));
  if (reading.outcome === 'ready' && open.size > 0) return 'a reading is ready with open questions';
  for (const { amount, periodEnd, months, waitsFor, cell } of reading.facts) {
    if (!/^-?\d+(\.\d+)?$/.test(amount)) return `${cell} was read as the amount ${amount}`;
    if (!/^\d{4}-\d{2}-\d{2}$/.test(periodEnd)) return `${cell} was read to the day ${periodEnd}`;
    if (!Number.isInteger(months) || months < 0 || months > 24)
      return `${cell} was read over ${months} months`;
    if (waitsFor.some((key) => !open.has(key))) return `${cell} waits for a question that is not open`;
  }
  return null;
}
