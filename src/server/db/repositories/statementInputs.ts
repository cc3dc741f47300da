import type { Transaction } from 'sequelize';
import { decimal, type Decimal } from '../../../core/money/decimal.ts';
import { LINE_ITEM_CODES, type LineItemCode } from '../../../core/statements/lineItems.ts';
import type { Statement } from '../../../core/statements/statement.ts';
import { groupRows } from '../groupRows.ts';
import { select, selectOne } from '../sql.ts';

type HeadRow = Omit<Statement, 'roundingUnit' | 'amounts'> & { borrowerId: number; roundingUnit: string };
type LineRow = Readonly<Record<LineItemCode, string | null>>;

/** Column names come from the fixed list of line items, never from a request. */
const LINE_COLUMNS = LINE_ITEM_CODES.join(', ');

/**
 * Every version that was known by then, superseded ones too: the core picks what is in force and needs the
 * earlier ones to see what was restated.
 */
export async function loadStatements(
  tx: Transaction,
  borrowerIds: readonly number[],
  knownAt: Date,
): Promise<ReadonlyMap<number, Statement[]>> {
  const rows = await select<HeadRow & LineRow>(
    tx,
    `select id, borrower_id as borrowerId, period_start as periodStart, period_end as periodEnd, months, basis, scope,
       framework, currency, rounding_unit as roundingUnit, tie, statement_version as version,
       received_on as receivedOn, import_id as importId, ${LINE_COLUMNS}
     from statements
     where borrower_id in (:borrowerIds) and known_from <= :knownAt and (known_to is null or known_to > :knownAt)
     order by borrower_id, period_end, months, scope, statement_version, id`,
    { borrowerIds, knownAt },
  );
  return groupRows(rows, (row) => row.borrowerId, toStatement);
}

/** When figures of the borrower last came or were taken back, as known by then; null before the first. */
export async function figuresChangedAt(
  tx: Transaction,
  borrowerId: number,
  knownAt: Date,
): Promise<Date | null> {
  const row = await selectOne<{ latest: Date | null }>(
    tx,
    `select max(if(known_to <= :knownAt, known_to, known_from)) as latest
     from statements where borrower_id = :borrowerId and known_from <= :knownAt`,
    { borrowerId, knownAt },
  );
  return row?.latest ?? null;
}

function toStatement(row: HeadRow & LineRow): Statement {
  const amounts: Partial<Record<LineItemCode, Decimal>> = {};
  for (const code of LINE_ITEM_CODES) {
    const amount = row[code];
    if (amount !== null) amounts[code] = decimal(amount);
  }
  return {
    id: row.id,
    periodStart: row.periodStart,
    periodEnd: row.periodEnd,
    months: row.months,
    basis: row.basis,
    scope: row.scope,
    framework: row.framework,
    currency: row.currency,
    roundingUnit: decimal(row.roundingUnit),
    amounts,
    tie: row.tie,
    version: row.version,
    receivedOn: row.receivedOn,
    importId: row.importId,
  };
}
