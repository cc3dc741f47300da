/** Queues one digest a person: whoever owns alerts or deputises an owner, and heads of desks for what is urgent. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { formatMoney } from '../../core/money/print.ts';
import { tokenHash, unsubscribeToken } from '../auth/tokens.ts';
import { env } from '../config/env.ts';
import {
  listDeputised,
  listDigestAlerts,
  listDigestReaders,
  listExposures,
  type DigestAlert,
  type DigestReader,
} from '../db/repositories/digestAlerts.ts';
import { queueMail } from '../db/repositories/outbox.ts';
import { storeUnsubscribeHash } from '../db/repositories/people.ts';
import type { TaskFailure } from '../db/repositories/runTasks.ts';
import { digestMail, oneClickHeaders, type Digest, type DigestItem } from '../mail/digest.ts';
import { askedOf, digestBlocks, type BlockedAlerts, type DigestDay } from './digestBlocks.ts';

export interface DigestRun extends DigestDay {
  readonly runId: number;
  readonly attempt: number;
  /** Changes after `changedAfter` up to `knownAt` are told; null: from the beginning. */
  readonly changedAfter: Date | null;
  readonly knownAt: Date;
  /** As printed, with its zone. */
  readonly knownAtText: string;
  readonly runAtText: string;
  readonly tested: number;
  readonly total: number;
  readonly failures: readonly TaskFailure[];
}

/** The number of digests queued; a person whose morning is empty gets none. */
export async function sendDigests(tx: Transaction, run: DigestRun): Promise<number> {
  const alerts = await listDigestAlerts(tx, { since: run.changedAfter, until: run.knownAt });
  const deputised = await listDeputised(tx, run.businessDate);
  const exposures = await exposureTexts(tx, alerts);
  let queued = 0;
  for (const reader of await listDigestReaders(tx)) {
    if (!reader.wantsDigest) continue;
    const owners = [reader.id, ...(deputised.get(reader.id) ?? [])];
    const own = alerts.filter(
      (alert) =>
        owners.includes(alert.ownerId) || (alert.deskHeadId === reader.id && alert.severity === 'urgent'),
    );
    const failures = run.failures.filter((failure) => owners.includes(failure.relationshipManagerId));
    const blocked = digestBlocks(own, run);
    if (failures.length === 0 && [...blocked.blocks.values()].every((items) => items.length === 0)) continue;
    if (await queueDigest(tx, run, reader, toDigest(run, reader, blocked, failures, exposures))) queued += 1;
  }
  return queued;
}

async function queueDigest(
  tx: Transaction,
  run: DigestRun,
  reader: DigestReader,
  digest: Digest,
): Promise<boolean> {
  const mail = digestMail(digest);
  await storeUnsubscribeHash(tx, reader.id, tokenHash(unsubscribeToken(reader.id)));
  return queueMail(tx, {
    messageKey: `digest:${run.runId}:${run.attempt}:${reader.id}`,
    personId: reader.id,
    toName: reader.name,
    toAddress: reader.email,
    ...mail,
    headers: oneClickHeaders(address(`/api/v1/unsubscribe?token=${unsubscribeToken(reader.id)}`)),
    now: run.knownAt,
  });
}

function toDigest(
  run: DigestRun,
  reader: DigestReader,
  blocked: BlockedAlerts,
  failures: readonly TaskFailure[],
  exposures: ReadonlyMap<number, string>,
): Digest {
  const listed = [...blocked.blocks.values()].flat();
  const desks = [...listed, ...failures].map((one) => one.deskName);
  return {
    deskNames: [...new Set(desks)].sort(),
    day: formatDay(run.businessDate),
    blocks: [...blocked.blocks].map(([name, items]) => ({
      name,
      items: items.map((alert) => toItem(alert, run.businessDate, exposures)),
    })),
    stillOverdue: blocked.stillOverdue,
    newFigures: blocked.newFigures,
    unchanged: blocked.unchanged,
    knownAt: run.knownAtText,
    runAt: run.runAtText,
    tested: run.tested,
    total: run.total,
    failures: [...new Set(failures.map((failure) => `${failure.borrowerName} (${failure.reason})`))],
    alertsUrl: address('/alerts'),
    unsubscribeUrl: address(`/unsubscribe?token=${unsubscribeToken(reader.id)}`),
  };
}

const toItem = (
  alert: DigestAlert,
  businessDate: PlainDate,
  exposures: ReadonlyMap<number, string>,
): DigestItem => ({
  alertId: alert.id,
  borrowerName: alert.borrowerName,
  exposure: exposures.get(alert.borrowerId) ?? 'no facility recorded',
  kind: alert.kind,
  severity: alert.severity,
  isWarning: alert.kind === 'test not met',
  sentence: alert.sentence,
  since: formatDay(alert.factDate),
  asked: askedOf(alert, businessDate),
  url: address(`/alerts/${alert.id}`),
});

/** From the one configured address, never from a request. */
export const address = (path: string): string => new URL(path, env().APP_URL).href;

async function exposureTexts(
  tx: Transaction,
  alerts: readonly DigestAlert[],
): Promise<ReadonlyMap<number, string>> {
  const exposures = await listExposures(tx, [...new Set(alerts.map((alert) => alert.borrowerId))]);
  return new Map(
    [...exposures].map(([borrowerId, limits]) => [
      borrowerId,
      `limit ${limits.map(({ currency, limit }) => `${currency} ${formatMoney(limit)}`).join(' and ')}`,
    ]),
  );
}
