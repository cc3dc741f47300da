/**
 * What the reader makes of a demo workbook, put together beside it: seeding sixty workbooks through the reader's
 * workers would take most of a minute, and every row's place is known here.
 */
import { createHash } from 'node:crypto';
import { addDays, addMonthsToMonthEnd, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import { decimal } from '../../src/core/money/decimal.ts';
import { roundingTolerance, tieOf } from '../../src/core/statements/tolerance.ts';
import type {
  ReadCheck,
  ReadFact,
  Reading,
  ReadSheet,
  RowPlacement,
} from '../../src/core/statements/workbookReading.ts';
import type { DemoLine, DemoQuarter } from './demoLines.ts';
import type { WorkbookContent } from './demoWorkbook.ts';
import { columnLetter, filledSheet, SHEETS, type FilledSheet } from './workbookLayout.ts';

const UNIT = 1_000;

export function demoReading(content: WorkbookContent & { readonly currency: string }): Reading {
  const sheets = SHEETS.map((layout) => filledSheet(layout, content));
  const periods = content.quarters.map(({ quarterEnd }) => quarterEnd);
  return {
    outcome: 'ready',
    refusal: null,
    currency: content.currency,
    unit: String(UNIT),
    sheets: sheets.map((sheet) => readSheet(sheet, periods)),
    placements: sheets.flatMap(placementsOf),
    facts: sheets.flatMap((sheet) => factsOf(sheet, periods)),
    questions: [],
    notes: [],
    checks: content.quarters.flatMap((quarter, index) => checksOf(quarter, content.quarters[index - 1])),
    layoutKey: layoutKeyOf(sheets),
  };
}

const periodStart = (quarterEnd: PlainDate, months: number): PlainDate =>
  months === 0 ? quarterEnd : addDays(addMonthsToMonthEnd(quarterEnd, -months), 1);

/** As the number format '#,##0' prints it. */
const printed = (amount: number): string => amount.toLocaleString('en-US');

function factsOf({ layout, rows }: FilledSheet, periods: readonly PlainDate[]): ReadFact[] {
  return rows.flatMap((row) =>
    'text' in row
      ? []
      : row.amounts.map((amount, index): ReadFact => {
          const periodEnd = periods[index];
          if (periodEnd === undefined) throw new RangeError(`no period for column ${index}`);
          return {
            code: row.line,
            periodEnd,
            months: layout.months,
            periodStart: periodStart(periodEnd, layout.months),
            amount: String(amount * UNIT),
            sheet: layout.name,
            cell: `${columnLetter(index)}${row.row}`,
            rawText: printed(amount),
            label: row.label,
            fromFormula: false,
            waitsFor: [],
            borrower: null,
          };
        }),
  );
}

const placementsOf = ({ layout, rows }: FilledSheet): RowPlacement[] =>
  rows.flatMap((row) =>
    'text' in row
      ? []
      : { sheet: layout.name, row: row.row, label: row.label, code: row.line, reason: 'known wording' },
  );

function readSheet(
  { layout, headingRow, headings, rows }: FilledSheet,
  periods: readonly PlainDate[],
): ReadSheet {
  const lastRow = Math.max(...rows.map(({ row }) => row));
  const text = (value: string, bold: boolean) => ({ text: value, numeric: false, bold, error: false });
  const grid = Array.from({ length: lastRow }, (_, index) => {
    const row = rows.find((one) => one.row === index + 1);
    if (index + 1 === headingRow) return [text('', false), ...headings.map((heading) => text(heading, true))];
    if (!row) return [];
    if ('text' in row) return [text(row.text, true)];
    const amounts = row.amounts.map((amount) => ({ ...text(printed(amount), false), numeric: true }));
    return [text(row.label, false), ...amounts];
  });
  return {
    name: layout.name,
    hidden: false,
    part: layout.part,
    grid,
    columns: periods.map((periodEnd, index) => ({
      column: columnLetter(index),
      periodStart: periodStart(periodEnd, layout.months),
      periodEnd,
      months: layout.months,
      scenario: 'actual',
      heading: headings[index] ?? '',
    })),
  };
}

/** The checks that the reader makes where it can; the cash roll needs the balance sheet before. */
function checksOf({ quarterEnd, lines }: DemoQuarter, before: DemoQuarter | undefined): ReadCheck[] {
  const check = (
    code: string,
    text: string,
    months: number,
    difference: number,
    figures: number,
    reference: DemoLine,
  ): ReadCheck => {
    const amount = decimal(difference).times(UNIT);
    const base = decimal(lines[reference]).times(UNIT);
    const tolerance = roundingTolerance({ roundingUnit: decimal(UNIT), figures, reference: base });
    return {
      code,
      text,
      outcome: tieOf(amount, tolerance, base),
      difference: amount.toFixed(),
      tolerance: tolerance.toFixed(),
      periodEnd: quarterEnd,
      months,
    };
  };
  const { revenue, cogs, gross_profit, ebit, interest_expense, interest_income } = lines;
  const beforeTax = ebit - interest_expense + interest_income - lines.profit_before_tax;
  return [
    check(
      'balance',
      'Total assets = total liabilities + equity',
      0,
      lines.total_assets - lines.total_liabilities - lines.equity,
      3,
      'total_assets',
    ),
    check('gross-profit', 'Revenue - cost of sales', 3, revenue - cogs - gross_profit, 3, 'revenue'),
    check('pbt', 'Operating profit to profit before tax', 3, beforeTax, 4, 'revenue'),
    check(
      'net-income',
      'Profit before tax - tax',
      3,
      lines.profit_before_tax - lines.income_tax - lines.net_income,
      3,
      'revenue',
    ),
    ...(before
      ? [
          check(
            'cash-roll',
            'Opening cash + cash flows = closing cash',
            3,
            before.lines.cash + lines.cfo + lines.cfi + lines.cff - lines.cash,
            5,
            'total_assets',
          ),
        ]
      : []),
  ];
}

const layoutKeyOf = (sheets: readonly FilledSheet[]): string =>
  createHash('sha256')
    .update(
      JSON.stringify(
        sheets.map(({ layout, rows }) => [
          layout.name,
          layout.title,
          rows.map((row) => ('text' in row ? row.text : row.label)),
        ]),
      ),
    )
    .digest('hex');
