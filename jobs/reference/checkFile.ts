/** Runs a reference file through the core and holds what it gives against what is expected. */
import { mismatches, plain, type Mismatch } from './compare.ts';
import { covenantTopics } from './covenants/topics.ts';
import { patternBook } from './patternBook.ts';
import { topics as patternTopics } from './patterns.ts';
import { qualityBook, topics as qualityTopics } from './quality.ts';
import type { Topic } from './topic.ts';
import { readReferenceFile, type Vector } from './vectorFile.ts';

const TOPICS: Readonly<Record<string, Topic>> = { ...covenantTopics, ...qualityTopics, ...patternTopics };

/** What became of one vector, or of one firm or borrower of a book. */
export type Checked =
  | { readonly id: string; readonly outcome: 'right'; readonly got: unknown }
  | {
      readonly id: string;
      readonly outcome: 'wrong';
      readonly got: unknown;
      readonly mismatches: readonly Mismatch[];
    }
  /** Computed with the rest of the book; nothing is expected of it. */
  | { readonly id: string; readonly outcome: 'computed'; readonly got: unknown };

/**
 * Every vector of the file. A topic that is unknown, a key that is not given and inputs that cannot be read are
 * wrong. Throws where the content is no reference file.
 */
export function checkFile(content: unknown): readonly Checked[] {
  const reference = readReferenceFile(content);
  switch (reference.kind) {
    case 'vectors':
      return reference.file.vectors.map(checkVector);
    case 'quality book': {
      const { firms, tolerance } = reference.file;
      const results = qualityBook(content);
      return firms.map(({ firm, expected }) => checkMember(firm, results.get(firm), expected, tolerance));
    }
    case 'pattern book': {
      const { borrowers, tolerance } = reference.file;
      const results = patternBook(content);
      return borrowers.map(({ borrower, expected }) =>
        checkMember(borrower, results.get(borrower), expected, tolerance),
      );
    }
  }
}

/** One vector of a topic through the core. */
export function checkVector({ id, topic, inputs, expected, tolerance }: Vector): Checked {
  const compute = TOPICS[topic];
  if (!compute) return wrong(id, [{ id, key: 'topic', expected: 'a known topic', got: topic }]);
  const computed = attempt(() => compute(inputs));
  if ('failure' in computed)
    return wrong(id, [{ id, key: 'inputs', expected: 'to be read', got: computed.failure }]);
  const got = plain(computed.value) as Record<string, unknown>;
  const found = mismatches(id, expected, got, tolerance);
  return found.length === 0 ? { id, outcome: 'right', got } : { ...wrong(id, found), got };
}

/** A firm or borrower that was computed together with its book. */
function checkMember(
  member: number | string,
  result: Record<string, unknown> | undefined,
  expected: Record<string, unknown> | undefined,
  tolerance: number,
): Checked {
  const id = String(member);
  const got = plain(result ?? {}) as Record<string, unknown>;
  if (!expected) return { id, outcome: 'computed', got };
  const found = mismatches(id, expected, got, tolerance);
  return found.length === 0 ? { id, outcome: 'right', got } : { ...wrong(id, found), got };
}

const wrong = (id: string, found: readonly Mismatch[]) =>
  ({ id, outcome: 'wrong', got: null, mismatches: found }) as const;

/** A vector that the core refuses is a wrong vector, with the refusal as what it gave; the others still run. */
function attempt<T>(compute: () => T): { readonly value: T } | { readonly failure: string } {
  try {
    return { value: compute() };
  } catch (error) {
    return { failure: error instanceof Error ? error.message : String(error) };
  }
}
