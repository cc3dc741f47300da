/** Whose borrower it is: the little that every permission asks for. */
import type { Transaction } from 'sequelize';
import { inScope, type DeskScope } from '../deskScope.ts';
import { selectOne } from '../sql.ts';

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
  scope: DeskScope = 'all',
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

/** True for the owner and for whoever deputises the owner on that day. */
export async function actsFor(
  tx: Transaction,
  person: { personId: number; ownerId: number; on: string },
): Promise<boolean> {
  if (person.personId === person.ownerId) return true;
  const row = await selectOne<{ id: number }>(
    tx,
    `select id from deputies
     where person_id = :ownerId and deputy_id = :personId and from_date <= :on and until_date >= :on limit 1`,
    person,
  );
  return row !== null;
}
