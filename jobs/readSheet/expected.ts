/** The shape in which an expected reading is written, and a reading printed. */
import { z } from 'zod';
import type { Reading } from '../../src/core/statements/workbookReading.ts';

const fact = z.object({
  code: z.string(),
  end: z.string(),
  /** 0 is a balance at an instant. */
  months: z.number(),
  /** In single currency units. */
  amount: z.string(),
  /** 'Sheet!A1' */
  cell: z.string(),
  /** The question that must be answered before the fact may be taken. */
  after: z.string().optional(),
});
export type ExpectedFact = z.infer<typeof fact>;

export const expectedReading = z.object({
  file: z.string(),
  outcome: z.enum(['ready', 'questions', 'refused']),
  refusal: z.object({ code: z.string(), where: z.string().nullable() }).nullable(),
  currency: z.string().nullable(),
  unit: z.number().nullable(),
  periods: z.array(z.object({ end: z.string(), months: z.number(), scenario: z.string() })),
  questions: z.array(z.string()),
  not_questions: z.array(z.string()).default([]),
  notes: z.array(z.string()),
  checks: z.array(z.object({ code: z.string(), outcome: z.string() })),
  facts: z.array(fact),
});
export type ExpectedReading = z.infer<typeof expectedReading>;

const answerValue = z.union([
  z.string(),
  z.number(),
  z.array(z.string()),
  z.record(z.string(), z.union([z.string(), z.number()])),
]);
/** By file and kind of question. */
export const expectedAnswers = z.record(z.string(), z.record(z.string(), answerValue));
export type AnswersOfFile = Readonly<Record<string, z.infer<typeof answerValue>>>;

export type PrintedReading = Omit<ExpectedReading, 'not_questions'>;

export function printed(file: string, reading: Reading): PrintedReading {
  const { refusal } = reading;
  return {
    file,
    outcome: reading.outcome,
    refusal: refusal && {
      code: refusal.code,
      where: refusal.where ? `${refusal.where.sheet}!${refusal.where.cell}` : null,
    },
    currency: reading.currency,
    unit: reading.unit === null ? null : Number(reading.unit),
    periods: periodsOf(reading),
    questions: [
      ...new Set(reading.questions.filter(({ answer }) => answer === null).map(({ kind }) => kind)),
    ],
    notes: [...new Set(reading.notes.map(({ code }) => code))],
    checks: checksOf(reading),
    facts: reading.facts.filter(({ waitsFor }) => waitsFor.length === 0).map(printedFact),
  };
}

const printedFact = ({
  code,
  periodEnd,
  months,
  amount,
  sheet,
  cell,
}: Reading['facts'][number]): ExpectedFact => ({
  code,
  end: periodEnd,
  months,
  amount,
  cell: `${sheet}!${cell}`,
});

function periodsOf({ sheets, facts }: Reading): PrintedReading['periods'] {
  const all = [
    ...facts.map(({ periodEnd, months }) => ({ end: periodEnd, months, scenario: 'actual' })),
    ...sheets.flatMap(({ columns }) =>
      columns.flatMap(({ periodEnd, months, scenario }) =>
        periodEnd && months !== null && scenario !== 'derived' ? [{ end: periodEnd, months, scenario }] : [],
      ),
    ),
  ];
  const distinct = new Map(
    all.map((period) => [`${period.end}|${period.months}|${period.scenario}`, period]),
  );
  return [...distinct].sort(([one], [other]) => (one < other ? -1 : 1)).map(([, period]) => period);
}

/** One outcome a code: the worst. */
function checksOf({ checks }: Reading): PrintedReading['checks'] {
  const gravity = ['ties', 'warning', 'does-not-tie'];
  const worst = new Map<string, string>();
  for (const { code, outcome } of checks) {
    if (gravity.indexOf(outcome) > gravity.indexOf(worst.get(code) ?? '')) worst.set(code, outcome);
  }
  return [...worst].map(([code, outcome]) => ({ code, outcome }));
}
