/** People, their roles and desks. An address of mail is stored and looked up in lower case. */
import type { Transaction } from 'sequelize';
import { execute, select, selectOne } from '../sql.ts';

/** Who a person is, as text from the table; src/server/auth turns roles into its own type. */
export interface PersonRecord {
  readonly id: number;
  readonly name: string;
  readonly email: string;
  readonly isActive: boolean;
  readonly roles: readonly string[];
  readonly deskIds: readonly number[];
  /** In the order of the names, not of the ids. */
  readonly deskNames: readonly string[];
}

/** What checking a password needs, and nothing else. */
export interface SignInRecord {
  readonly id: number;
  readonly name: string;
  readonly email: string;
  /** null: nobody can sign in with a password as this person. */
  readonly passwordHash: string | null;
  readonly isActive: boolean;
}

export const mailKey = (address: string): string => address.trim().toLowerCase();

/** Roles and desks of the person aliased `p`, as comma-separated text. */
export const ROLES_AND_DESKS = `
  (select group_concat(r.role order by r.role) from person_roles r where r.person_id = p.id) as roles,
  (select group_concat(m.desk_id order by m.desk_id) from desk_members m where m.person_id = p.id) as desk_ids,
  (select group_concat(d.name order by d.name separator '\\n')
   from desk_members m join desks d on d.id = m.desk_id where m.person_id = p.id) as desk_names`;

interface RolesAndDesks {
  readonly roles: string | null;
  readonly desk_ids: string | null;
  readonly desk_names: string | null;
}

export interface PersonRow extends RolesAndDesks {
  readonly id: number;
  readonly name: string;
  readonly email: string;
  readonly is_active: number;
}

export async function findPerson(tx: Transaction, id: number): Promise<PersonRecord | null> {
  const row = await selectOne<PersonRow>(
    tx,
    `select p.id, p.name, p.email, p.is_active, ${ROLES_AND_DESKS} from people p where p.id = :id`,
    { id },
  );
  return row && toPersonRecord(row);
}

/** Active people in the order of their names. */
export async function listActivePeople(tx: Transaction): Promise<PersonRecord[]> {
  const rows = await select<PersonRow>(
    tx,
    `select p.id, p.name, p.email, p.is_active, ${ROLES_AND_DESKS}
     from people p where p.is_active = 1 order by p.name, p.id`,
  );
  return rows.map(toPersonRecord);
}

export async function findSignIn(tx: Transaction, email: string): Promise<SignInRecord | null> {
  return toSignIn(
    await selectOne<SignInRow>(
      tx,
      'select id, name, email, password_hash, is_active from people where email = :email',
      { email: mailKey(email) },
    ),
  );
}

export async function findSignInById(tx: Transaction, id: number): Promise<SignInRecord | null> {
  return toSignIn(
    await selectOne<SignInRow>(
      tx,
      'select id, name, email, password_hash, is_active from people where id = :id',
      { id },
    ),
  );
}

export async function anybodyExists(tx: Transaction): Promise<boolean> {
  return (await selectOne(tx, 'select id from people limit 1')) !== null;
}

export async function insertPerson(
  tx: Transaction,
  person: { name: string; email: string; passwordHash: string | null; roles: readonly string[]; now: Date },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into people (email, name, password_hash, created_at) values (:email, :name, :passwordHash, :now)`,
    {
      email: mailKey(person.email),
      name: person.name,
      passwordHash: person.passwordHash,
      now: person.now,
    },
  );
  for (const role of person.roles)
    await execute(tx, 'insert into person_roles (person_id, role) values (:id, :role)', {
      id: insertId,
      role,
    });
  return insertId;
}

export async function setPasswordHash(tx: Transaction, id: number, passwordHash: string): Promise<void> {
  await execute(tx, 'update people set password_hash = :passwordHash, version = version + 1 where id = :id', {
    id,
    passwordHash,
  });
}

/** The hash of the token in a person's unsubscribe links; the same token for every mail. */
export async function storeUnsubscribeHash(tx: Transaction, id: number, tokenHash: string): Promise<void> {
  await execute(
    tx,
    `update people set unsubscribe_token_hash = :tokenHash
     where id = :id and (unsubscribe_token_hash is null or unsubscribe_token_hash <> :tokenHash)`,
    { id, tokenHash },
  );
}

export async function findByUnsubscribeHash(
  tx: Transaction,
  tokenHash: string,
): Promise<{ id: number; name: string; wantsDigest: boolean } | null> {
  const row = await selectOne<{ id: number; name: string; wants_digest: number }>(
    tx,
    'select id, name, wants_digest from people where unsubscribe_token_hash = :tokenHash',
    { tokenHash },
  );
  return row && { id: row.id, name: row.name, wantsDigest: row.wants_digest === 1 };
}

export async function wantsDigest(tx: Transaction, id: number): Promise<boolean> {
  const row = await selectOne<{ wants_digest: number }>(
    tx,
    'select wants_digest from people where id = :id',
    {
      id,
    },
  );
  return row?.wants_digest === 1;
}

export async function setWantsDigest(tx: Transaction, id: number, wanted: boolean): Promise<void> {
  await execute(tx, 'update people set wants_digest = :wanted, version = version + 1 where id = :id', {
    id,
    wanted,
  });
}

interface SignInRow {
  readonly id: number;
  readonly name: string;
  readonly email: string;
  readonly password_hash: string | null;
  readonly is_active: number;
}

const toSignIn = (row: SignInRow | null): SignInRecord | null =>
  row && {
    id: row.id,
    name: row.name,
    email: row.email,
    passwordHash: row.password_hash,
    isActive: row.is_active === 1,
  };

export const toPersonRecord = (row: PersonRow): PersonRecord => ({
  id: row.id,
  name: row.name,
  email: row.email,
  isActive: row.is_active === 1,
  roles: row.roles?.split(',') ?? [],
  deskIds: row.desk_ids?.split(',').map(Number) ?? [],
  deskNames: row.desk_names?.split('\n') ?? [],
});
