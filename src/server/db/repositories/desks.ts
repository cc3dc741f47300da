/** Desks, their heads and members. */
import type { Transaction } from 'sequelize';
import { execute } from '../sql.ts';

/** A desk comes with the counter that its alert lists watch. */
export async function insertDesk(
  tx: Transaction,
  desk: { name: string; headId: number | null },
): Promise<number> {
  const { insertId } = await execute(tx, 'insert into desks (name, head_id) values (:name, :headId)', desk);
  await execute(tx, 'insert into desk_changes (desk_id) values (:insertId)', { insertId });
  return insertId;
}

export async function setDeskHead(tx: Transaction, deskId: number, headId: number): Promise<void> {
  await execute(tx, 'update desks set head_id = :headId, version = version + 1 where id = :deskId', {
    deskId,
    headId,
  });
}

export async function addDeskMember(tx: Transaction, deskId: number, personId: number): Promise<void> {
  await execute(tx, 'insert ignore into desk_members (desk_id, person_id) values (:deskId, :personId)', {
    deskId,
    personId,
  });
}
