/** Holds a new result against the last night's, and keeps with it what each cause added. */
import type { Transaction } from 'sequelize';
import type { Assessment } from '../../core/assess.ts';
import { NO_BOOK, type BookCrossSection } from '../../core/bookCrossSection.ts';
import { whyItMoved, type Basis } from '../../core/whyItMoved.ts';
import { loadBorrowerInputs } from '../db/repositories/borrowerInputs.ts';
import { findCrossSection } from '../db/repositories/crossSections.ts';
import { findEarlierNight, keepMovements, type EarlierResult } from '../db/repositories/movements.ts';
import { policyInForce } from '../db/repositories/policies.ts';

/** Reads the peers of an earlier night; the night reads them once for all its borrowers. */
export type CrossSectionOf = (tx: Transaction, id: number) => Promise<BookCrossSection | null>;

/**
 * A reader that keeps the last one it read: borrower after borrower is held against the same night.
 */
export function lastReadCrossSection(): CrossSectionOf {
  let last: { readonly id: number; readonly crossSection: BookCrossSection | null } | null = null;
  return async (tx, id) => {
    if (last?.id !== id) last = { id, crossSection: await findCrossSection(tx, id) };
    return last.crossSection;
  };
}

export async function keepWhyItMoved(
  tx: Transaction,
  now: {
    readonly assessmentId: number;
    readonly isNight: boolean;
    readonly basis: Basis;
    readonly result: Assessment;
  },
  crossSectionOf: CrossSectionOf = findCrossSection,
): Promise<void> {
  const { borrowerId } = now.basis.inputs;
  const earlier = await findEarlierNight(tx, { ...now, borrowerId, asOf: now.basis.asOf });
  if (!earlier) return;
  const basis = await basisOf(tx, borrowerId, earlier, crossSectionOf);
  await keepMovements(
    tx,
    now.assessmentId,
    earlier.id,
    whyItMoved({ basis, result: earlier.assessment }, now),
  );
}

async function basisOf(
  tx: Transaction,
  borrowerId: number,
  { asOf, knownAt, crossSectionId }: EarlierResult,
  crossSectionOf: CrossSectionOf,
): Promise<Basis> {
  const inputs = await loadBorrowerInputs(tx, borrowerId, knownAt);
  const crossSection = crossSectionId === null ? NO_BOOK : await crossSectionOf(tx, crossSectionId);
  if (!inputs || !crossSection) throw new Error(`what the result of ${asOf} rested on is not there`);
  return { inputs, crossSection, policy: await policyInForce(tx, asOf, knownAt), asOf };
}
