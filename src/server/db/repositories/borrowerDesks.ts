/** Whose borrower it is: the little that every permission asks for. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { inScope, type DeskScope } from '../deskScope.ts';
import { select, selectOne } from '../sql.ts';

export interface BorrowerDesk {
  readonly id: number;
  readonly name: string;
  readonly deskId: number;
  readonly deskName: string;
}

/** Null for a borrower that is not there, or not within the scope: the caller cannot tell which. */
export async function findBorrowerDesk(
  tx: Transaction,
  id: number,
  scope: DeskScope,
): Promise<BorrowerDesk | null> {
  const desks = inScope(scope);
  return selectOne<BorrowerDesk>(
    tx,
    `select b.id, b.name, b.desk_id as deskId, d.name as deskName
     from borrowers b join desks d on d.id = b.desk_id
     where b.id = :id and ${desks.sql}`,
    { id, ...desks.values },
  );
}

export async function isDeskMember(tx: Transaction, deskId: number, personId: number): Promise<boolean> {
  const row = await selectOne<{ personId: number }>(
    tx,
    `select m.person_id as personId from desk_members m join people p on p.id = m.person_id and p.is_active = 1
     where m.desk_id = :deskId and m.person_id = :personId`,
    { deskId, personId },
  );
  return row !== null;
}

/** Whose alerts the person works on that day: the own ones, and those of everybody the person deputises. */
export async function actsFor(tx: Transaction, personId: number, on: PlainDate): Promise<readonly number[]> {
  const rows = await select<{ ownerId: number }>(
    tx,
    `select person_id as ownerId from deputies
     where deputy_id = :personId and from_date <= :on and until_date >= :on order by person_id`,
    { personId, on },
  );
  return [personId, ...rows.map(({ ownerId }) => ownerId)];
}
