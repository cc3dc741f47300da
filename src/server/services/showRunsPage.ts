import type { Page, PageQuery } from '../../contracts/paging.ts';
import type { RunDetail, RunRow } from '../../contracts/runs.ts';
import { businessDate } from '../../core/calendar/businessDate.ts';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { ok } from '../../core/result.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findLender } from '../db/repositories/lender.ts';
import type { PersonActor } from './actor.ts';
import { listRuns, showRun } from './listRuns.ts';
import type { Outcome } from './write.ts';

export interface RunsPage {
  readonly first: Page<RunRow>;
  /** The run that is going on or, without one, the latest. */
  readonly latest: RunDetail | null;
  /** The business date of now. */
  readonly today: PlainDate;
  readonly zone: string;
  readonly nightAtUtc: string;
}

/** What the administrator's page of runs begins with. */
export async function showRunsPage(actor: PersonActor, query: PageQuery): Promise<Outcome<RunsPage>> {
  const first = await listRuns(actor, query);
  if (!first.ok) return first;
  const lender = await inTransaction((tx) => findLender(tx));
  if (!lender) throw new Error('there is no lender yet');
  const { rows } = first.value;
  const shown = rows.find(({ state }) => state === 'running' || state === 'queued') ?? rows[0];
  const latest = shown ? await showRun(actor, shown.id) : null;
  return ok({
    first: first.value,
    latest: latest?.ok ? latest.value : null,
    today: businessDate(actor.now, lender.zone),
    zone: lender.zone,
    nightAtUtc: lender.nightAtUtc,
  });
}
