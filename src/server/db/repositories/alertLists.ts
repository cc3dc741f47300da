/** The alerts table: filtered, sorted and paged in SQL. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { inScope, type DeskScope } from '../deskScope.ts';
import { orderBy, pageOf, type ListOrder, type ListPage } from '../listOrder.ts';
import { select, selectOne, type SqlValues } from '../sql.ts';

export interface AlertListRecord {
  readonly id: number;
  readonly version: number;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskId: number;
  readonly deskName: string;
  readonly deskHeadId: number | null;
  readonly sectorLabel: string;
  readonly kind: string;
  readonly severity: string;
  readonly state: string;
  readonly sentence: string;
  readonly wouldChange: string;
  readonly evidence: string;
  readonly factDate: PlainDate;
  readonly covenantId: number | null;
  /** The alert's covenant, or the one with the smallest headroom where it has none. */
  readonly stripCovenantId: number | null;
  readonly assessmentId: number | null;
  readonly qualityHeadline: string | null;
  readonly qualityBand: string | null;
  readonly ownerId: number;
  readonly ownerName: string;
  readonly takenBy: string | null;
  readonly dueOn: PlainDate;
  readonly counter: number;
  readonly raisedAt: Date;
  readonly changedAt: Date;
  readonly conditionGoneAt: Date | null;
  readonly putOffUntil: PlainDate | null;
  readonly putOffCount: number;
  readonly closedById: number | null;
  readonly closedBy: string | null;
  readonly closingReason: number | null;
  readonly closingText: string | null;
}

export interface AlertFilter {
  readonly ownerIds: readonly number[] | null;
  readonly notTaken: boolean;
  readonly kind: string | null;
  readonly severity: string | null;
  readonly sector: string | null;
  /** Share as decimal text: '0.10'. */
  readonly mayFallBelow: string | null;
  readonly dueBy: PlainDate | null;
  /** 'open' is every state that is neither closed nor superseded. */
  readonly state: string;
  readonly borrowerId: number | null;
}

const COLUMNS = `a.id, a.version, a.borrower_id as borrowerId, b.name as borrowerName, b.desk_id as deskId, d.name as deskName,
  d.head_id as deskHeadId, s.label as sectorLabel, a.kind, a.severity, a.state, a.sentence, a.would_change as wouldChange,
  a.evidence, a.fact_date as factDate, a.covenant_id as covenantId,
  coalesce(a.covenant_id, x.smallest_covenant_id) as stripCovenantId, x.id as assessmentId,
  x.quality_headline as qualityHeadline, x.quality_band as qualityBand, a.owner_id as ownerId, owner.name as ownerName,
  taker.name as takenBy, a.due_on as dueOn, a.counter, a.raised_at as raisedAt, a.changed_at as changedAt,
  a.condition_gone_at as conditionGoneAt, a.put_off_until as putOffUntil, a.put_off_count as putOffCount, a.closed_by as closedById, closer.name as closedBy,
  a.closing_reason as closingReason, a.closing_text as closingText`;

const TABLES = `alerts a
  join borrowers b on b.id = a.borrower_id
  join desks d on d.id = b.desk_id
  join sectors s on s.code = b.sector_code
  join people owner on owner.id = a.owner_id
  left join people taker on taker.id = a.taken_by
  left join people closer on closer.id = a.closed_by
  left join current_assessments c on c.borrower_id = b.id
  left join assessments x on x.id = c.assessment_id`;

/** Sort keys that a request may name, and nothing else. */
const SORTS = {
  due: ['a.due_on', `field(a.severity, 'urgent', 'soon', 'note')`],
  severity: [`field(a.severity, 'urgent', 'soon', 'note')`, 'a.due_on'],
  borrower: ['b.name'],
  'may-fall': ['x.smallest_may_fall'],
  quality: ['x.quality_headline'],
  raised: ['a.raised_at'],
} as const satisfies Record<string, readonly string[]>;
type AlertSort = keyof typeof SORTS;

function conditions(scope: DeskScope, filter: AlertFilter): { sql: string; values: SqlValues } {
  const desks = inScope(scope);
  const parts = [desks.sql];
  if (filter.state === 'open') parts.push(`a.state not in ('closed', 'superseded')`);
  else parts.push('a.state = :state');
  if (filter.ownerIds !== null) parts.push('a.owner_id in (:ownerIds)');
  if (filter.notTaken) parts.push(`a.state = 'raised'`);
  if (filter.kind !== null) parts.push('a.kind = :kind');
  if (filter.severity !== null) parts.push('a.severity = :severity');
  if (filter.sector !== null) parts.push('b.sector_code = :sector');
  if (filter.mayFallBelow !== null) parts.push('x.smallest_may_fall < :mayFallBelow');
  if (filter.dueBy !== null) parts.push('a.due_on <= :dueBy');
  if (filter.borrowerId !== null) parts.push('a.borrower_id = :borrowerId');
  return { sql: parts.join(' and '), values: { ...desks.values, ...filter } };
}

export async function listAlerts(
  tx: Transaction,
  scope: DeskScope,
  filter: AlertFilter,
  order: ListOrder<AlertSort> & ListPage,
): Promise<{ rows: AlertListRecord[]; total: number }> {
  const where = conditions(scope, filter);
  const rows = await select<AlertListRecord>(
    tx,
    `select ${COLUMNS} from ${TABLES} where ${where.sql} ${orderBy(SORTS, order, 'a.id')} ${pageOf(order)}`,
    where.values,
  );
  const count = await selectOne<{ total: number }>(
    tx,
    `select count(*) as total from ${TABLES} where ${where.sql}`,
    where.values,
  );
  return { rows, total: count?.total ?? 0 };
}

export async function findAlert(
  tx: Transaction,
  id: number,
  scope: DeskScope,
): Promise<AlertListRecord | null> {
  const desks = inScope(scope);
  return selectOne<AlertListRecord>(
    tx,
    `select ${COLUMNS} from ${TABLES} where a.id = :id and ${desks.sql}`,
    { id, ...desks.values },
  );
}

export interface AlertEventRecord {
  readonly at: Date;
  readonly who: string | null;
  readonly what: string;
  readonly text: string;
}

/** Newest first. */
export async function listAlertEvents(tx: Transaction, alertId: number): Promise<AlertEventRecord[]> {
  return select<AlertEventRecord>(
    tx,
    `select e.at, p.name as who, e.what, e.text from alert_events e left join people p on p.id = e.person_id
     where e.alert_id = :alertId order by e.id desc limit 200`,
    { alertId },
  );
}

export interface StripRecord {
  readonly assessmentId: number;
  readonly covenantId: number;
  readonly covenantName: string;
  readonly testDate: PlainDate;
  readonly outcome: string;
  readonly mayFall: string | null;
  readonly level: string | null;
  readonly justPassing: number;
  /** Null: that of version 1 of the policy. */
  readonly band: string | null;
}

/** The tests behind the strips of many rows in one query, oldest first. */
export async function listStrips(
  tx: Transaction,
  wanted: readonly { readonly assessmentId: number; readonly covenantId: number }[],
): Promise<StripRecord[]> {
  if (wanted.length === 0) return [];
  return select<StripRecord>(
    tx,
    `select t.assessment_id as assessmentId, t.covenant_id as covenantId, concat(n.name, if(n.is_ours = 1, ', ours, not in the agreement', '')) as covenantName, t.test_date as testDate,
       t.outcome, t.may_fall as mayFall, t.level, t.is_just_passing as justPassing, json_value(p.content, '$.justPassingBand') as band
     from test_results t
     join assessments a on a.id = t.assessment_id
     left join policies p on p.version = a.policy_version
     join covenant_terms n on n.covenant_id = t.covenant_id and n.known_to is null and n.valid_to is null
     where t.assessment_id in (:assessments) and t.covenant_id in (:covenants)
     order by t.covenant_id, t.test_date`,
    {
      assessments: [...new Set(wanted.map((one) => one.assessmentId))],
      covenants: [...new Set(wanted.map((one) => one.covenantId))],
    },
  );
}

/** Open alerts on the desks of the scope. */
export async function countOpenAlerts(tx: Transaction, scope: DeskScope): Promise<number> {
  const desks = inScope(scope);
  const row = await selectOne<{ open: number }>(
    tx,
    `select count(*) as open from alerts a join borrowers b on b.id = a.borrower_id where a.open_slot is not null and ${desks.sql}`,
    desks.values,
  );
  return row?.open ?? 0;
}

/** How many of them were raised since then. */
export async function countRaisedSince(tx: Transaction, scope: DeskScope, since: Date): Promise<number> {
  const desks = inScope(scope);
  const row = await selectOne<{ fresh: number }>(
    tx,
    `select count(*) as fresh from alerts a join borrowers b on b.id = a.borrower_id
     where a.open_slot is not null and a.raised_at >= :since and ${desks.sql}`,
    { since, ...desks.values },
  );
  return row?.fresh ?? 0;
}
