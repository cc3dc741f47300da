import type { Transaction } from 'sequelize';
import type { BookCrossSection } from '../../core/bookCrossSection.ts';
import type { BookMember } from '../../core/bookMember.ts';
import { bookParts } from '../../core/patterns/bookParts.ts';
import { bookStanding } from '../../core/patterns/bookStanding.ts';
import { sumOfDigits } from '../../core/patterns/statementDigits.ts';
import { storeBookPatterns } from '../db/repositories/bookPatterns.ts';

/**
 * What the page of the book shows of a night. The cross-section's number also seeds the bootstraps, so that a night can
 * be computed again to the digit.
 */
export async function storeBook(
  tx: Transaction,
  { version, patterns }: BookCrossSection,
  members: readonly BookMember[],
): Promise<void> {
  if (patterns === null) throw new Error('a night without patterns');
  const parts = bookParts(
    members.flatMap(({ headrooms }) => headrooms),
    version,
  );
  const digits = sumOfDigits(members.map((member) => member.digits));
  await storeBookPatterns(tx, version, bookStanding(patterns, digits, parts), parts);
}
