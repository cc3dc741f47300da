/** What stands beside reporting quality and is never inside it: methods.md B6. */
import type { BorrowerInputs, Undertaking } from './borrowerInputs.ts';
import { deadlineOn, dueDate } from './calendar/deadline.ts';
import { isSamePeriodEnd, reportingMonthEnd } from './calendar/fiscalYear.ts';
import { addMonthsToMonthEnd, monthCount, type PlainDate } from './calendar/plainDate.ts';
import { formatDay } from './calendar/printDay.ts';
import type { CovenantTest } from './covenants/covenantTest.ts';
import { toSample } from './money/toSample.ts';
import type { JustPassing } from './patterns/justPassing.ts';
import { accountsAt, ifAll, NOW, TWO_YEARS_AGO, type Back } from './quality/accountsAt.ts';
import { dayFlow } from './quality/dayFlows.ts';
import { scoredBook } from './quality/peerInputs.ts';
import type { BesideFact } from './quality/score.ts';
import { percent, signedPercent, wholeDays } from './quality/wording.ts';
import type { Statement } from './statements/statement.ts';
import type { Books } from './statements/statementBook.ts';

export interface BesideContext {
  readonly inputs: BorrowerInputs;
  readonly books: Books;
  readonly tests: readonly CovenantTest[];
  readonly patterns: readonly JustPassing[];
  /** The latest quarter end that was looked at; null where there is none. */
  readonly quarterEnd: PlainDate | null;
  readonly asOf: PlainDate;
}

/**
 * Facts with their figures; a fact that cannot be given is left out.
 *
 * @example besideTheScore({ inputs, books: openBooks(inputs, '2026-11-30'), tests: [], patterns: [], quarterEnd: null, asOf: '2026-11-30' }).map(({ fact }) => fact) // => ['restatements']
 */
export const besideTheScore = (context: BesideContext): readonly BesideFact[] =>
  [
    addBackShare(context),
    daysLate(context),
    restatements(context),
    auditedLessManagement(context),
    ...justPassing(context),
    twoYearDays(context),
  ].flatMap((fact) => (fact === null ? [] : [fact]));

/** Of the latest test that holds adjusted EBITDA: the largest share where several define it differently. */
function addBackShare({ tests }: BesideContext): BesideFact | null {
  const latest = tests.reduce(
    (last, { testDate, earnings }) => (earnings && testDate > last ? testDate : last),
    '',
  );
  const shares = tests.flatMap(({ testDate, earnings, bridge }) => {
    if (testDate !== latest || !earnings?.gt(0)) return [];
    const counted = bridge
      .filter(({ kind }) => kind === 'add-back')
      .reduce((sum, { amount }) => sum + toSample(amount), 0);
    const overCap = bridge
      .filter(({ kind }) => kind === 'disallowed')
      .reduce((sum, { amount }) => sum + Math.abs(toSample(amount)), 0);
    return [(counted - overCap) / toSample(earnings)];
  });
  if (shares.length === 0) return null;
  const share = Math.max(...shares);
  return {
    fact: 'add-backs',
    sentence: `Add-backs are ${percent(share, share > 0 && share < 0.1 ? 1 : 0)} of adjusted EBITDA in the test of ${formatDay(latest as PlainDate)}.`,
  };
}

const LATE_PERIODS = 4;

/** Of the quarters that are due, not of every period that came: monthly figures in between were promised to nobody. */
function daysLate({ inputs, asOf }: BesideContext): BesideFact | null {
  const undertaking = inputs.undertakings.find(({ kind }) => kind === 'quarterly accounts');
  if (!undertaking) return null;
  const due = duePeriods(undertaking, firstArrivals(inputs.statements, asOf), asOf).slice(-LATE_PERIODS);
  if (due.length === 0) return null;
  return {
    fact: 'days late',
    sentence: latenessOf(
      due.length,
      due.flatMap(({ late }) => late ?? []),
    ),
  };
}

interface DuePeriod {
  /** Days after the due date; null where nothing has come and the date is past. */
  readonly late: number | null;
}

/** Oldest first, from the first period that is kept here. */
function duePeriods(
  { dueDays: days, dayCount, graceDays, firstPeriodEnd, everyMonths }: Undertaking,
  arrivals: ReadonlyMap<PlainDate, PlainDate>,
  asOf: PlainDate,
): readonly DuePeriod[] {
  const [earliest] = [...arrivals.keys()].sort();
  if (earliest === undefined) return [];
  const count = Math.floor((monthCount(asOf) - monthCount(firstPeriodEnd)) / everyMonths) + 1;
  return Array.from({ length: Math.max(0, count) }, (_, k) =>
    addMonthsToMonthEnd(firstPeriodEnd, k * everyMonths),
  )
    .filter((periodEnd) => periodEnd >= earliest && periodEnd < asOf)
    .flatMap((periodEnd): readonly DuePeriod[] => {
      const receivedOn = arrivals.get(periodEnd);
      const due = dueDate({ periodEnd, days, dayCount });
      const { daysLate: late } = deadlineOn({ due, graceDays, dayCount, day: receivedOn ?? asOf });
      if (receivedOn !== undefined) return [{ late }];
      return late > 0 ? [{ late: null }] : [];
    });
}

function latenessOf(due: number, came: readonly number[]): string {
  const whose = due === 1 ? "last quarter's accounts" : `last ${due} quarters' accounts`;
  if (came.length === 0) return `The ${whose} have not come.`;
  const how = came.every((late) => late === 0)
    ? 'in time'
    : `${came.join(', ')} days late${came.length === 1 ? '' : ', the latest last'}`;
  const missing = due - came.length;
  if (missing === 0) return `The ${whose} came ${how}.`;
  const others = came.length === 1 ? 'the other' : 'the others';
  return `Of the ${whose} ${missing} ${missing === 1 ? 'has' : 'have'} not come; ${others} came ${how}.`;
}

/** The day on which the first figures of each month end came. */
function firstArrivals(statements: readonly Statement[], asOf: PlainDate): ReadonlyMap<PlainDate, PlainDate> {
  const first = new Map<PlainDate, PlainDate>();
  for (const { periodEnd, receivedOn, months, basis } of statements) {
    if (months === 0 || basis === 'forecast' || receivedOn > asOf) continue;
    const monthEnd = reportingMonthEnd(periodEnd);
    const known = first.get(monthEnd);
    if (known === undefined || receivedOn < known) first.set(monthEnd, receivedOn);
  }
  return first;
}

function restatements({ books }: BesideContext): BesideFact | null {
  const { statements } = scoredBook(books);
  if (statements.length === 0) return null;
  const restated = new Set(
    statements
      .filter((later) =>
        statements.some(
          (earlier) =>
            earlier.months === later.months &&
            earlier.basis === later.basis &&
            isSamePeriodEnd(earlier.periodEnd, later.periodEnd) &&
            earlier.version < later.version,
        ),
      )
      .map(({ periodEnd }) => periodEnd),
  );
  const periods = new Set(statements.map(({ periodEnd }) => periodEnd)).size;
  return {
    fact: 'restatements',
    sentence:
      restated.size === 0
        ? `None of the ${periods} period ends kept was restated.`
        : `${restated.size} of the ${periods} period ends kept ${restated.size === 1 ? 'was' : 'were'} restated, the latest ${formatDay([...restated].sort().at(-1)!)}.`,
  };
}

/** Net income of the last year that is there both audited and from the management. */
function auditedLessManagement({ books }: BesideContext): BesideFact | null {
  const { statements } = scoredBook(books);
  const years = statements.filter(({ months, amounts }) => months === 12 && amounts.net_income);
  const latestOf = (basis: Statement['basis'], periodEnd: PlainDate): Statement | undefined =>
    years
      .filter((year) => year.basis === basis && isSamePeriodEnd(year.periodEnd, periodEnd))
      .reduce<Statement | undefined>(
        (last, year) => (!last || year.version > last.version ? year : last),
        undefined,
      );
  const pairs = years
    .filter(({ basis }) => basis === 'audited')
    .flatMap((audited) => {
      const management = latestOf('management', audited.periodEnd);
      return management ? [{ audited, management }] : [];
    })
    .sort((a, b) => (a.audited.periodEnd < b.audited.periodEnd ? -1 : 1));
  const pair = pairs.at(-1);
  if (!pair) return null;
  const [audited, management] = [pair.audited.amounts.net_income!, pair.management.amounts.net_income!];
  const gap = audited.minus(management);
  const share = management.isZero() ? null : toSample(gap.div(management.abs()));
  return {
    fact: 'audited less management',
    sentence: `Audited net income of the year to ${formatDay(pair.audited.periodEnd)} ${
      gap.isZero()
        ? "was the management's own."
        : `differed from the management's by ${share === null ? gap.toFixed() : signedPercent(share)}.`
    }`,
  };
}

const justPassing = ({ patterns }: BesideContext): readonly BesideFact[] => {
  const most = patterns.reduce<JustPassing | null>(
    (best, pattern) => (pattern.inBand > (best?.inBand ?? 0) ? pattern : best),
    null,
  );
  return most
    ? [
        {
          fact: 'just passing',
          sentence: `${most.inBand} of the last ${most.ofLast} tests of one covenant ended just passing.`,
        },
      ]
    : [];
};

/** A change of a year fades after two years of it; this does not: methods.md B5. */
function twoYearDays({ books, quarterEnd }: BesideContext): BesideFact | null {
  if (quarterEnd === null) return null;
  const accounts = accountsAt(scoredBook(books), quarterEnd);
  const daysAt = (back: Back): number | undefined =>
    ifAll(
      { receivables: accounts.balance('receivables', back), sales: dayFlow(accounts, 'revenue', 1, back) },
      ({ receivables, sales }) => (sales > 0 ? (receivables / sales) * (365 / 4) : undefined),
    );
  const [now, before] = [daysAt(NOW), daysAt(TWO_YEARS_AGO)];
  if (now === undefined || before === undefined || before <= 0) return null;
  return {
    fact: 'receivable days over two years',
    sentence: `Receivable days went from ${wholeDays(before)} to ${wholeDays(now)} within two years (${signedPercent(now / before - 1)}).`,
  };
}
