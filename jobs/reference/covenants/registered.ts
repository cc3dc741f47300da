/** A vector's figures laid out as a year's statements and put through the registered measure, as a covenant's are. */
import { monthsBefore } from '#core/calendar/fiscalYear.ts';
import { plainDate, type PlainDate } from '#core/calendar/plainDate.ts';
import type { Covenant } from '#core/covenants/covenant.ts';
import { figuresOf } from '#core/covenants/figures.ts';
import type { Sides } from '#core/covenants/headroom.ts';
import { holdAgainstLevel, type Held, type Terms } from '#core/covenants/holdAgainstLevel.ts';
import { levelInForce } from '#core/covenants/levels.ts';
import { withoutResult } from '#core/covenants/withoutResult.ts';
import type { BridgeLine } from '#core/measures/bridge.ts';
import { PLAIN_DEFINITION, type CurrencyRate, type MeasureDefinition } from '#core/measures/definition.ts';
import { MEASURES } from '#core/measures/index.ts';
import type { MeasureCode } from '#core/measures/measure.ts';
import { Decimal, ZERO } from '#core/money/decimal.ts';
import type { Amounts, Statement } from '#core/statements/statement.ts';
import { bookOf } from '#core/statements/statementBook.ts';
import { netLeverageCovenant, statementOf } from './statements.ts';

const YEAR_END = plainDate('2025-12-31');

/** What the accounts of one year say; `before` is the balance sheet a year earlier. */
export interface Accounts {
  readonly flows?: Amounts;
  readonly balances?: Amounts;
  readonly before?: Amounts;
  readonly further?: readonly Statement[];
  readonly definition?: Partial<MeasureDefinition>;
  readonly testDate?: PlainDate;
  readonly levels?: Covenant['levels'];
  /** The covenant's currency and the rates into it; the statements are in EUR. */
  readonly currency?: string;
  readonly rates?: readonly CurrencyRate[];
}

export interface Registered {
  readonly held: Held;
  /** Null where the measure has no value. */
  readonly sides: Sides | null;
  readonly otherHeld: Held | null;
  readonly level: Decimal | null;
  readonly bridge: readonly BridgeLine[];
}

/** A year whose EBITDA is just this. */
export const earning = (ebitda: Decimal): Amounts => ({
  net_income: ebitda,
  income_tax: ZERO,
  interest_expense: ZERO,
  depreciation: ZERO,
});

/** Net debt as a loan, or as cash where there is more of it than debt. */
export const owing = (netDebt: Decimal): Amounts => ({
  senior_debt: Decimal.max(ZERO, netDebt),
  cash: Decimal.max(ZERO, netDebt.negated()),
});

/** The measure on these accounts, held against the level as a covenant holds it. */
export function registered(measure: MeasureCode, accounts: Accounts, terms: Terms): Registered {
  const { testDate = YEAR_END, levels = [levelFrom(terms.level)] } = accounts;
  const covenant: Covenant = {
    ...netLeverageCovenant(levels, testDate),
    measure,
    ...terms,
    definition: { ...PLAIN_DEFINITION, ...accounts.definition },
    currency: accounts.currency ?? 'EUR',
  };
  const statements = [
    statementOf(1, testDate, 12, accounts.flows ?? {}),
    statementOf(2, testDate, 0, accounts.balances ?? {}),
    statementOf(3, monthsBefore(testDate, 12), 0, accounts.before ?? {}),
    ...(accounts.further ?? []),
  ];
  const figures = figuresOf(covenant, bookOf(statements, 12), testDate, accounts.rates);
  const { sides, otherSides, level, bridge } = figures;
  const nothing = withoutResult(covenant, testDate, levelInForce(levels, testDate), figures);
  const against = (these: Sides): Held =>
    holdAgainstLevel(MEASURES[measure], these, { ...terms, level: level ?? terms.level });
  if (!nothing && !sides) throw new Error(`${measure} has neither a result nor a reason`);
  return {
    held: nothing ?? against(sides!),
    sides,
    otherHeld: otherSides && against(otherSides),
    level,
    bridge,
  };
}

const levelFrom = (level: Decimal): Covenant['levels'][number] => ({
  from: '1970-01-01',
  until: null,
  level,
  isReset: false,
});
