import type { Transaction } from 'sequelize';
import type { StripTest } from '../../contracts/alerts.ts';
import type { Outcome } from '../../core/covenants/covenantTest.ts';
import { listStrips, type StripRecord } from '../db/repositories/alertLists.ts';

const STRIP_LENGTH = 12;

interface StripKey {
  readonly assessmentId: number | null;
  readonly covenantId: number | null;
}

/** What a row shows of one covenant: its last twelve tests and where the latest of them stands. */
export interface Strip {
  readonly covenantName: string | null;
  readonly strip: readonly StripTest[];
  readonly mayFall: string | null;
  readonly latestOutcome: Outcome | null;
}

/** The strips of many rows, read at once; a row without an assessment or covenant gets an empty one. */
export async function loadStrips(
  tx: Transaction,
  rows: readonly StripKey[],
): Promise<(row: StripKey) => Strip> {
  const wanted = rows.flatMap(({ assessmentId, covenantId }) =>
    assessmentId !== null && covenantId !== null ? [{ assessmentId, covenantId }] : [],
  );
  const strips = new Map<string, StripRecord[]>();
  for (const test of await listStrips(tx, wanted)) {
    const key = `${test.assessmentId}:${test.covenantId}`;
    const tests = strips.get(key);
    if (tests) tests.push(test);
    else strips.set(key, [test]);
  }
  return ({ assessmentId, covenantId }) => toStrip(strips.get(`${assessmentId}:${covenantId}`) ?? []);
}

function toStrip(tests: readonly StripRecord[]): Strip {
  // A test that is not due or not delivered yet says nothing of headroom: the one before it does.
  const latest =
    tests.findLast((test) => test.outcome !== 'awaiting figures' && test.outcome !== 'not tested') ??
    tests.at(-1);
  return {
    covenantName: latest?.covenantName ?? null,
    strip: tests.slice(-STRIP_LENGTH).map((test) => ({
      testDate: test.testDate,
      outcome: test.outcome as Outcome,
      mayFall: test.mayFall,
      justPassing: test.justPassing === 1,
      level: test.level,
      ...(test.band !== null && { band: test.band }),
    })),
    mayFall: latest?.mayFall ?? null,
    latestOutcome: (latest?.outcome as Outcome | undefined) ?? null,
  };
}
