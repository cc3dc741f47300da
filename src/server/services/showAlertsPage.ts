import { formatDay } from '../../core/calendar/printDay.ts';
import { formatInstant } from '../../core/calendar/printInstant.ts';
import type { AlertQuery, AlertRow } from '../../contracts/alerts.ts';
import type { Page } from '../../contracts/paging.ts';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import {
  countOpenAlerts,
  countRaisedSince,
  listAlerts as listRecords,
} from '../db/repositories/alertLists.ts';
import { listRuns } from '../db/repositories/runs.ts';
import { listSectors } from '../db/repositories/sectors.ts';
import type { PersonActor } from './actor.ts';
import { lenderDay } from './lenderDay.ts';
import { alertFilter, withStrips } from './listAlerts.ts';

const DAY_MS = 86_400_000;

export interface AlertsPage {
  readonly query: AlertQuery;
  readonly first: Page<AlertRow>;
  readonly today: string;
  readonly sectors: readonly { readonly code: string; readonly label: string }[];
  readonly ownsBorrowers: boolean;
  /** "37 open, 6 new since yesterday. Figures received to …, computed …" */
  readonly facts: string;
}

/** The alerts page: a relationship manager who comes without a view sees the own borrowers first. */
export function showAlertsPage(actor: PersonActor, asked: AlertQuery, isPlain: boolean): Promise<AlertsPage> {
  const ownsBorrowers = actor.person.roles.includes('relationship manager');
  const query: AlertQuery = isPlain && ownsBorrowers ? { ...asked, view: 'mine' } : asked;
  const scope = deskScope(actor.person, 'read borrower');
  return inTransaction(async (tx) => {
    const { rows, total } = await listRecords(tx, scope, await alertFilter(tx, actor, query), query);
    const open = await countOpenAlerts(tx, scope);
    const fresh = await countRaisedSince(tx, scope, new Date(actor.now.getTime() - DAY_MS));
    const [run] = (await listRuns(tx, { page: 1, perPage: 1 })).rows;
    const computed = run
      ? ` Last run of ${formatDay(run.businessDate)}, figures known to ${formatInstant(run.knownAt, 'UTC')}.`
      : ' No nightly run yet.';
    return {
      query,
      first: { rows: await withStrips(tx, rows, actor.now), page: query.page, perPage: query.perPage, total },
      today: await lenderDay(tx, actor.now),
      sectors: (await listSectors(tx)).map(({ code, label }) => ({ code, label })),
      ownsBorrowers,
      facts: `${open} open, ${fresh} new since yesterday.${computed}`,
    };
  });
}
