/** Leading digits of statement amounts, counted by borrower and summed over the book. */
import { LINE_ITEMS, type LineItemCode } from '../statements/lineItems.ts';
import type { Statement } from '../statements/statement.ts';
import { err, type Result } from '../result.ts';
import { digitCounts, digitTest, type DigitTest } from '../statistics/leadingDigits.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';

export interface StatementDigits {
  /** Amounts that begin with 1 to 9. */
  readonly first: readonly number[];
  /** Amounts whose second digit is 0 to 9. */
  readonly second: readonly number[];
}

export interface DigitTests {
  readonly first: Result<DigitTest, StatisticsError>;
  readonly second: Result<DigitTest, StatisticsError>;
}

/** Below this honest amounts look marginal. Source: methods.md C6. */
export const FEWEST_AMOUNTS = 1_000;

/** Sums follow from their parts; they would count the parts' digits again. */
const COUNTED: readonly LineItemCode[] = LINE_ITEMS.filter(
  (item) => !('subtotal' in item) && item.part !== 'memo',
).map(({ code }) => code);

/** An amount of fewer units of its sheet is mostly rounding: its second digit may be no digit of the accounts. */
const FEWEST_UNITS = 10;

/**
 * Digits of the amounts of statements: sums and memorandum lines left out, and amounts of fewer than ten rounding
 * units of their sheet.
 *
 * @example statementDigits(statements).second.length // => 10
 */
export function statementDigits(
  statements: readonly Pick<Statement, 'amounts' | 'roundingUnit'>[],
): StatementDigits {
  const values: number[] = [];
  for (const { amounts, roundingUnit } of statements) {
    const least = roundingUnit.times(FEWEST_UNITS);
    for (const line of COUNTED) {
      const amount = amounts[line];
      if (amount?.abs().gte(least)) values.push(amount.toNumber());
    }
  }
  return { first: digitCounts(values, 'first'), second: digitCounts(values, 'second') };
}

/**
 * The counts of a whole book.
 *
 * @example sumOfDigits([]).first // => [0, 0, 0, 0, 0, 0, 0, 0, 0]
 */
export function sumOfDigits(members: readonly StatementDigits[]): StatementDigits {
  const sum = { first: new Array<number>(9).fill(0), second: new Array<number>(10).fill(0) };
  for (const { first, second } of members) {
    first.forEach((count, k) => (sum.first[k]! += count));
    second.forEach((count, k) => (sum.second[k]! += count));
  }
  return sum;
}

/**
 * The book's digits against Benford's law, refused below 1,000 amounts. A difference is no finding: minimum amounts,
 * price points and rounding make them too. Never for one borrower. Source: methods.md C6.
 *
 * @example digitTests(statementDigits([])).first.error // => { kind: 'too-few-points', needed: 1000, given: 0 }
 */
export const digitTests = ({ first, second }: StatementDigits): DigitTests => ({
  first: testOf(first, 'first'),
  second: testOf(second, 'second'),
});

function testOf(counts: readonly number[], place: 'first' | 'second'): Result<DigitTest, StatisticsError> {
  const given = counts.reduce((sum, count) => sum + count, 0);
  return given < FEWEST_AMOUNTS
    ? err({ kind: 'too-few-points', needed: FEWEST_AMOUNTS, given })
    : digitTest(counts, place);
}
