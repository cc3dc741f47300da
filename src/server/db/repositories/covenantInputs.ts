import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import type { AddBack, Covenant, CovenantLevel, Operator, Waiver } from '../../../core/covenants/covenant.ts';
import type { MeasureCode } from '../../../core/measures/measure.ts';
import { decimal, type Decimal } from '../../../core/money/decimal.ts';
import type { StatementScope } from '../../../core/statements/statement.ts';
import { groupRows } from '../groupRows.ts';
import { select } from '../sql.ts';

interface TermsRow {
  readonly id: number;
  readonly borrowerId: number;
  readonly facilityId: number;
  readonly name: string;
  readonly clause: string;
  readonly measure: MeasureCode;
  readonly operator: Operator;
  readonly roundingPlaces: number | null;
  readonly scope: StatementScope;
  readonly currency: string;
  readonly firstTestOn: PlainDate;
  readonly everyMonths: number;
  readonly addBackCap: string | null;
  readonly addBackCapBasis: 'before' | 'after';
  readonly leasesInDebt: number;
  readonly cashNettingCap: string | null;
  readonly undrawnCountsAsLiquidity: number;
}

type Part<Row> = Row & { readonly covenantId: number };

/** Covenants with the terms, levels, add-backs and waivers that were known by then. */
export async function loadCovenants(
  tx: Transaction,
  borrowerIds: readonly number[],
  knownAt: Date,
): Promise<ReadonlyMap<number, Covenant[]>> {
  const terms = await loadTerms(tx, borrowerIds, knownAt);
  const covenantIds = terms.map((row) => row.id);
  const levels = await loadLevels(tx, covenantIds, knownAt);
  const addBacks = await loadAddBacks(tx, covenantIds, knownAt);
  const waivers = await loadWaivers(tx, covenantIds, knownAt);
  return groupRows(
    terms,
    (row) => row.borrowerId,
    (row) =>
      toCovenant(row, {
        levels: levels.get(row.id) ?? [],
        addBacks: addBacks.get(row.id) ?? [],
        waivers: waivers.get(row.id) ?? [],
      }),
  );
}

const KNOWN = 'known_from <= :knownAt and (known_to is null or known_to > :knownAt)';

/**
 * The terms in force on the cut-off's day; where all of them begin later, the first, so that a covenant agreed
 * for next quarter is there with its schedule.
 */
async function loadTerms(
  tx: Transaction,
  borrowerIds: readonly number[],
  knownAt: Date,
): Promise<TermsRow[]> {
  const rows = await select<TermsRow & { validFrom: PlainDate }>(
    tx,
    `select c.id, c.borrower_id as borrowerId, c.facility_id as facilityId, t.name, t.clause, t.measure, t.operator,
       t.rounding_places as roundingPlaces, t.scope, t.currency, t.first_test_on as firstTestOn,
       t.every_months as everyMonths, t.add_back_cap as addBackCap, t.add_back_cap_basis as addBackCapBasis,
       t.leases_in_debt as leasesInDebt, t.cash_netting_cap as cashNettingCap,
       t.undrawn_counts_as_liquidity as undrawnCountsAsLiquidity, t.valid_from as validFrom
     from covenants c join covenant_terms t on t.covenant_id = c.id
     where c.borrower_id in (:borrowerIds) and t.known_from <= :knownAt
       and (t.known_to is null or t.known_to > :knownAt) and (t.valid_to is null or t.valid_to >= :day)
     order by c.borrower_id, c.id, t.valid_from, t.id`,
    { borrowerIds, knownAt, day: knownAt.toISOString().slice(0, 10) },
  );
  const day = knownAt.toISOString().slice(0, 10);
  const chosen = new Map<number, TermsRow>();
  for (const row of rows) if (!chosen.has(row.id) || row.validFrom <= day) chosen.set(row.id, row);
  return [...chosen.values()];
}

async function loadLevels(
  tx: Transaction,
  covenantIds: readonly number[],
  knownAt: Date,
): Promise<ReadonlyMap<number, CovenantLevel[]>> {
  const rows = await select<Part<{ from: PlainDate; until: PlainDate | null; level: string | null }>>(
    tx,
    `select covenant_id as covenantId, from_date as \`from\`, until_date as until, level
     from covenant_levels where covenant_id in (:covenantIds) and ${KNOWN} order by covenant_id, from_date, id`,
    { covenantIds, knownAt },
  );
  return grouped(rows, ({ from, until, level }) => ({ from, until, level: amountOrNull(level) }));
}

async function loadAddBacks(
  tx: Transaction,
  covenantIds: readonly number[],
  knownAt: Date,
): Promise<ReadonlyMap<number, AddBack[]>> {
  const rows = await select<
    Part<Omit<AddBack, 'amount' | 'capped'> & { readonly amount: string; readonly isCapped: number }>
  >(
    tx,
    `select id, covenant_id as covenantId, period_end as periodEnd, months, label, amount, is_capped as isCapped, reason
     from add_backs where covenant_id in (:covenantIds) and ${KNOWN} order by covenant_id, period_end, id`,
    { covenantIds, knownAt },
  );
  return grouped(rows, ({ id, periodEnd, months, label, amount, isCapped, reason }) => ({
    id,
    periodEnd,
    months,
    label,
    amount: decimal(amount),
    capped: isCapped === 1,
    reason,
  }));
}

async function loadWaivers(
  tx: Transaction,
  covenantIds: readonly number[],
  knownAt: Date,
): Promise<ReadonlyMap<number, Waiver[]>> {
  const rows = await select<Part<Waiver>>(
    tx,
    `select covenant_id as covenantId, test_date as testDate, granted_on as grantedOn, until_date as until, conditions
     from waivers where covenant_id in (:covenantIds) and ${KNOWN} order by covenant_id, test_date, id`,
    { covenantIds, knownAt },
  );
  return grouped(rows, ({ testDate, grantedOn, until, conditions }) => ({
    testDate,
    grantedOn,
    until,
    conditions,
  }));
}

const grouped = <Row extends { readonly covenantId: number }, Value>(
  rows: readonly Row[],
  toValue: (row: Row) => Value,
): ReadonlyMap<number, Value[]> => groupRows(rows, (row) => row.covenantId, toValue);

const amountOrNull = (text: string | null): Decimal | null => (text === null ? null : decimal(text));

const toCovenant = (row: TermsRow, parts: Pick<Covenant, 'levels' | 'addBacks' | 'waivers'>): Covenant => ({
  id: row.id,
  facilityId: row.facilityId,
  name: row.name,
  clause: row.clause,
  measure: row.measure,
  operator: row.operator,
  roundingPlaces: row.roundingPlaces,
  scope: row.scope,
  currency: row.currency,
  firstTestOn: row.firstTestOn,
  everyMonths: row.everyMonths,
  definition: {
    addBackCap: amountOrNull(row.addBackCap),
    addBackCapBasis: row.addBackCapBasis,
    leasesInDebt: row.leasesInDebt === 1,
    cashNettingCap: amountOrNull(row.cashNettingCap),
    undrawnCountsAsLiquidity: row.undrawnCountsAsLiquidity === 1,
  },
  ...parts,
});
