/** Puts a reading together, ready, with questions or refused. */
import type {
  ReadAddBack,
  ReadCheck,
  Reading,
  ReadFact,
  ReadRefusal,
  RowPlacement,
} from '#core/statements/workbookReading.ts';
import type { Asking } from './asking.ts';
import type { WorkbookGrid } from './cells.ts';
import type { TableFact } from './facts.ts';
import { layoutKeyOf } from './layoutKey.ts';
import { sheetsOut } from './sheetsOut.ts';
import type { SettledColumns, StatementTable } from './statements.ts';
import type { SettledScale } from './units.ts';

export interface ReadingParts {
  readonly grid: WorkbookGrid;
  readonly tables: readonly StatementTable[];
  readonly settled: SettledColumns;
  readonly facts: readonly TableFact[];
  readonly addBacks: readonly ReadAddBack[];
  readonly checks: readonly ReadCheck[];
  readonly asking: Asking;
  readonly scales: ReadonlyMap<StatementTable, SettledScale>;
  readonly placements: readonly RowPlacement[];
  readonly layoutKey: string;
}

export function readingOf(parts: ReadingParts): Reading {
  const { asking } = parts;
  const waits = asking.questions.some(
    ({ kind, answer }) => answer === null || (kind === 'does-not-balance' && answer === 'wait'),
  );
  const main = mainScale(parts);
  return {
    outcome: waits ? 'questions' : 'ready',
    refusal: null,
    currency: main?.currency ?? null,
    unit: main?.unit ? String(main.unit) : null,
    sheets: sheetsOut(parts.grid.sheets, parts.tables, parts.settled),
    placements: parts.placements,
    facts: parts.facts.map(plainFact),
    ...(parts.addBacks.length > 0 ? { addBacks: parts.addBacks } : {}),
    questions: asking.questions,
    notes: asking.notes,
    checks: parts.checks,
    layoutKey: parts.layoutKey,
  };
}

/** Where sheets differ, the income statement's. */
function mainScale({ tables, scales }: ReadingParts): SettledScale | null {
  const income = tables.find(({ runs }) => runs.some(({ part }) => part === 'income'));
  const first = income ?? tables[0];
  return first ? (scales.get(first) ?? null) : null;
}

const plainFact = (fact: TableFact): ReadFact => ({
  code: fact.code,
  periodEnd: fact.periodEnd,
  months: fact.months,
  periodStart: fact.periodStart,
  amount: fact.amount,
  sheet: fact.sheet,
  cell: fact.cell,
  rawText: fact.rawText.slice(0, 120),
  label: fact.label.slice(0, 255),
  fromFormula: fact.fromFormula,
  waitsFor: fact.waitsFor,
  borrower: fact.borrower,
});

export function refusedReading(
  reason: ReadRefusal,
  grid: WorkbookGrid,
  tables: readonly StatementTable[],
  asking: Asking,
): Reading {
  const stated = <Value>(values: readonly (Value | null)[]): Value | null => {
    const found = [...new Set(values.filter((value): value is Value => value !== null))];
    return found.length === 1 ? (found[0] ?? null) : null;
  };
  const unit = stated(tables.map(({ scale }) => scale.unit));
  return {
    ...nothingRead(reason),
    currency: stated(tables.map(({ scale }) => scale.currency)),
    unit: unit === null ? null : String(unit),
    sheets: sheetsOut(grid.sheets, tables, new Map()),
    notes: asking.notes,
    layoutKey: layoutKeyOf(tables),
  };
}

/** A file that was not opened at all. */
export const nothingRead = (reason: ReadRefusal): Reading => ({
  outcome: 'refused',
  refusal: reason,
  currency: null,
  unit: null,
  sheets: [],
  placements: [],
  facts: [],
  questions: [],
  notes: [],
  checks: [],
  layoutKey: '',
});

/** A balance sheet that does not balance is taken only by a person's word, and marked. */
export function askUnbalanced(
  facts: readonly TableFact[],
  checks: readonly ReadCheck[],
  asking: Asking,
): TableFact[] {
  const broken = checks.filter(({ code, outcome }) => code === 'balance' && outcome === 'does-not-tie');
  const keys = new Map<string, string>();
  for (const check of broken) {
    const fact = facts.find(
      ({ code, periodEnd, months }) =>
        code === 'total_assets' && months === 0 && periodEnd === check.periodEnd,
    );
    const key = `does-not-balance:${check.periodEnd}`;
    asking.ask({
      key,
      kind: 'does-not-balance',
      holdsFor: 'file',
      text: `The balance sheet of ${check.periodEnd} does not balance: the difference is ${check.difference}. Take it as marked, outside the score and peers, or wait for a corrected file?`,
      where: fact ? [{ sheet: fact.sheet, cell: fact.cell }] : [],
      options: [
        { value: 'draft', label: 'Take it, marked as not balancing' },
        { value: 'wait', label: 'Wait for a corrected file' },
      ],
    });
    if (asking.isOpen(key)) keys.set(check.periodEnd, key);
  }
  return facts.map((fact) => {
    const key = fact.months === 0 ? keys.get(fact.periodEnd) : undefined;
    return key ? { ...fact, waitsFor: [...fact.waitsFor, key] } : fact;
  });
}
