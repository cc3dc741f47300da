import type { Transaction } from 'sequelize';
import { execute, select } from '../sql.ts';

/** A sector by its code, with the scheme and revision that the code belongs to. */
export interface Sector {
  readonly code: string;
  readonly scheme: string;
  readonly label: string;
}

export async function listSectors(tx: Transaction): Promise<Sector[]> {
  return select<Sector>(tx, 'select code, scheme, label from sectors order by code');
}

/** A code that is there keeps its scheme and label. */
export async function insertSector(tx: Transaction, sector: Sector): Promise<void> {
  await execute(tx, 'insert ignore into sectors (code, scheme, label) values (:code, :scheme, :label)', {
    ...sector,
  });
}
