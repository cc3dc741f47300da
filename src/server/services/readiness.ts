/** Can this process do its work? Asked by whoever decides where requests go, so it says states and no figures. */
import { statfs } from 'node:fs/promises';
import { env } from '../config/env.ts';
import { inTransaction, isOutage } from '../db/inTransaction.ts';
import { missingMigrations } from '../db/migrator.ts';
import { outboxBacklog } from '../db/repositories/outbox.ts';
import { findLender } from '../db/repositories/lender.ts';
import { lastNightDoneAt } from '../db/repositories/readiness.ts';

const DATABASE_MS_MOST = 1_000;
const FREE_BYTES_LEAST = 200 * 1024 * 1024;
const MAIL_WAITS_MS_MOST = 60 * 60_000;
const NIGHT_MS_MOST = 36 * 60 * 60_000;

export interface Readiness {
  /** Database, schema and disk decide; late mail and a late night are said and stop no request. */
  readonly isReady: boolean;
  readonly checks: {
    readonly database: 'ok' | 'does not answer';
    readonly schema: 'ok' | 'not up to date' | 'unknown';
    readonly disk: 'ok' | 'nearly full';
    readonly mail: 'ok' | 'late' | 'unknown';
    readonly night: 'ok' | 'late' | 'none yet' | 'unknown';
  };
}

export async function readiness(now: Date): Promise<Readiness> {
  const disk = await diskState();
  const database = await withinTime(databaseStates(now));
  if (database === null) {
    const checks = { schema: 'unknown', mail: 'unknown', night: 'unknown' } as const;
    return { isReady: false, checks: { database: 'does not answer', disk, ...checks } };
  }
  return {
    isReady: database.schema === 'ok' && disk === 'ok',
    checks: { database: 'ok', disk, ...database },
  };
}

type DatabaseStates = Omit<Readiness['checks'], 'database' | 'disk'>;

const databaseStates = (now: Date): Promise<DatabaseStates> =>
  inTransaction(async (tx) => {
    if ((await missingMigrations(tx)).length > 0)
      return { schema: 'not up to date', mail: 'unknown', night: 'unknown' };
    const { oldestQueuedAt } = await outboxBacklog(tx);
    const mailWaitsMs = oldestQueuedAt === null ? 0 : now.getTime() - oldestQueuedAt.getTime();
    return {
      schema: 'ok',
      mail: mailWaitsMs > MAIL_WAITS_MS_MOST ? 'late' : 'ok',
      night: nightState(now, (await findLender(tx)) && (await lastNightDoneAt(tx))),
    };
  });

function nightState(now: Date, doneAt: Date | null): DatabaseStates['night'] {
  if (doneAt === null) return 'none yet';
  return now.getTime() - doneAt.getTime() > NIGHT_MS_MOST ? 'late' : 'ok';
}

/** Null where the database is out of reach or slower than a second. */
async function withinTime(states: Promise<DatabaseStates>): Promise<DatabaseStates | null> {
  let timer: NodeJS.Timeout | undefined;
  const tooLate = new Promise<null>((done) => {
    timer = setTimeout(() => done(null), DATABASE_MS_MOST);
  });
  const answered = states.catch((error: unknown) => {
    if (isOutage(error)) return null;
    throw error;
  });
  // Where time ran out first, what the database still says is nobody's concern.
  answered.catch(() => null);
  return Promise.race([answered, tooLate]).finally(() => clearTimeout(timer));
}

async function diskState(): Promise<Readiness['checks']['disk']> {
  const { bavail, bsize } = await statfs(env().DATA_DIR);
  return bavail * bsize < FREE_BYTES_LEAST ? 'nearly full' : 'ok';
}
