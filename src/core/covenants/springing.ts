import type { PlainDate } from '../calendar/plainDate.ts';
import { formatDay } from '../calendar/printDay.ts';
import type { Decimal } from '../money/decimal.ts';
import { formatMoney, formatShare, formatShareLevel } from '../money/print.ts';
import { balanceAt } from '../statements/flows.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import type { Springing } from './covenant.ts';
import type { SpringingStanding } from './covenantTest.ts';

/**
 * Drawings over commitments; `drawn` holds what the agreement counts, letters of credit it leaves out not among it.
 *
 * @example utilisation(decimal(7), decimal(20)) // => 0.35
 */
export const utilisation = (drawn: Decimal, commitment: Decimal): Decimal => drawn.div(commitment);

/**
 * Whether a springing covenant is tested: only where drawings exceed the trigger share of commitments on the test
 * date. The ratio is shown either way. Source: methods.md A6.
 *
 * @example isSprung({ drawn: decimal(7), commitment: decimal(20), trigger: decimal('0.35') }) // => false
 */
export const isSprung = ({
  drawn,
  commitment,
  trigger,
}: {
  readonly drawn: Decimal;
  readonly commitment: Decimal;
  readonly trigger: Decimal;
}): boolean => utilisation(drawn, commitment).gt(trigger);

/** Where a springing covenant stands on a test date: tested, not tested with its reason, or not to be told. */
export interface SpringingOn {
  readonly standing: SpringingStanding | null;
  readonly outcome: 'tested' | 'not tested' | 'cannot be tested';
  readonly reason: string | null;
}

/**
 * The revolver's drawings and commitments as the accounts of the test date report them. Where either is missing
 * nobody can say whether the covenant is tested, which is not the same as not tested. Whole currency units.
 *
 * @example springingOn({ trigger: decimal('0.35') }, book, '2026-09-30').outcome // => 'cannot be tested'
 */
export function springingOn({ trigger }: Springing, book: StatementBook, testDate: PlainDate): SpringingOn {
  const drawn = balanceAt(book, 'revolver_drawn', testDate);
  const commitment = balanceAt(book, 'revolver_commitment', testDate);
  if (drawn.kind !== 'value' || commitment.kind !== 'value')
    return {
      standing: null,
      outcome: 'cannot be tested',
      reason: `tested only above ${formatShareLevel(trigger)} drawn; the revolver’s drawings or commitments on ${formatDay(testDate)} are missing`,
    };
  const sides = { drawn: drawn.value, commitment: commitment.value, trigger };
  if (!sides.commitment.gt(0))
    return {
      standing: { ...sides, utilisation: null },
      outcome: 'cannot be tested',
      reason: `tested only above ${formatShareLevel(trigger)} drawn; no commitment on ${formatDay(testDate)}`,
    };
  const standing = { ...sides, utilisation: utilisation(sides.drawn, sides.commitment) };
  return isSprung(sides)
    ? { standing, outcome: 'tested', reason: null }
    : { standing, outcome: 'not tested', reason: notSprung(standing) };
}

const notSprung = ({
  drawn,
  commitment,
  utilisation: share,
  trigger,
}: SpringingStanding & { readonly utilisation: Decimal }): string =>
  `drawn ${formatMoney(drawn)} of ${formatMoney(commitment)} (${formatShare(share, { beside: trigger })}): tested only above ${formatShareLevel(trigger)}`;
