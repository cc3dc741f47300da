/** The borrowers table: filtered, sorted and paged in SQL, with what the current assessment says of each. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { inScope, type DeskScope } from '../deskScope.ts';
import { orderBy, pageOf, type ListOrder, type ListPage } from '../listOrder.ts';
import { select, selectOne } from '../sql.ts';

export interface BorrowerListRecord {
  readonly id: number;
  readonly name: string;
  readonly deskName: string;
  readonly sectorLabel: string;
  readonly currency: string;
  readonly limitTotal: string;
  readonly drawnTotal: string;
  readonly managerName: string;
  readonly assessmentId: number | null;
  readonly smallestCovenantId: number | null;
  /** At the tightest step agreed for later. */
  readonly aheadMayFall: string | null;
  readonly aheadFrom: PlainDate | null;
  readonly qualityHeadline: string | null;
  readonly qualityBand: string | null;
  readonly openAlerts: number;
  readonly urgentAlerts: number;
  readonly watchGrade: string | null;
  readonly latestFigures: PlainDate | null;
}

const COLUMNS = `b.id, b.name, d.name as deskName, s.label as sectorLabel, b.currency,
  coalesce((select sum(f.limit_amount) from facilities f where f.borrower_id = b.id and f.currency = b.currency), 0) as limitTotal,
  coalesce((select sum(f.drawn_amount) from facilities f where f.borrower_id = b.id and f.currency = b.currency), 0) as drawnTotal,
  manager.name as managerName, x.id as assessmentId, x.smallest_covenant_id as smallestCovenantId,
  x.ahead_may_fall as aheadMayFall, x.ahead_from as aheadFrom,
  x.quality_headline as qualityHeadline, x.quality_band as qualityBand,
  (select count(*) from alerts o where o.borrower_id = b.id and o.open_slot is not null) as openAlerts,
  (select count(*) from alerts u where u.borrower_id = b.id and u.open_slot is not null and u.severity = 'urgent') as urgentAlerts,
  w.grade as watchGrade,
  (select max(t.period_end) from statements t where t.borrower_id = b.id and t.known_to is null and t.basis <> 'forecast') as latestFigures`;

const TABLES = `borrowers b
  join desks d on d.id = b.desk_id
  join sectors s on s.code = b.sector_code
  join people manager on manager.id = b.relationship_manager_id
  left join current_assessments c on c.borrower_id = b.id
  left join assessments x on x.id = c.assessment_id
  left join watchlist_entries w on w.borrower_id = b.id and w.open_slot is not null`;

/** Sort keys that a request may name, and nothing else. */
const SORTS = {
  name: ['b.name'],
  'may-fall': ['x.smallest_may_fall'],
  quality: ['x.quality_headline'],
  drawn: ['drawnTotal'],
  alerts: ['urgentAlerts', 'openAlerts'],
} as const satisfies Record<string, readonly string[]>;
type BorrowerSort = keyof typeof SORTS;

export interface BorrowerFilter {
  readonly search: string | null;
  readonly sector: string | null;
  readonly deskId: number | null;
}

export async function listBorrowers(
  tx: Transaction,
  scope: DeskScope,
  filter: BorrowerFilter,
  order: ListOrder<BorrowerSort> & ListPage,
): Promise<{ rows: BorrowerListRecord[]; total: number }> {
  const desks = inScope(scope);
  const where = `${desks.sql} and (:pattern is null or b.name like :pattern escape '!')
    and (:sector is null or b.sector_code = :sector) and (:deskId is null or b.desk_id = :deskId)`;
  const pattern = filter.search === null ? null : `%${filter.search.replaceAll(/[!%_]/g, '!$&')}%`;
  const values = { ...desks.values, sector: filter.sector, deskId: filter.deskId, pattern };
  const rows = await select<BorrowerListRecord>(
    tx,
    `select ${COLUMNS} from ${TABLES} where ${where} ${orderBy(SORTS, order, 'b.id')} ${pageOf(order)}`,
    values,
  );
  const count = await selectOne<{ total: number }>(
    tx,
    `select count(*) as total from borrowers b where ${where}`,
    values,
  );
  return { rows, total: count?.total ?? 0 };
}

export const listDeskMembers = (tx: Transaction, deskId: number): Promise<{ id: number; name: string }[]> =>
  select(
    tx,
    `select p.id, p.name from desk_members m join people p on p.id = m.person_id and p.is_active = 1
     where m.desk_id = :deskId order by p.name, p.id`,
    { deskId },
  );

/** Every borrower of the scope by name, for a choice. */
export async function listBorrowerNames(
  tx: Transaction,
  scope: DeskScope,
): Promise<{ id: number; name: string }[]> {
  const desks = inScope(scope);
  return select(
    tx,
    `select b.id, b.name from borrowers b where ${desks.sql} order by b.name, b.id`,
    desks.values,
  );
}
