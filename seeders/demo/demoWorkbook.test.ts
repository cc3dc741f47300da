import { expect, test } from 'vitest';
import { statementsFromReading } from '../../src/core/statements/statementsFromReading.ts';
import type { Reading } from '../../src/core/statements/workbookReading.ts';
import { readBytes } from '../../src/server/sheets/read/readBytes.ts';
import type { DemoBorrower } from './demoBorrower.ts';
import { demoBook, LATE } from './demoBook.ts';
import type { DemoQuarter } from './demoLines.ts';
import { demoWorkbook } from './demoWorkbook.ts';
import { MEMORANDUM_PLACEMENTS } from './workbookLayout.ts';

/** One of each sector, with loss, net cash and leases among them. */
const READ_BACK = /^(Ostervane|Grunvelder|Bramblewyke|Antrevold|Nethervane|Carrovende|Bautreske|Pinevarra)/;
const book = demoBook('2026-12-01', ({ name, scenario }) => READ_BACK.test(name) || LATE.includes(scenario));

async function readBack(
  borrower: DemoBorrower,
  quarters: readonly DemoQuarter[],
  unit: string | null,
): Promise<Reading> {
  const bytes = await demoWorkbook({ borrowerName: borrower.name, unit, quarters, madeOn: '2026-11-01' });
  return readBytes({
    kind: 'xlsx',
    bytes,
    notes: [],
    context: {
      fiscalYearEndMonth: borrower.fiscalYearEndMonth,
      reportingCurrency: borrower.currency,
      answers: MEMORANDUM_PLACEMENTS,
      lastQuarterRevenue: null,
      borrowerName: borrower.name,
    },
  });
}

test.each(book.map((borrower) => [borrower.name, borrower] as const))(
  'the reader finds every figure of %s, and all that it checks ties',
  async (_, borrower) => {
    const reading = await readBack(borrower, borrower.quarters, `${borrower.currency} thousands`);
    expect(reading.outcome).toBe('ready');
    expect([reading.currency, reading.unit]).toEqual([borrower.currency, '1000']);

    const statements = statementsFromReading(reading);
    expect(statements.map(({ tie }) => tie)).toEqual(statements.map(() => 'ties'));
    const read = new Map(
      statements.flatMap(({ periodEnd, amounts }) =>
        Object.entries(amounts).map(([line, amount]) => [`${periodEnd} ${line}`, amount.toFixed()] as const),
      ),
    );
    for (const { quarterEnd, lines } of borrower.quarters)
      for (const [line, thousands] of Object.entries(lines))
        if (thousands !== 0 || read.has(`${quarterEnd} ${line}`))
          expect(read.get(`${quarterEnd} ${line}`), `${quarterEnd} ${line}`).toBe(String(thousands * 1_000));
  },
  20_000,
);

test('the next delivery is of the layout whose placements are remembered', async () => {
  for (const borrower of book.filter(({ owed }) => owed !== null)) {
    const [last, owed] = [borrower.quarters.at(-1), borrower.owed];
    if (!last || !owed) throw new Error('a quarter owed expected');
    const history = await readBack(borrower, borrower.quarters, `${borrower.currency} thousands`);
    const next = await readBack(borrower, [last, owed], `${borrower.currency} thousands`);
    expect(next.outcome).toBe('ready');
    expect(next.layoutKey).toBe(history.layoutKey);
    expect(next.facts.filter(({ code }) => code === 'cash').map(({ periodEnd }) => periodEnd)).toEqual([
      last.quarterEnd,
      owed.quarterEnd,
    ]);
  }
}, 20_000);

test('a workbook that states no unit is asked for it', async () => {
  const [borrower] = book;
  if (!borrower) throw new Error('a borrower expected');
  const reading = await readBack(borrower, borrower.quarters.slice(-2), null);
  expect(reading.outcome).toBe('questions');
  expect(reading.questions.filter(({ answer }) => answer === null).map(({ kind }) => kind)).toEqual([
    'unit',
    'currency',
  ]);
});
