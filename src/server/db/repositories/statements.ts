/** Statement versions and the cells their amounts came from. Nothing here changes or removes a version. */
import type { Transaction } from 'sequelize';
import { daysBetween, type PlainDate } from '../../../core/calendar/plainDate.ts';
import { LINE_ITEM_CODES } from '../../../core/statements/lineItems.ts';
import type { StatementBasis, StatementScope } from '../../../core/statements/statement.ts';
import type { StagedStatement } from '../../../core/statements/statementsFromReading.ts';
import { insertRows } from '../insertRows.ts';
import { select, type SqlValue } from '../sql.ts';

/** The figures of one period with the day the lender received them. */
export interface DeliveredStatement extends StagedStatement {
  readonly receivedOn: PlainDate;
}

/** What the versions of one import share. */
export interface StatementOrigin {
  readonly borrowerId: number;
  readonly importId: number | null;
  readonly basis: StatementBasis;
  readonly scope: StatementScope;
  readonly framework: string;
  /** The instant of acceptance. */
  readonly knownFrom: Date;
}

/**
 * Stores the figures as the next version of each period, basis and scope; earlier versions stay as they are. The
 * caller holds the borrower (holdBorrower), so that two imports do not count the same version. Each period at most
 * once in a call. Answers the ids in the order of the statements.
 */
export async function insertStatementVersions(
  tx: Transaction,
  origin: StatementOrigin,
  statements: readonly DeliveredStatement[],
): Promise<number[]> {
  const before = await latestVersions(tx, origin);
  await insertRows(
    tx,
    'statements',
    statements.map((statement) =>
      statementRow(origin, statement, (before.get(periodKey(statement))?.version ?? 0) + 1),
    ),
  );
  const after = await latestVersions(tx, origin);
  const ids = statements.map((statement) => {
    const stored = after.get(periodKey(statement));
    if (!stored) throw new Error(`no version was stored for ${periodKey(statement)}`);
    return stored.id;
  });
  await insertRows(
    tx,
    'statement_cells',
    statements.flatMap((statement, index) => cellRows(ids[index] ?? 0, statement)),
  );
  return ids;
}

interface LatestVersion {
  readonly id: number;
  readonly periodEnd: PlainDate;
  readonly months: number;
  readonly version: number;
}

const periodKey = ({ periodEnd, months }: Pick<LatestVersion, 'periodEnd' | 'months'>): string =>
  `${periodEnd}, ${months} months`;

/** Ids are read back by their key: a cluster does not number the rows of one insert in unbroken order. */
async function latestVersions(
  tx: Transaction,
  { borrowerId, basis, scope }: StatementOrigin,
): Promise<ReadonlyMap<string, LatestVersion>> {
  const rows = await select<LatestVersion>(
    tx,
    `select id, period_end as periodEnd, months, statement_version as version
     from statements where borrower_id = :borrowerId and basis = :basis and scope = :scope
     order by period_end, months, statement_version`,
    { borrowerId, basis, scope },
  );
  return new Map(rows.map((row) => [periodKey(row), row]));
}

/** A column a line item; a line that the sheet does not give is null, never 0. */
function statementRow(
  origin: StatementOrigin,
  statement: DeliveredStatement,
  version: number,
): Record<string, SqlValue> {
  return {
    borrower_id: origin.borrowerId,
    import_id: origin.importId,
    period_start: statement.periodStart,
    period_end: statement.periodEnd,
    months: statement.months,
    days: statement.months === 0 ? 0 : daysBetween(statement.periodStart, statement.periodEnd) + 1,
    basis: origin.basis,
    scope: origin.scope,
    framework: origin.framework,
    currency: statement.currency,
    rounding_unit: statement.roundingUnit.toFixed(),
    tie: statement.tie,
    statement_version: version,
    received_on: statement.receivedOn,
    known_from: origin.knownFrom,
    ...Object.fromEntries(LINE_ITEM_CODES.map((code) => [code, statement.amounts[code]?.toFixed() ?? null])),
  };
}

/** Several cells of one line are its parts, counted from 1. */
function cellRows(statementId: number, { cells }: DeliveredStatement): Record<string, SqlValue>[] {
  const parts = new Map<string, number>();
  return cells.map(({ line, sheet, cell, rawText, label, fromFormula }) => {
    const partNo = (parts.get(line) ?? 0) + 1;
    parts.set(line, partNo);
    return {
      statement_id: statementId,
      line,
      part_no: partNo,
      sheet,
      cell,
      raw_text: rawText,
      label,
      from_formula: fromFormula,
    };
  });
}
