/** What the figures said before a restatement and what they say after it. */
import { addDays, daysBetween, type PlainDate } from '../calendar/plainDate.ts';
import { isSamePeriodEnd, reportingMonthEnd } from '../calendar/fiscalYear.ts';
import type { Covenant } from '../covenants/covenant.ts';
import { isMet, isNotMet, type Outcome } from '../covenants/covenantTest.ts';
import { underlyingOutcomeOf } from '../covenants/testCovenant.ts';
import { ebitdaOfTwelveMonths } from '../measures/ebitda.ts';
import type { Decimal } from '../money/decimal.ts';
import { STATEMENT_SCOPES, type Statement } from '../statements/statement.ts';
import { openBooks, type Books } from '../statements/statementBook.ts';
import type { AlertContext } from './rule.ts';

/** How long a restatement is news: two quarters. Desk practice, no source. */
const NEWS_DAYS = 183;

export interface EarningsMove {
  readonly periodEnd: PlainDate;
  readonly before: Decimal;
  readonly after: Decimal;
  /** Share of the amount before; null where that was nought. */
  readonly change: Decimal | null;
}

export interface OutcomeMove {
  readonly covenantId: number;
  readonly testDate: PlainDate;
  readonly before: Outcome;
  readonly after: Outcome;
}

export interface Restatement {
  readonly receivedOn: PlainDate;
  readonly earnings: readonly EarningsMove[];
  readonly outcomes: readonly OutcomeMove[];
}

/**
 * Every day of the last two quarters on which a version came for a period that had figures already, with what it
 * moved: EBITDA of twelve months, and the outcome of past tests. Earlier and later versions are both kept.
 *
 * @example restatementsOf(nightOf({ ebitda: 12, debt: 45, cash: 6 })) // => []
 */
export function restatementsOf(context: AlertContext): readonly Restatement[] {
  const knownOn = knowledgeOf(context);
  return restatementDays(context).map((day) => {
    const before = knownOn(addDays(day.receivedOn, -1));
    const after = knownOn(day.receivedOn);
    return {
      receivedOn: day.receivedOn,
      earnings: earningsMoves(before.books, after.books, day),
      outcomes: outcomeMoves(context, before, after, day),
    };
  });
}

/** The books as they were known, and the outcomes that they give. */
interface Knowledge {
  readonly books: Books;
  readonly outcomeOf: (covenant: Covenant, testDate: PlainDate) => Outcome;
}

/** What was known on a day, opened once for all days on which it was the same. */
function knowledgeOf({ inputs, policy }: AlertContext): (day: PlainDate) => Knowledge {
  const receivedOn = [...new Set(inputs.statements.map((statement) => statement.receivedOn))].sort();
  const opened = new Map<PlainDate | null, Knowledge>();
  return (day) => {
    const lastReceivedOn = receivedOn.findLast((received) => received <= day) ?? null;
    const known = opened.get(lastReceivedOn);
    if (known) return known;
    const books = openBooks(inputs, day);
    const outcomes = new Map<string, Outcome>();
    const outcomeOf = (covenant: Covenant, testDate: PlainDate): Outcome => {
      const key = `${covenant.id} ${testDate}`;
      const outcome =
        outcomes.get(key) ??
        underlyingOutcomeOf(covenant, books[covenant.scope], testDate, policy, inputs.rates);
      outcomes.set(key, outcome);
      return outcome;
    };
    const knowledge = { books, outcomeOf };
    opened.set(lastReceivedOn, knowledge);
    return knowledge;
  };
}

interface RestatementDay {
  readonly receivedOn: PlainDate;
  /** Nothing before it can have moved. */
  readonly earliestPeriodEnd: PlainDate;
}

function restatementDays({ inputs, asOf }: AlertContext): readonly RestatementDay[] {
  const known = inputs.statements.filter(
    ({ basis, receivedOn }) => basis !== 'forecast' && receivedOn <= asOf,
  );
  const restating = known
    .filter(({ receivedOn }) => daysBetween(receivedOn, asOf) <= NEWS_DAYS)
    .filter((later) => known.some((earlier) => isEarlierVersion(earlier, later)));
  const days = [...new Set(restating.map(({ receivedOn }) => receivedOn))].sort();
  return days.map((receivedOn) => ({
    receivedOn,
    earliestPeriodEnd: restating
      .filter((statement) => statement.receivedOn === receivedOn)
      .map(({ periodEnd }) => reportingMonthEnd(periodEnd))
      .reduce<PlainDate>((least, periodEnd) => (periodEnd < least ? periodEnd : least), receivedOn),
  }));
}

const isEarlierVersion = (earlier: Statement, later: Statement): boolean =>
  earlier.scope === later.scope &&
  earlier.months === later.months &&
  isSamePeriodEnd(earlier.periodEnd, later.periodEnd) &&
  earlier.receivedOn < later.receivedOn;

function earningsMoves(
  before: Books,
  after: Books,
  { earliestPeriodEnd }: RestatementDay,
): readonly EarningsMove[] {
  return STATEMENT_SCOPES.flatMap((scope) => {
    const periodEnds = new Set(
      before[scope].statements
        .filter(({ months, periodEnd }) => months > 0 && reportingMonthEnd(periodEnd) >= earliestPeriodEnd)
        .map(({ periodEnd }) => periodEnd),
    );
    return [...periodEnds].sort().flatMap((periodEnd) => {
      const was = ebitdaOfTwelveMonths(before[scope], periodEnd).ebitda;
      const is = ebitdaOfTwelveMonths(after[scope], periodEnd).ebitda;
      if (was.kind !== 'value' || is.kind !== 'value' || was.value.eq(is.value)) return [];
      const change = was.value.isZero() ? null : is.value.minus(was.value).div(was.value.abs());
      return [{ periodEnd, before: was.value, after: is.value, change }];
    });
  });
}

function outcomeMoves(
  { inputs, tests }: AlertContext,
  before: Knowledge,
  after: Knowledge,
  { receivedOn, earliestPeriodEnd }: RestatementDay,
): readonly OutcomeMove[] {
  return inputs.covenants.flatMap((covenant) => {
    const dates = tests.filter(
      (test) =>
        test.covenantId === covenant.id && test.testDate >= earliestPeriodEnd && test.testDate < receivedOn,
    );
    return dates.flatMap(({ testDate }) => {
      const [was, is] = [before.outcomeOf(covenant, testDate), after.outcomeOf(covenant, testDate)];
      if (standing(was) === null || standing(was) === standing(is)) return [];
      return [{ covenantId: covenant.id, testDate, before: was, after: is }];
    });
  });
}

/** Met or not met, whichever form; null where there was no result to be changed. */
function standing(outcome: Outcome): string | null {
  if (isMet(outcome)) return 'met';
  if (isNotMet(outcome)) return 'not met';
  return outcome === 'cannot be tested' ? outcome : null;
}
