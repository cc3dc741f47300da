import type { Transaction } from 'sequelize';
import type { CurrencyRate } from '../../../core/measures/definition.ts';
import { decimal } from '../../../core/money/decimal.ts';
import { insertRows } from '../insertRows.ts';
import { select } from '../sql.ts';

/** Every rate that was known by then, oldest period first; of two for one period the later known is the last. */
export async function loadCurrencyRates(tx: Transaction, knownAt: Date): Promise<readonly CurrencyRate[]> {
  const rows = await select<Omit<CurrencyRate, 'rate'> & { readonly rate: string }>(
    tx,
    `select from_currency as \`from\`, to_currency as \`to\`, kind, period_start as periodStart,
       period_end as periodEnd, rate, source
     from currency_rates where known_from <= :knownAt and (known_to is null or known_to > :knownAt)
     order by from_currency, to_currency, kind, period_end, id`,
    { knownAt },
  );
  return rows.map((row) => ({ ...row, rate: decimal(row.rate) }));
}

export async function insertCurrencyRates(
  tx: Transaction,
  rates: readonly CurrencyRate[],
  knownFrom: Date,
): Promise<void> {
  await insertRows(
    tx,
    'currency_rates',
    rates.map((rate) => ({
      from_currency: rate.from,
      to_currency: rate.to,
      kind: rate.kind,
      period_start: rate.periodStart,
      period_end: rate.periodEnd,
      rate: rate.rate.toFixed(),
      source: rate.source,
      known_from: knownFrom,
    })),
  );
}
