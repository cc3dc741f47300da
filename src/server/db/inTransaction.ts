import { Transaction } from 'sequelize';
import { database } from './connection.ts';

/** Deadlock, lock wait, snapshot conflict, cluster not ready, cluster certification. */
const WORTH_ANOTHER_TRY = new Set([1213, 1205, 1020, 1047, 1180]);
/** The connector's own numbers: connection closed already, socket closed unexpectedly, command on a closed connection. */
const CLOSED_MEANWHILE = new Set([45001, 45009, 45013]);
const MOST_TRIES = 5;

function errorNumber(error: unknown): number | null {
  if (typeof error !== 'object' || error === null || !('parent' in error)) return null;
  const { parent } = error;
  return typeof parent === 'object' &&
    parent !== null &&
    'errno' in parent &&
    typeof parent.errno === 'number'
    ? parent.errno
    : null;
}

/** 1062: a unique key refused the row. */
export const isDuplicate = (error: unknown): boolean => errorNumber(error) === 1062;

/** The database could not be reached or gave up; never to be shown as an empty result. */
export function isOutage(error: unknown): boolean {
  if (typeof error !== 'object' || error === null || !('name' in error)) return false;
  if (typeof error.name === 'string' && error.name.startsWith('SequelizeConnection')) return true;
  const code =
    'parent' in error && typeof error.parent === 'object' && error.parent !== null && 'code' in error.parent
      ? error.parent.code
      : null;
  return (
    typeof code === 'string' &&
    /^(ECONN|EPIPE|ER_SOCKET|ER_CMD_CONNECTION_CLOSED|ER_CONNECTION|ER_POOL|ER_SERVER_SHUTDOWN|ER_RECORD_FILE_FULL|ER_DISK_FULL)/.test(
      code,
    )
  );
}

/**
 * Runs the work in one transaction and again, from its start, where the database asks for that. The work must
 * have no effect outside the database: mail is a row in the outbox, a file is stored before.
 */
export async function inTransaction<T>(work: (tx: Transaction) => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt += 1) {
    let begun = false;
    try {
      return await database().transaction(
        { isolationLevel: Transaction.ISOLATION_LEVELS.REPEATABLE_READ },
        (tx) => {
          begun = true;
          return work(tx);
        },
      );
    } catch (error) {
      const number = errorNumber(error);
      // A pooled connection that the server closed meanwhile shows itself at BEGIN, before anything was done.
      const isWorthATry = number !== null && (begun ? WORTH_ANOTHER_TRY : CLOSED_MEANWHILE).has(number);
      if (attempt >= MOST_TRIES || !isWorthATry) throw error;
      await new Promise((resume) => setTimeout(resume, 20 * attempt * (1 + Math.random())));
    }
  }
}
