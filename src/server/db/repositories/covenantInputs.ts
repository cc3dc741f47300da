import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import type {
  AddBack,
  Covenant,
  CovenantLevel,
  CureRights,
  EquityCure,
  Operator,
  Waiver,
} from '../../../core/covenants/covenant.ts';
import type { MeasureDefinition } from '../../../core/measures/definition.ts';
import type { MeasureCode } from '../../../core/measures/measure.ts';
import { decimal, type Decimal } from '../../../core/money/decimal.ts';
import type { StatementBasis, StatementScope } from '../../../core/statements/statement.ts';
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
  readonly basis: StatementBasis | null;
  readonly isOurs: number;
  readonly impairmentAddedBack: number;
  readonly accounting: MeasureDefinition['accounting'];
  readonly annualisedFirstTests: number;
  readonly debtRate: MeasureDefinition['debtRate'];
  readonly gearing: MeasureDefinition['gearing'];
  readonly deferredTaxInNetWorth: number;
  readonly shareholderLoansInNetWorth: number;
  readonly openingCashInDebtService: number;
  readonly dividendsInFixedCharges: number;
  readonly valuationMaxAgeMonths: number | null;
  readonly capexCarriedShare: string | null;
  readonly profitShareInNetWorth: string | null;
  readonly springingTrigger: string | null;
  readonly cureMethod: CureRights['method'] | null;
  readonly cureBusinessDays: number | null;
  readonly curesInFour: number | null;
  readonly curesInLife: number | null;
  readonly curedByNextTest: number;
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
  const cures = await loadEquityCures(tx, covenantIds, knownAt);
  return groupRows(
    terms,
    (row) => row.borrowerId,
    (row) =>
      toCovenant(row, {
        levels: levels.get(row.id) ?? [],
        addBacks: addBacks.get(row.id) ?? [],
        waivers: waivers.get(row.id) ?? [],
        cures: cures.get(row.id) ?? [],
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
       t.undrawn_counts_as_liquidity as undrawnCountsAsLiquidity, t.basis, t.is_ours as isOurs,
       t.impairment_added_back as impairmentAddedBack, t.accounting,
       t.annualised_first_tests as annualisedFirstTests, t.debt_rate as debtRate, t.gearing,
       t.deferred_tax_in_net_worth as deferredTaxInNetWorth,
       t.shareholder_loans_in_net_worth as shareholderLoansInNetWorth,
       t.opening_cash_in_debt_service as openingCashInDebtService,
       t.dividends_in_fixed_charges as dividendsInFixedCharges,
       t.valuation_max_age_months as valuationMaxAgeMonths, t.capex_carried_share as capexCarriedShare,
       t.profit_share_in_net_worth as profitShareInNetWorth, t.springing_trigger as springingTrigger,
       t.cure_method as cureMethod, t.cure_business_days as cureBusinessDays, t.cures_in_four as curesInFour,
       t.cures_in_life as curesInLife, t.cured_by_next_test as curedByNextTest, t.valid_from as validFrom
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
  const rows = await select<
    Part<{ from: PlainDate; until: PlainDate | null; level: string | null; isReset: number }>
  >(
    tx,
    `select covenant_id as covenantId, from_date as \`from\`, until_date as until, level, is_reset as isReset
     from covenant_levels where covenant_id in (:covenantIds) and ${KNOWN} order by covenant_id, from_date, id`,
    { covenantIds, knownAt },
  );
  return grouped(rows, ({ from, until, level, isReset }) => ({
    from,
    until,
    level: amountOrNull(level),
    isReset: isReset === 1,
  }));
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
    `select a.id, a.covenant_id as covenantId, a.period_end as periodEnd, a.months, a.label, a.amount,
       a.is_capped as isCapped, a.reason, a.evidence, p.name as approvedBy
     from add_backs a left join people p on p.id = a.checked_by
     where a.covenant_id in (:covenantIds) and ${KNOWN} order by a.covenant_id, a.period_end, a.id`,
    { covenantIds, knownAt },
  );
  return grouped(
    rows,
    ({ id, periodEnd, months, label, amount, isCapped, reason, evidence, approvedBy }) => ({
      id,
      periodEnd,
      months,
      label,
      amount: decimal(amount),
      capped: isCapped === 1,
      reason,
      evidence,
      approvedBy,
    }),
  );
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

async function loadEquityCures(
  tx: Transaction,
  covenantIds: readonly number[],
  knownAt: Date,
): Promise<ReadonlyMap<number, EquityCure[]>> {
  const rows = await select<Part<Omit<EquityCure, 'amount'> & { readonly amount: string }>>(
    tx,
    `select covenant_id as covenantId, quarter_end as quarterEnd, method, amount, received_on as receivedOn
     from equity_cures where covenant_id in (:covenantIds) and ${KNOWN} order by covenant_id, quarter_end, id`,
    { covenantIds, knownAt },
  );
  return grouped(rows, ({ quarterEnd, method, amount, receivedOn }) => ({
    quarterEnd,
    method,
    amount: decimal(amount),
    receivedOn,
  }));
}

const grouped = <Row extends { readonly covenantId: number }, Value>(
  rows: readonly Row[],
  toValue: (row: Row) => Value,
): ReadonlyMap<number, Value[]> => groupRows(rows, (row) => row.covenantId, toValue);

const amountOrNull = (text: string | null): Decimal | null => (text === null ? null : decimal(text));

const toCovenant = (
  row: TermsRow,
  parts: Pick<Covenant, 'levels' | 'addBacks' | 'waivers' | 'cures'>,
): Covenant => ({
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
  basis: row.basis,
  isOurs: row.isOurs === 1,
  definition: toDefinition(row),
  springing: row.springingTrigger === null ? null : { trigger: decimal(row.springingTrigger) },
  cureRights: toCureRights(row),
  ...parts,
});

const toDefinition = (row: TermsRow): MeasureDefinition => ({
  addBackCap: amountOrNull(row.addBackCap),
  addBackCapBasis: row.addBackCapBasis,
  impairmentAddedBack: row.impairmentAddedBack === 1,
  leasesInDebt: row.leasesInDebt === 1,
  accounting: row.accounting,
  cashNettingCap: amountOrNull(row.cashNettingCap),
  undrawnCountsAsLiquidity: row.undrawnCountsAsLiquidity === 1,
  annualisedFirstTests: row.annualisedFirstTests,
  debtRate: row.debtRate,
  gearing: row.gearing,
  deferredTaxInNetWorth: row.deferredTaxInNetWorth === 1,
  shareholderLoansInNetWorth: row.shareholderLoansInNetWorth === 1,
  openingCashInDebtService: row.openingCashInDebtService === 1,
  dividendsInFixedCharges: row.dividendsInFixedCharges === 1,
  valuationMaxAgeMonths: row.valuationMaxAgeMonths,
  capexCarriedShare: amountOrNull(row.capexCarriedShare),
  profitShareInNetWorth: amountOrNull(row.profitShareInNetWorth),
});

/** Half a right is none: the database holds all of its terms or nothing. */
const toCureRights = (row: TermsRow): CureRights | null =>
  row.cureMethod === null ||
  row.cureBusinessDays === null ||
  row.curesInFour === null ||
  row.curesInLife === null
    ? null
    : {
        method: row.cureMethod,
        withinBusinessDays: row.cureBusinessDays,
        mostInFour: row.curesInFour,
        mostInLife: row.curesInLife,
        curedByNextTest: row.curedByNextTest === 1,
      };
