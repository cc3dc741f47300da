/** The lender: one row. */
import type { Transaction } from 'sequelize';
import { execute, selectOne } from '../sql.ts';

export interface Lender {
  readonly name: string;
  /** IANA time zone by which the business date is told. */
  readonly zone: string;
  /** 'HH:MM' in UTC at which the nightly run starts. */
  readonly nightAtUtc: string;
  readonly headOfCreditId: number | null;
  readonly legalContactId: number | null;
  /** The day the demo desk was laid out; null for a lender of one's own. */
  readonly seededOn: string | null;
  readonly version: number;
}

export async function findLender(tx: Transaction): Promise<Lender | null> {
  const row = await selectOne<{
    name: string;
    zone: string;
    night_at_utc: string;
    head_of_credit_id: number | null;
    legal_contact_id: number | null;
    seeded_on: string | null;
    version: number;
  }>(
    tx,
    `select name, zone, night_at_utc, head_of_credit_id, legal_contact_id, seeded_on, version
     from lenders where id = 1`,
  );
  return (
    row && {
      name: row.name,
      zone: row.zone,
      nightAtUtc: row.night_at_utc,
      headOfCreditId: row.head_of_credit_id,
      legalContactId: row.legal_contact_id,
      seededOn: row.seeded_on,
      version: row.version,
    }
  );
}

/** Fails on the second: there is one lender. */
export async function insertLender(
  tx: Transaction,
  lender: { name: string; zone: string; nightAtUtc: string; seededOn: string | null },
): Promise<void> {
  await execute(
    tx,
    `insert into lenders (id, name, zone, night_at_utc, seeded_on)
     values (1, :name, :zone, :nightAtUtc, :seededOn)`,
    lender,
  );
}

export async function setLenderContacts(
  tx: Transaction,
  contacts: { headOfCreditId: number | null; legalContactId: number | null },
): Promise<void> {
  await execute(
    tx,
    `update lenders set head_of_credit_id = :headOfCreditId, legal_contact_id = :legalContactId,
       version = version + 1 where id = 1`,
    contacts,
  );
}
