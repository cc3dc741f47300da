/** Whom a line marks, over all simulated books together. */
import { HONEST_KINDS, type Flags, type HonestKind } from '#contracts/validation.ts';
import { filledIn, type JudgedFirm, type StatementResult } from './statementResults.ts';

type Suspicion = (firm: JudgedFirm) => number | null | undefined;

/** Everybody whose figure lies beyond the line; who has none is not marked. */
export function flagsBeyond(
  results: readonly StatementResult[],
  test: string,
  suspicion: Suspicion,
  line: number,
): Flags {
  return flagsOf(results, test, (firms) =>
    firms.map((firm) => {
      const value = suspicion(firm);
      return typeof value === 'number' && value > line;
    }),
  );
}

const MARKED_SHARE = 0.1;

/** The tenth of each book that looks worst, which is how measures without a line of their own are compared. */
export const flagsOfWorstTenth = (results: readonly StatementResult[], suspicion: Suspicion): Flags =>
  flagsOf(results, 'worst tenth', (firms) => {
    const values = filledIn(firms.map(suspicion));
    const order = [...values.keys()].sort((a, b) => values[b]! - values[a]!);
    const marked = new Set(order.slice(0, Math.round(MARKED_SHARE * firms.length)));
    return firms.map((_, k) => marked.has(k));
  });

function flagsOf(
  results: readonly StatementResult[],
  test: string,
  mark: (firms: readonly JudgedFirm[]) => readonly boolean[],
): Flags {
  const all = results.flatMap(({ firms }) => {
    const marked = mark(firms);
    return firms.map((firm, k) => ({ firm, isMarked: marked[k]! }));
  });
  const shareMarked = (isMeant: (firm: JudgedFirm) => boolean): number => {
    const meant = all.filter(({ firm }) => isMeant(firm));
    return meant.length === 0 ? 0 : meant.filter(({ isMarked }) => isMarked).length / meant.length;
  };
  const isHonest = (firm: JudgedFirm): boolean => firm.lifting === null;
  const marked = all.filter(({ isMarked }) => isMarked);
  const ofKind = (kind: HonestKind) => shareMarked((firm) => isHonest(firm) && firm.kind === kind);
  return {
    test,
    size: shareMarked(isHonest),
    power: shareMarked((firm) => !isHonest(firm)),
    falseShare: marked.length === 0 ? 0 : marked.filter(({ firm }) => isHonest(firm)).length / marked.length,
    falseAlarms: Object.fromEntries(HONEST_KINDS.map((kind) => [kind, ofKind(kind)])) as Flags['falseAlarms'],
  };
}
