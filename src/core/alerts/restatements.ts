/** What the figures said before a restatement and what they say after it. */
import { daysBetween, type PlainDate } from '../calendar/plainDate.ts';
import { isSamePeriodEnd, reportingMonthEnd } from '../calendar/fiscalYear.ts';
import { isMet, isNotMet, type Outcome } from '../covenants/covenantTest.ts';
import { testCovenant } from '../covenants/testCovenant.ts';
import { ebitdaOfTwelveMonths } from '../measures/ebitda.ts';
import type { Decimal } from '../money/decimal.ts';
import { knownStatements } from '../statements/currentStatements.ts';
import { STATEMENT_SCOPES, type Statement } from '../statements/statement.ts';
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
export const restatementsOf = (context: AlertContext): readonly Restatement[] =>
  restatementDays(context).map((day) => ({
    receivedOn: day.receivedOn,
    earnings: earningsMoves(context, day),
    outcomes: outcomeMoves(context, day),
  }));

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

const before = (statements: readonly Statement[], day: PlainDate): readonly Statement[] =>
  statements.filter(({ receivedOn }) => receivedOn < day);
const upTo = (statements: readonly Statement[], day: PlainDate): readonly Statement[] =>
  statements.filter(({ receivedOn }) => receivedOn <= day);

function earningsMoves(
  { inputs, asOf }: AlertContext,
  { receivedOn: day, earliestPeriodEnd }: RestatementDay,
): readonly EarningsMove[] {
  return STATEMENT_SCOPES.flatMap((scope) => {
    const known = knownStatements(inputs.statements, { scope, asOf });
    const earlier = before(known, day);
    const periodEnds = new Set(
      earlier
        .filter(({ months, periodEnd }) => months > 0 && reportingMonthEnd(periodEnd) >= earliestPeriodEnd)
        .map(({ periodEnd }) => periodEnd),
    );
    return [...periodEnds].sort().flatMap((periodEnd) => {
      const [was, is] = [earlier, upTo(known, day)].map(
        (statements) => ebitdaOfTwelveMonths(statements, periodEnd, inputs.fiscalYearEndMonth).ebitda,
      );
      if (was?.kind !== 'value' || is?.kind !== 'value' || was.value.eq(is.value)) return [];
      const change = was.value.isZero() ? null : is.value.minus(was.value).div(was.value.abs());
      return [{ periodEnd, before: was.value, after: is.value, change }];
    });
  });
}

function outcomeMoves(
  { inputs, tests, policy, asOf }: AlertContext,
  { receivedOn: day, earliestPeriodEnd }: RestatementDay,
): readonly OutcomeMove[] {
  return inputs.covenants.flatMap((covenant) => {
    const dates = tests.filter(
      (test) => test.covenantId === covenant.id && test.testDate >= earliestPeriodEnd && test.testDate < day,
    );
    return dates.flatMap(({ testDate }) => {
      const [was, is] = [before, upTo].map(
        (known) =>
          testCovenant(
            covenant,
            known(inputs.statements, day),
            testDate,
            inputs.fiscalYearEndMonth,
            policy,
            asOf,
          ).underlyingOutcome,
      );
      if (!was || !is || standing(was) === null || standing(was) === standing(is)) return [];
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
