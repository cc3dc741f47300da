import { z } from 'zod';
import { deadlineOn, dueDate, type Roll } from '#core/calendar/deadline.ts';
import { fiscalPosition } from '#core/calendar/fiscalYear.ts';
import { addMonthsToMonthEnd, plainDate, type PlainDate } from '#core/calendar/plainDate.ts';
import { testCovenant } from '#core/covenants/testCovenant.ts';
import { sumOfInputs, type MissingLine, type Reading } from '#core/statements/reading.ts';
import { PLAIN_DEFINITION, type CurrencyRate } from '#core/measures/definition.ts';
import { flowIn } from '#core/measures/readLines.ts';
import { translationInto } from '#core/measures/translation.ts';
import { decimal, type Decimal } from '#core/money/decimal.ts';
import { POLICY_VERSION_1 } from '#core/policy.ts';
import { flowOfMonths, lastTwelveMonths, quarterFlow } from '#core/statements/flows.ts';
import { bookOf } from '#core/statements/statementBook.ts';
import {
  annualisedByDays,
  annualisedByMonths,
  equivalentOf52Weeks,
  lengthOfQuarters,
} from '#core/statements/periodLength.ts';
import type { Topic } from '../topic.ts';
import { amount, atMost, day, status } from './amounts.ts';
import { earning, owing, registered } from './registered.ts';
import { netLeverageCovenant, statementOf } from './statements.ts';

const ONE = decimal(1);
const YEAR_END_MONTH = 12;
const YEAR_END = plainDate('2024-12-31');
const valueOf = (reading: Reading): Decimal | null => (reading.kind === 'value' ? reading.value : null);

const ltm: Topic = (inputs) => {
  const given = z
    .strictObject({
      ytd: amount.nullable(),
      last_fy: amount.nullable(),
      prior_ytd: amount.nullable(),
      period_months: z.number().int().min(1).max(12).default(9),
    })
    .parse(inputs);
  const months = given.period_months;
  const [periodEnd, priorEnd] = [
    addMonthsToMonthEnd(YEAR_END, months),
    addMonthsToMonthEnd(YEAR_END, months - 12),
  ];
  const parts = [
    { name: 'ytd', periodEnd, months, revenue: given.ytd },
    { name: 'last_fy', periodEnd: YEAR_END, months: 12, revenue: given.last_fy },
    { name: 'prior_ytd', periodEnd: priorEnd, months, revenue: given.prior_ytd },
  ];
  const statements = parts.flatMap((part, id) =>
    part.revenue === null ? [] : [statementOf(id, part.periodEnd, part.months, { revenue: part.revenue })],
  );
  const reading = lastTwelveMonths(bookOf(statements, YEAR_END_MONTH), 'revenue', periodEnd);
  const nameOf = (gap: MissingLine) =>
    parts.find((part) => part.periodEnd === gap.periodEnd && part.months === gap.months)?.name ??
    gap.periodEnd;
  return { ltm: valueOf(reading), missing: reading.kind === 'missing' ? reading.missing.map(nameOf) : [] };
};

const yearToDate = z.strictObject({ fiscal_year: z.string(), months: z.number(), value: amount });
const quartersInputs = z.union([
  z.strictObject({ ytd: z.array(amount.nullable()).max(4) }),
  z.strictObject({ ytd: z.record(z.string().regex(/^\d+m$/), amount) }),
  z.strictObject({ ytd_a: yearToDate, ytd_b: yearToDate }),
]);

const quarters: Topic = (inputs) => {
  const given = quartersInputs.parse(inputs);
  if ('ytd_a' in given) return quarterOfLater(given.ytd_a, given.ytd_b);
  const cumulative: (readonly [number, Decimal | null])[] = Array.isArray(given.ytd)
    ? given.ytd.map((value, index) => [index * 3 + 3, value])
    : Object.entries(given.ytd).map(([key, value]) => [Number.parseInt(key, 10), value]);
  const statements = cumulative.flatMap(([months, revenue]) =>
    revenue === null ? [] : [statementOf(months, addMonthsToMonthEnd(YEAR_END, months), months, { revenue })],
  );
  const ending = (month: number, months: number) =>
    valueOf(
      flowOfMonths(
        bookOf(statements, YEAR_END_MONTH),
        'revenue',
        addMonthsToMonthEnd(YEAR_END, month),
        months,
      ),
    );
  const all = [3, 6, 9, 12].map((month) => ending(month, 3));
  const [q1, q2, q3, q4] = all;
  return { quarters: all.slice(0, cumulative.length), q1, q2, q3, q4, six_months_q2_q3: ending(9, 6) };
};

function quarterOfLater(
  a: z.infer<typeof yearToDate>,
  b: z.infer<typeof yearToDate>,
): Record<string, unknown> {
  const statements = [a, b].map(({ fiscal_year, months, value }, id) => {
    const yearBefore = plainDate(`${Number(fiscal_year.replace(/\D/g, '')) - 1}-12-31`);
    return statementOf(id, addMonthsToMonthEnd(yearBefore, months), months, { revenue: value });
  });
  const reading = quarterFlow(bookOf(statements, YEAR_END_MONTH), 'revenue', statements[1]!.periodEnd);
  return { quarter: valueOf(reading), differenced: reading.kind === 'value' && reading.inputs.length > 1 };
}

const annualise: Topic = (inputs) => {
  const given = z
    .union([
      z.strictObject({ value: amount, months: z.number() }),
      z.strictObject({ value: amount, days: z.number(), basis: z.number() }),
    ])
    .parse(inputs);
  return {
    annualised:
      'months' in given
        ? annualisedByMonths(given.value, given.months)
        : annualisedByDays(given.value, given.days, given.basis),
  };
};

const calendar: Topic = (inputs) => {
  const given = z
    .union([
      z.strictObject({ value: amount, weeks: z.number() }),
      z.strictObject({ quarter_weeks: z.array(z.number()) }),
      z.strictObject({ period_end: day, fye_month: z.number() }),
    ])
    .parse(inputs);
  if ('value' in given) return { equivalent_52: equivalentOf52Weeks(given.value, given.weeks) };
  if ('quarter_weeks' in given) return { ...lengthOfQuarters(given.quarter_weeks) };
  const { fiscalYear, quarter } = fiscalPosition(given.period_end, given.fye_month);
  return { fiscal_year: fiscalYear, quarter };
};

const fx: Topic = (inputs) => {
  const given = z
    .union([
      z.strictObject({ q: z.array(amount), avg: z.array(amount) }),
      z.strictObject({ debt_eur: amount, ebitda_eur: amount, avg: amount, closing: amount.optional() }),
    ])
    .parse(inputs);
  if ('q' in given) return { ltm: yearInDollars(given.q, given.avg) };
  const ratioIn = (currency: string, debtRate: 'closing' | 'average') =>
    registered(
      'net-leverage',
      {
        flows: earning(given.ebitda_eur),
        balances: owing(given.debt_eur),
        definition: { debtRate },
        currency,
        rates: [
          rateTo('USD', 'average', '2025-01-01', '2025-12-31', given.avg),
          ...(given.closing ? [rateTo('USD', 'closing', '2025-12-31', '2025-12-31', given.closing)] : []),
        ],
      },
      atMost(ONE),
    ).held.tested;
  return given.closing
    ? { local: ratioIn('EUR', 'closing'), translated: ratioIn('USD', 'closing') }
    : { ratio: ratioIn('USD', 'average') };
};

/** Twelve months of a flow, each quarter at its own average rate. */
function yearInDollars(quarters: readonly Decimal[], averages: readonly Decimal[]): Decimal | null {
  const ends = quarters.map((_, k) => addMonthsToMonthEnd(YEAR_END, 3 * (k + 1)));
  const statements = quarters.map((revenue, k) => statementOf(k, ends[k]!, 3, { revenue }));
  const rates = averages.map((rate, k) =>
    rateTo('USD', 'average', statements[k]!.periodStart, ends[k]!, rate),
  );
  const request = {
    book: bookOf(statements, YEAR_END_MONTH),
    date: ends.at(-1)!,
    definition: PLAIN_DEFINITION,
    addBacks: [],
    months: 12,
    translation: translationInto('USD', rates),
  };
  return valueOf(flowIn(request, 'revenue'));
}

const rateTo = (
  to: string,
  kind: CurrencyRate['kind'],
  periodStart: PlainDate,
  periodEnd: PlainDate,
  rate: Decimal,
): CurrencyRate => ({ from: 'EUR', to, kind, periodStart, periodEnd, rate, source: 'the vector' });

const deadlineInputs = z.union([
  z.strictObject({ period_end: day, days: z.number(), roll: z.enum(['none', 'following']).optional() }),
  z.strictObject({ due: day, grace_days: z.number(), received: day.nullable(), as_of: day.optional() }),
  z.strictObject({ due: day, as_of: day, test_date: day, statements: z.null() }),
]);

const deadline: Topic = (inputs) => {
  const given = deadlineInputs.parse(inputs);
  if ('period_end' in given) {
    const due = (roll: Roll) =>
      dueDate({ periodEnd: given.period_end, days: given.days, dayCount: 'calendar', roll });
    return { due_raw: due('none'), due: due(given.roll ?? 'none') };
  }
  if ('test_date' in given) {
    const covenant = netLeverageCovenant(
      [{ from: given.test_date, until: null, level: ONE, isReset: false }],
      given.test_date,
    );
    const test = testCovenant(
      covenant,
      bookOf([], YEAR_END_MONTH),
      given.test_date,
      POLICY_VERSION_1,
      given.as_of,
    );
    const { daysToDue } = deadlineOn({
      due: given.due,
      graceDays: 0,
      dayCount: 'calendar',
      day: given.as_of,
    });
    return { status: status(test.outcome), days_to_due: daysToDue };
  }
  const on = given.received ?? given.as_of;
  if (on === undefined) throw new Error('neither a day of receipt nor a day to judge by');
  const found = deadlineOn({ due: given.due, graceDays: given.grace_days, dayCount: 'calendar', day: on });
  const isInTime = given.received !== null && found.daysLate === 0;
  return {
    days_late: found.daysLate,
    last_grace_day: found.lastGraceDay,
    status: isInTime ? 'received' : found.state,
  };
};

const versionsInputs = z.strictObject({
  ytd: amount,
  last_fy_original: amount,
  last_fy_restated: amount,
  prior_ytd_original: amount,
  prior_ytd_restated: amount,
});

/** Twelve months from consistent versions; the mixed pair is refused, and what it would have come to is shown. */
export const mixedVersions: Topic = (inputs) => {
  const given = versionsInputs.parse(inputs);
  const ytdEnd = addMonthsToMonthEnd(YEAR_END, 9);
  const priorEnd = addMonthsToMonthEnd(YEAR_END, -3);
  const now = statementOf(0, ytdEnd, 9, { revenue: given.ytd }, { receivedOn: ytdEnd });
  const year = [given.last_fy_original, given.last_fy_restated].map((revenue, k) =>
    statementOf(
      1 + k,
      YEAR_END,
      12,
      { revenue },
      { version: 1 + k, receivedOn: k === 0 ? YEAR_END : ytdEnd },
    ),
  );
  const prior = [given.prior_ytd_original, given.prior_ytd_restated].map((revenue, k) =>
    statementOf(3 + k, priorEnd, 9, { revenue }, { version: 1 + k, receivedOn: k === 0 ? priorEnd : ytdEnd }),
  );
  const over = (statements: readonly (typeof now)[]) =>
    lastTwelveMonths(bookOf(statements, YEAR_END_MONTH), 'revenue', ytdEnd);
  const mixed = over([now, year[0]!, ...prior]);
  if (mixed.kind !== 'not-meaningful') throw new Error('a mixed pair was not refused');
  return {
    consistent_original: valueOf(over([now, year[0]!, prior[0]!])),
    consistent_restated: valueOf(over([now, ...year, ...prior])),
    mixed_wrong: sumOfInputs(mixed.inputs),
  };
};

export const periodTopics: Readonly<Record<string, Topic>> = {
  ltm,
  quarters,
  annualise,
  calendar,
  fx,
  deadline,
};
