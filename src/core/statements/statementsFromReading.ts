import { plainDate, type PlainDate } from '../calendar/plainDate.ts';
import { decimal, ZERO, type Decimal } from '../money/decimal.ts';
import type { LineItemCode } from './lineItems.ts';
import type { Amounts, Tie } from './statement.ts';
import type { ReadFact, Reading } from './workbookReading.ts';

/** One amount's place in the borrower's file. */
export interface SourceCell {
  readonly line: LineItemCode;
  readonly sheet: string;
  readonly cell: string;
  readonly rawText: string;
  readonly label: string;
  readonly fromFormula: boolean;
}

/** The figures of one period, ready to become a version. */
export interface StagedStatement {
  readonly periodStart: PlainDate;
  readonly periodEnd: PlainDate;
  readonly months: number;
  readonly currency: string;
  readonly roundingUnit: Decimal;
  readonly tie: Tie;
  readonly amounts: Amounts;
  readonly cells: readonly SourceCell[];
}

/**
 * Groups what was read into one statement a period: balances by their day, flows by start and end. Several cells
 * of one line are added, each keeping its place.
 *
 * The reading must be ready: with an open question, or without currency or unit, it throws, because nothing may be
 * taken from it. The tie of a statement is the worst of the checks of its period.
 *
 * @example statementsFromReading({ outcome: 'ready', currency: 'EUR', unit: '1000', facts: [], checks: [] }) // => []
 */
export function statementsFromReading(reading: Reading): StagedStatement[] {
  const { currency, unit } = reading;
  if (reading.outcome !== 'ready' || currency === null || unit === null)
    throw new Error('the reading still waits for answers');
  const periods = new Map<string, ReadFact[]>();
  for (const fact of reading.facts) {
    const key = `${fact.periodEnd} ${fact.months} ${fact.periodStart}`;
    const facts = periods.get(key);
    if (facts) facts.push(fact);
    else periods.set(key, [fact]);
  }
  return [...periods.values()]
    .map((facts) => staged(facts, { currency, unit, tie: worstTie(reading, facts) }))
    .toSorted((a, b) => a.periodEnd.localeCompare(b.periodEnd) || a.months - b.months);
}

function staged(
  facts: readonly ReadFact[],
  common: { currency: string; unit: string; tie: Tie },
): StagedStatement {
  const [first] = facts;
  if (!first) throw new Error('a period without figures');
  const amounts: Partial<Record<LineItemCode, Decimal>> = {};
  for (const fact of facts) amounts[fact.code] = (amounts[fact.code] ?? ZERO).plus(decimal(fact.amount));
  return {
    periodStart: plainDate(first.periodStart),
    periodEnd: plainDate(first.periodEnd),
    months: first.months,
    currency: common.currency,
    roundingUnit: decimal(common.unit),
    tie: common.tie,
    amounts,
    cells: facts.map(({ code, sheet, cell, rawText, label, fromFormula }) => ({
      line: code,
      sheet,
      cell,
      rawText,
      label,
      fromFormula,
    })),
  };
}

const GRAVITY = ['ties', 'warning', 'does-not-tie'] as const;

function worstTie(reading: Reading, facts: readonly ReadFact[]): Tie {
  const of = reading.checks.filter(
    (check) => check.periodEnd === facts[0]?.periodEnd && check.months === facts[0].months,
  );
  if (of.length === 0) return 'not-checked';
  return GRAVITY[Math.max(...of.map((check) => GRAVITY.indexOf(check.outcome)))] ?? 'not-checked';
}
