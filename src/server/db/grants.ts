/**
 * What the application's database user may do: read and change rows, but only add to the audit log, and nothing
 * to the schema. A grant on the whole database cannot be taken back for one table, so every table has its own.
 */
import { QueryTypes } from 'sequelize';
import { connect } from './connection.ts';

/** Tables with less than the usual rights. */
const RIGHTS: Readonly<Record<string, string>> = {
  audit_entries: 'select, insert',
  audit_heads: 'select, update',
  schema_migrations: 'select',
  schema_locks: 'select',
};
const USUAL_RIGHTS = 'select, insert, update, delete';

/** Grants table by table, as the owner; safe to repeat, and to be repeated after every change of the schema. */
export async function grantToApplication(ownerUrl: string, applicationUrl: string): Promise<void> {
  const account = await accountOf(applicationUrl);
  const owner = connect(ownerUrl, 1);
  try {
    const tables = await owner.query<{ name: string }>(
      `select table_name as name from information_schema.tables
       where table_schema = database() and table_type = 'BASE TABLE' order by table_name`,
      { type: QueryTypes.SELECT },
    );
    for (const { name } of tables)
      await owner.query(`grant ${RIGHTS[name] ?? USUAL_RIGHTS} on \`${name}\` to ${account}`, {
        type: QueryTypes.RAW,
      });
  } finally {
    await owner.close();
  }
}

/** The account behind an address as the server names it, quoted; asked without a database, where it has no right yet. */
async function accountOf(url: string): Promise<string> {
  const withoutDatabase = new URL(url);
  withoutDatabase.pathname = '';
  const application = connect(withoutDatabase.href, 1);
  try {
    const rows = await application.query<{ account: string }>('select current_user() as account', {
      type: QueryTypes.SELECT,
    });
    const account = rows[0]?.account ?? '';
    const at = account.lastIndexOf('@');
    const quoted = (text: string) => `'${text.replaceAll("'", "''")}'`;
    return `${quoted(account.slice(0, at))}@${quoted(account.slice(at + 1))}`;
  } finally {
    await application.close();
  }
}
