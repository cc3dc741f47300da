import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { LINE_ITEM_CODES, type LineItemCode } from '../../../core/statements/lineItems.ts';
import { inScope, type DeskScope } from '../deskScope.ts';
import { select } from '../sql.ts';

type LineColumns = Readonly<Record<LineItemCode, string | null>>;

export interface StatementListRecord {
  readonly id: number;
  readonly periodStart: PlainDate;
  readonly periodEnd: PlainDate;
  readonly months: number;
  readonly basis: string;
  readonly scope: string;
  readonly currency: string;
  readonly tie: string;
  readonly version: number;
  readonly latestVersion: number;
  readonly receivedOn: PlainDate;
  readonly importId: number | null;
  readonly fileName: string | null;
}

/** Every version that stands, newest period first. Column names come from the fixed list of line items. */
export async function listStatements(
  tx: Transaction,
  borrowerId: number,
  most: number,
): Promise<(StatementListRecord & LineColumns)[]> {
  return select<StatementListRecord & LineColumns>(
    tx,
    `select t.id, t.period_start as periodStart, t.period_end as periodEnd, t.months, t.basis, t.scope, t.currency, t.tie,
       t.statement_version as version,
       max(t.statement_version) over (partition by t.period_end, t.months, t.basis, t.scope) as latestVersion,
       t.received_on as receivedOn, t.import_id as importId, i.file_name as fileName,
       ${LINE_ITEM_CODES.map((code) => `t.${code}`).join(', ')}
     from statements t left join imports i on i.id = t.import_id
     where t.borrower_id = :borrowerId and t.known_to is null
     order by t.period_end desc, t.months desc, t.statement_version desc, t.id desc limit ${Math.trunc(most)}`,
    { borrowerId },
  );
}

export interface SourceCellRecord {
  readonly importId: number | null;
  readonly fileName: string | null;
  readonly sha256: string | null;
  readonly sheet: string;
  readonly cell: string;
  readonly rawText: string;
  readonly label: string;
  readonly fromFormula: number;
}

/** The cells that one amount was added up from, for a borrower within the scope. */
export async function listSourceCells(
  tx: Transaction,
  source: { statementId: number; line: string },
  scope: DeskScope,
): Promise<SourceCellRecord[]> {
  const desks = inScope(scope);
  return select<SourceCellRecord>(
    tx,
    `select t.import_id as importId, i.file_name as fileName, i.file_sha256 as sha256, c.sheet, c.cell, c.raw_text as rawText,
       c.label, c.from_formula as fromFormula
     from statement_cells c
     join statements t on t.id = c.statement_id
     join borrowers b on b.id = t.borrower_id
     left join imports i on i.id = t.import_id
     where c.statement_id = :statementId and c.line = :line and ${desks.sql} order by c.part_no`,
    { ...source, ...desks.values },
  );
}
