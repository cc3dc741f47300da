import { expect, test } from 'vitest';
import { besideTheScore, type BesideContext } from './besideTheScore.ts';
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
