import { describe, expect, test } from 'vitest';
import { statementsFromReading } from './statementsFromReading.ts';
import type { ReadFact, Reading } from './workbookReading.ts';

const fact = (facts: Partial<ReadFact>): ReadFact => ({
  code: 'revenue',
  periodStart: '2026-07-01',
  periodEnd: '2026-09-30',
  months: 3,
  amount: '48212000',
  sheet: 'P&L',
  cell: 'B6',
  rawText: '48,212',
  label: 'Revenue',
  fromFormula: false,
  waitsFor: [],
  borrower: null,
  ...facts,
});

const reading = (parts: Partial<Reading>): Reading => ({
  outcome: 'ready',
  refusal: null,
  currency: 'EUR',
  unit: '1000',
  sheets: [],
  placements: [],
  facts: [],
  questions: [],
  notes: [],
  checks: [],
  layoutKey: '0',
  ...parts,
});

const balance = { periodStart: '2026-09-30', periodEnd: '2026-09-30', months: 0, sheet: 'Balance' } as const;

describe('statements from a reading', () => {
  test('a balance sheet and the quarter that ends on its day are two statements', () => {
    const statements = statementsFromReading(
      reading({ facts: [fact({}), fact({ ...balance, code: 'cash', amount: '5' })] }),
    );
    expect(statements.map((one) => [one.months, one.periodEnd])).toEqual([
      [0, '2026-09-30'],
      [3, '2026-09-30'],
    ]);
  });

  test('cells of one line are added, and each keeps its place', () => {
    const [statement] = statementsFromReading(
      reading({
        facts: [
          fact({ ...balance, code: 'cash', amount: '0.1', cell: 'B9' }),
          fact({ ...balance, code: 'cash', amount: '0.2', cell: 'B10' }),
        ],
      }),
    );
    expect(statement?.amounts.cash?.toString()).toBe('0.3');
    expect(statement?.cells.map((one) => one.cell)).toEqual(['B9', 'B10']);
  });

  test('the worst check of the period marks the statement', () => {
    const check = {
      code: 'balance',
      text: '',
      difference: '300',
      tolerance: '10',
      periodEnd: '2026-09-30',
      months: 0,
    } as const;
    const [statement] = statementsFromReading(
      reading({
        facts: [fact({ ...balance, code: 'cash' })],
        checks: [
          { ...check, outcome: 'ties' },
          { ...check, outcome: 'does-not-tie' },
          { ...check, outcome: 'warning' },
        ],
      }),
    );
    expect(statement?.tie).toBe('does-not-tie');
  });

  test('nothing is taken from a reading that waits for answers', () => {
    expect(() => statementsFromReading(reading({ outcome: 'questions', facts: [fact({})] }))).toThrow(
      'waits for answers',
    );
    expect(() => statementsFromReading(reading({ unit: null, facts: [fact({})] }))).toThrow(
      'waits for answers',
    );
  });
});
