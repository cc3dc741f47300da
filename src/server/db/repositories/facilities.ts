import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { decimal, type Decimal } from '../../../core/money/decimal.ts';
import { execute, select } from '../sql.ts';

export interface Facility {
  readonly name: string;
  readonly kind: string;
  readonly currency: string;
  /** Whole currency units. */
  readonly limit: Decimal;
  readonly drawn: Decimal;
  readonly marginBps: number | null;
  readonly startsOn: PlainDate;
  readonly maturesOn: PlainDate;
  readonly security: string;
}

export async function insertFacility(
  tx: Transaction,
  facility: Facility & { readonly borrowerId: number },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into facilities (borrower_id, name, kind, currency, limit_amount, drawn_amount, margin_bps, starts_on,
       matures_on, security)
     values (:borrowerId, :name, :kind, :currency, :limit, :drawn, :marginBps, :startsOn, :maturesOn, :security)`,
    { ...facility, limit: facility.limit.toFixed(), drawn: facility.drawn.toFixed() },
  );
  return insertId;
}

interface FacilityRow extends Omit<Facility, 'limit' | 'drawn'> {
  readonly id: number;
  readonly limit: string;
  readonly drawn: string;
}

/** Of a borrower that the caller may see, largest limit first. */
export async function listFacilities(
  tx: Transaction,
  borrowerId: number,
): Promise<(Facility & { readonly id: number })[]> {
  const rows = await select<FacilityRow>(
    tx,
    `select id, name, kind, currency, limit_amount as \`limit\`, drawn_amount as drawn, margin_bps as marginBps,
       starts_on as startsOn, matures_on as maturesOn, security
     from facilities where borrower_id = :borrowerId order by limit_amount desc, id`,
    { borrowerId },
  );
  return rows.map((row) => ({ ...row, limit: decimal(row.limit), drawn: decimal(row.drawn) }));
}
