import { expect, test } from 'vitest';
import { besideTheScore, type BesideContext } from './besideTheScore.ts';
import { daysBetween, plainDate } from './calendar/plainDate.ts';
import { decimal } from './money/decimal.ts';
import { AS_OF, buildBorrower, LAST_QUARTER_END } from './quality/book.fixture.ts';
import { buildStatement } from './statements/statement.fixture.ts';
import { openBooks } from './statements/statementBook.ts';
import { test as covenantTest } from './example.fixture.ts';

const beside = (given: Partial<BesideContext> & Pick<BesideContext, 'inputs'>): Record<string, string> =>
  Object.fromEntries(
    besideTheScore({
      books: openBooks(given.inputs, AS_OF),
      tests: [],
      patterns: [],
      quarterEnd: LAST_QUARTER_END,
      asOf: AS_OF,
      ...given,
    }).map(({ fact, sentence }) => [fact, sentence]),
  );
const borrower = buildBorrower(1);

test('add-backs are a share of adjusted EBITDA, less what is over the cap', () => {
  const line = (kind: 'add-back' | 'disallowed', amount: number) => ({
    label: '',
    kind,
    amount: decimal(amount),
    inputs: [],
  });
  const tested = {
    ...covenantTest,
    earnings: decimal(100),
    bridge: [line('add-back', 30), line('disallowed', -10)],
  };
  expect(beside({ inputs: borrower, tests: [tested] })['add-backs']).toBe(
    'Add-backs are 20\u00a0% of adjusted EBITDA in the test of 30 Sep 2026.',
  );
  expect(beside({ inputs: borrower, tests: [{ ...tested, earnings: null }] })['add-backs']).toBeUndefined();
});

test('days late are those of the last four quarters, against the due dates', () => {
  const undertaking = {
    id: 1,
    kind: 'quarterly accounts' as const,
    everyMonths: 3,
    dayCount: 'calendar' as const,
    graceDays: 10,
    firstPeriodEnd: LAST_QUARTER_END,
  };
  const due = (dueDays: number) =>
    beside({ inputs: { ...borrower, undertakings: [{ ...undertaking, dueDays }] } })['days late'];
  // The fixture's statements come forty days after the period end.
  expect(due(40)).toBe("The last quarter's accounts came in time.");
  expect(due(37)).toBe("The last quarter's accounts came 3 days late.");
});

test('a quarter that is due and has not come is said, months in between are not counted', () => {
  const late = (
    given: { readonly firstPeriodEnd?: `${number}-${number}-${number}`; readonly dueDays?: number },
    statements: typeof borrower.statements,
  ) =>
    beside({
      inputs: {
        ...borrower,
        statements,
        undertakings: [
          {
            id: 1,
            kind: 'quarterly accounts',
            everyMonths: 3,
            dayCount: 'calendar',
            graceDays: 10,
            firstPeriodEnd: plainDate(given.firstPeriodEnd ?? '2025-12-31'),
            dueDays: given.dueDays ?? 45,
          },
        ],
      },
    })['days late'];
  const { statements } = borrower;
  const month = buildStatement('2026-08-31', 1, { revenue: 5 }, { receivedOn: plainDate('2026-11-20') });
  expect(late({}, [...statements, month])).toBe("The last 4 quarters' accounts came in time.");
  const without = (...ends: string[]) => statements.filter(({ periodEnd }) => !ends.includes(periodEnd));
  expect(late({}, without('2026-06-30'))).toBe(
    "Of the last 4 quarters' accounts 1 has not come; the others came in time.",
  );
  expect(late({ dueDays: 38, firstPeriodEnd: '2026-03-31' }, without('2026-03-31', '2026-09-30'))).toBe(
    "Of the last 3 quarters' accounts 2 have not come; the other came 2 days late.",
  );
  expect(late({ firstPeriodEnd: LAST_QUARTER_END }, without(LAST_QUARTER_END))).toBe(
    "The last quarter's accounts have not come.",
  );
  // Awaited, and not due before the day that is looked at.
  const dueToday = daysBetween(LAST_QUARTER_END, AS_OF);
  const awaited = { firstPeriodEnd: LAST_QUARTER_END } as const;
  expect(late({ ...awaited, dueDays: dueToday }, without(LAST_QUARTER_END))).toBeUndefined();
  expect(late({ ...awaited, dueDays: dueToday - 1 }, without(LAST_QUARTER_END))).toMatch(/have not come/);
});

test('a second version of a period is a restatement', () => {
  expect(beside({ inputs: borrower }).restatements).toBe('None of the 16 period ends kept was restated.');
  const [first] = borrower.statements;
  const again = { ...first!, id: -1, version: 2 };
  const restated = { ...borrower, statements: [...borrower.statements, again] };
  expect(beside({ inputs: restated }).restatements).toMatch(/^1 of the 16 period ends kept was restated/);
});

test("the audited year is held against the management's", () => {
  const year = (basis: 'audited' | 'management', net_income: number) =>
    buildStatement('2025-12-31', 12, { net_income }, { basis });
  const both = { ...borrower, statements: [year('management', 100), year('audited', 92)] };
  expect(beside({ inputs: both })['audited less management']).toBe(
    "Audited net income of the year to 31 Dec 2025 differed from the management's by −8\u00a0%.",
  );
});

test('receivable days are shown over two years too', () => {
  const days = beside({ inputs: buildBorrower(3, { receivablesUp: 0.3 }) })['receivable days over two years'];
  expect(days).toMatch(/^Receivable days went from 5\d to 7\d within two years \(\+\d\d\u00a0%\)\.$/);
});
