/** What a review sheet shows beside the result itself. The caller has checked the desk. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { select } from '../sql.ts';

export interface SignalRecord {
  readonly kind: string;
  readonly severity: string;
  readonly state: string;
  readonly isOpen: number;
  readonly sentence: string;
  readonly factDate: PlainDate;
  readonly raisedAt: Date;
  readonly dueOn: PlainDate;
  readonly ownerName: string;
  readonly closedAt: Date | null;
  /** Null where it closed by itself. */
  readonly closedBy: string | null;
  readonly closingReason: number | null;
  readonly closingText: string | null;
}

/** Open ones first, gravest first; then what was closed, newest first. */
export async function listSignals(
  tx: Transaction,
  borrowerId: number,
  most: number,
): Promise<SignalRecord[]> {
  return select<SignalRecord>(
    tx,
    `select a.kind, a.severity, a.state, a.open_slot is not null as isOpen, a.sentence, a.fact_date as factDate,
       a.raised_at as raisedAt, a.due_on as dueOn, owner.name as ownerName, a.closed_at as closedAt,
       closer.name as closedBy, a.closing_reason as closingReason, a.closing_text as closingText
     from alerts a
       join people owner on owner.id = a.owner_id
       left join people closer on closer.id = a.closed_by
     where a.borrower_id = :borrowerId
     order by a.open_slot is null, if(a.open_slot is null, 0, field(a.severity, 'urgent', 'soon', 'note')),
       a.closed_at desc, a.due_on, a.id
     limit ${Math.trunc(most)}`,
    { borrowerId },
  );
}

export interface FigureSourceRecord {
  readonly statementId: number;
  readonly line: string;
  readonly basis: string;
  readonly version: number;
  readonly currency: string;
  readonly receivedOn: PlainDate;
  readonly fileName: string | null;
  readonly sha256: string | null;
  /** Null where the amount came with no file. */
  readonly sheet: string | null;
  readonly cell: string | null;
  readonly rawText: string | null;
}

/** The statements of one borrower with the cells of some of their lines, in the order in which they were added up. */
export async function listFigureSources(
  tx: Transaction,
  borrowerId: number,
  wanted: readonly { readonly statementId: number; readonly line: string }[],
): Promise<FigureSourceRecord[]> {
  return select<FigureSourceRecord>(
    tx,
    `select t.id as statementId, coalesce(c.line, '') as line, t.basis, t.statement_version as version, t.currency,
       t.received_on as receivedOn, i.file_name as fileName, i.file_sha256 as sha256, c.sheet, c.cell,
       c.raw_text as rawText
     from statements t
       left join imports i on i.id = t.import_id
       left join statement_cells c on c.statement_id = t.id and c.line in (:lines)
     where t.borrower_id = :borrowerId and t.id in (:statementIds)
     order by t.id, c.line, c.part_no`,
    {
      borrowerId,
      statementIds: [...new Set(wanted.map(({ statementId }) => statementId))],
      lines: [...new Set(wanted.map(({ line }) => line))],
    },
  );
}
