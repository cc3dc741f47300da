/** Covenants as they are recorded: the terms by validity and knowledge, the level schedule, add-backs and waivers. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import type { AddBack, Covenant, CovenantLevel, Waiver } from '../../../core/covenants/covenant.ts';
import { insertRows } from '../insertRows.ts';
import { execute } from '../sql.ts';

export type CovenantTerms = Omit<Covenant, 'id' | 'facilityId' | 'levels' | 'addBacks' | 'waivers'>;

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
  const { definition } = terms;
  await execute(
    tx,
    `insert into covenant_terms (covenant_id, name, clause, measure, operator, rounding_places, scope, currency,
       first_test_on, every_months, add_back_cap, add_back_cap_basis, leases_in_debt, cash_netting_cap,
       undrawn_counts_as_liquidity, valid_from, known_from)
     values (:covenantId, :name, :clause, :measure, :operator, :roundingPlaces, :scope, :currency,
       :firstTestOn, :everyMonths, :addBackCap, :addBackCapBasis, :leasesInDebt, :cashNettingCap,
       :undrawnCounts, :validFrom, :knownFrom)`,
    {
      covenantId,
      name: terms.name,
      clause: terms.clause,
      measure: terms.measure,
      operator: terms.operator,
      roundingPlaces: terms.roundingPlaces,
      scope: terms.scope,
      currency: terms.currency,
      firstTestOn: terms.firstTestOn,
      everyMonths: terms.everyMonths,
      addBackCap: definition.addBackCap?.toFixed() ?? null,
      addBackCapBasis: definition.addBackCapBasis,
      leasesInDebt: definition.leasesInDebt,
      cashNettingCap: definition.cashNettingCap?.toFixed() ?? null,
      undrawnCounts: definition.undrawnCountsAsLiquidity,
      validFrom,
      knownFrom,
    },
  );
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
    levels.map(({ from, until, level }) => ({
      covenant_id: covenantId,
      from_date: from,
      until_date: until,
      level: level?.toFixed() ?? null,
      known_from: knownFrom,
    })),
  );
}

export interface RecordedAddBack extends Omit<AddBack, 'id'> {
  readonly evidence: string;
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
