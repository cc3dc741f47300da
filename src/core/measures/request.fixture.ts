/** Requests for tests: what matters is named, the rest is ordinary. */
import type { PlainDate } from '../calendar/plainDate.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import type { Reading } from '../statements/reading.ts';
import { bookOf } from '../statements/statementBook.ts';
import { PLAIN_DEFINITION, type MeasureDefinition, type MeasureRequest } from './definition.ts';
import type { Measured } from './measured.ts';
import { translationInto } from './translation.ts';

export const ON: PlainDate = '2025-12-31';

type Figures = Parameters<typeof buildStatement>[2];

/** EBITDA of 12: 4.2 + 1.6 + 2.5 + 3.0 + 0.7. */
export const EARNING_12 = {
  net_income: '4.2',
  income_tax: '1.6',
  interest_expense: '2.5',
  depreciation: '3.0',
  amortisation: '0.7',
} as const satisfies Figures;

export const yearOf = (figures: Figures = {}): Statement =>
  buildStatement(ON, 12, { ...EARNING_12, ...figures });
export const sheetOf = (figures: Figures, date: PlainDate = ON): Statement =>
  buildStatement(date, 0, figures);

export const requestOf = (
  statements: readonly Statement[],
  {
    definition = {},
    ...given
  }: Partial<Omit<MeasureRequest, 'definition'>> & {
    readonly definition?: Partial<MeasureDefinition>;
  } = {},
): MeasureRequest => ({
  book: bookOf(statements, 12),
  date: ON,
  definition: { ...PLAIN_DEFINITION, ...definition },
  addBacks: [],
  months: 12,
  translation: translationInto('EUR', []),
  ...given,
});

/** A reading as text: its value, else what stands in its place. */
export function textOf(reading: Reading | null): string {
  if (reading === null) return 'none';
  if (reading.kind === 'value') return reading.value.toFixed();
  return reading.kind === 'missing'
    ? `missing ${reading.missing.map(({ line }) => line).join(', ')}`
    : reading.reason;
}

/** Both sides as text. */
export const sidesOf = ({ numerator, denominator }: Measured): readonly string[] =>
  denominator ? [textOf(numerator), textOf(denominator)] : [textOf(numerator)];

/** The bridge as text, kind and note where there is more to say. */
export const bridgeOf = ({ bridge }: Pick<Measured, 'bridge'>): readonly string[] =>
  bridge.map(({ label, amount }) => `${label} ${amount.toFixed()}`);
