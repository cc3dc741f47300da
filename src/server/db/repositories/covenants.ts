/** Covenants as they are recorded: the terms by validity and knowledge, the level schedule, add-backs and waivers. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import type {
  AddBack,
  Covenant,
  CovenantLevel,
  EquityCure,
  Waiver,
} from '../../../core/covenants/covenant.ts';
import { insertRows } from '../insertRows.ts';
import { execute } from '../sql.ts';

export type CovenantTerms = Omit<Covenant, 'id' | 'facilityId' | 'levels' | 'addBacks' | 'waivers' | 'cures'>;

/** Since when something holds and since when the lender knows it. */
export interface Recorded {
  readonly validFrom: PlainDate;
  readonly knownFrom: Date;
}

export async function insertCovenant(
  tx: Transaction,
  covenant: { borrowerId: number; facilityId: number; terms: CovenantTerms } & Recorded,
): Promise<number> {
  const { insertId } = await execute(
    tx,
    'insert into covenants (borrower_id, facility_id, created_at) values (:borrowerId, :facilityId, :knownFrom)',
    { borrowerId: covenant.borrowerId, facilityId: covenant.facilityId, knownFrom: covenant.knownFrom },
  );
  await insertTerms(tx, insertId, covenant);
  return insertId;
}

async function insertTerms(
  tx: Transaction,
  covenantId: number,
  { terms, validFrom, knownFrom }: { terms: CovenantTerms } & Recorded,
): Promise<void> {
  const { definition, cureRights } = terms;
  await insertRows(tx, 'covenant_terms', [
    {
      covenant_id: covenantId,
      name: terms.name,
      clause: terms.clause,
      measure: terms.measure,
      operator: terms.operator,
      rounding_places: terms.roundingPlaces,
      scope: terms.scope,
      basis: terms.basis,
      is_ours: terms.isOurs,
      currency: terms.currency,
      first_test_on: terms.firstTestOn,
      every_months: terms.everyMonths,
      add_back_cap: definition.addBackCap?.toFixed() ?? null,
      add_back_cap_basis: definition.addBackCapBasis,
      impairment_added_back: definition.impairmentAddedBack,
      leases_in_debt: definition.leasesInDebt,
      accounting: definition.accounting,
      cash_netting_cap: definition.cashNettingCap?.toFixed() ?? null,
      undrawn_counts_as_liquidity: definition.undrawnCountsAsLiquidity,
      annualised_first_tests: definition.annualisedFirstTests,
      debt_rate: definition.debtRate,
      gearing: definition.gearing,
      deferred_tax_in_net_worth: definition.deferredTaxInNetWorth,
      shareholder_loans_in_net_worth: definition.shareholderLoansInNetWorth,
      opening_cash_in_debt_service: definition.openingCashInDebtService,
      dividends_in_fixed_charges: definition.dividendsInFixedCharges,
      valuation_max_age_months: definition.valuationMaxAgeMonths,
      capex_carried_share: definition.capexCarriedShare?.toFixed() ?? null,
      profit_share_in_net_worth: definition.profitShareInNetWorth?.toFixed() ?? null,
      springing_trigger: terms.springing?.trigger.toFixed() ?? null,
      cure_method: cureRights?.method ?? null,
      cure_business_days: cureRights?.withinBusinessDays ?? null,
      cures_in_four: cureRights?.mostInFour ?? null,
      cures_in_life: cureRights?.mostInLife ?? null,
      cured_by_next_test: cureRights?.curedByNextTest ?? false,
      valid_from: validFrom,
      known_from: knownFrom,
    },
  ]);
}

export async function insertCovenantLevels(
  tx: Transaction,
  covenantId: number,
  levels: readonly CovenantLevel[],
  knownFrom: Date,
): Promise<void> {
  await insertRows(
    tx,
    'covenant_levels',
    levels.map(({ from, until, level, isReset }) => ({
      covenant_id: covenantId,
      from_date: from,
      until_date: until,
      level: level?.toFixed() ?? null,
      is_reset: isReset,
      known_from: knownFrom,
    })),
  );
}

export interface RecordedAddBack extends Omit<AddBack, 'id' | 'approvedBy'> {
  readonly recordedBy: number;
  /** The second person; null while nobody has checked it. */
  readonly checkedBy: number | null;
  readonly knownFrom: Date;
}

export async function insertAddBacks(
  tx: Transaction,
  covenantId: number,
  addBacks: readonly RecordedAddBack[],
): Promise<void> {
  await insertRows(
    tx,
    'add_backs',
    addBacks.map((addBack) => ({
      covenant_id: covenantId,
      period_end: addBack.periodEnd,
      months: addBack.months,
      label: addBack.label,
      amount: addBack.amount.toFixed(),
      is_capped: addBack.capped,
      reason: addBack.reason,
      evidence: addBack.evidence,
      recorded_by: addBack.recordedBy,
      checked_by: addBack.checkedBy,
      known_from: addBack.knownFrom,
    })),
  );
}

export async function insertWaiver(
  tx: Transaction,
  waiver: Waiver & { readonly covenantId: number; readonly grantedBy: number; readonly knownFrom: Date },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into waivers (covenant_id, test_date, granted_on, until_date, conditions, granted_by, known_from)
     values (:covenantId, :testDate, :grantedOn, :until, :conditions, :grantedBy, :knownFrom)`,
    { ...waiver },
  );
  return insertId;
}

export async function insertEquityCure(
  tx: Transaction,
  cure: EquityCure & { readonly covenantId: number; readonly recordedBy: number; readonly knownFrom: Date },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into equity_cures (covenant_id, quarter_end, method, amount, received_on, recorded_by, known_from)
     values (:covenantId, :quarterEnd, :method, :amount, :receivedOn, :recordedBy, :knownFrom)`,
    { ...cure, amount: cure.amount.toFixed() },
  );
  return insertId;
}
