import type { Transaction } from 'sequelize';
import type { BorrowerView, ComputedFacts } from '../../contracts/borrowers.ts';
import { alertQuery } from '../../contracts/alerts.ts';
import { err, ok } from '../../core/result.ts';
import { deskScope, may } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { listAlerts } from '../db/repositories/alertLists.ts';
import { findCurrentAssessment, type StoredAssessment } from '../db/repositories/assessments.ts';
import { listDeskMembers } from '../db/repositories/borrowerLists.ts';
import { findBorrower } from '../db/repositories/borrowers.ts';
import { listChecks } from '../db/repositories/covenantTests.ts';
import { loadCovenants } from '../db/repositories/covenantInputs.ts';
import { listFacilities } from '../db/repositories/facilities.ts';
import { policyOfVersion } from '../db/repositories/policies.ts';
import type { PersonActor } from './actor.ts';
import { toCovenantViews } from './covenantViews.ts';
import { lenderDay } from './lenderDay.ts';
import { movementsOf } from './movementViews.ts';
import { alertFilter, withStrips } from './listAlerts.ts';
import { borrowerWatch } from './listWatchlist.ts';
import { toOutlookView } from './outlookView.ts';
import type { Outcome } from './write.ts';

/** One borrower as its page shows it, from the stored result: nothing is computed for the screen. */
export async function showBorrower(actor: PersonActor, id: number): Promise<Outcome<BorrowerView>> {
  const view = await inTransaction((tx) => borrowerView(tx, actor, id));
  return view ? ok(view) : err({ kind: 'not-found', what: 'borrower' });
}

/** The same inside a transaction; null where there is no such borrower in the person's reach. */
export async function borrowerView(
  tx: Transaction,
  actor: PersonActor,
  id: number,
): Promise<BorrowerView | null> {
  const scope = deskScope(actor.person, 'read borrower');
  const borrower = await findBorrower(tx, id, scope);
  if (!borrower) return null;
  const stored = await findCurrentAssessment(tx, id);
  const facilities = await listFacilities(tx, id);
  const query = alertQuery.parse({ borrowerId: id, perPage: 100, sort: 'severity' });
  const alerts = await listAlerts(tx, scope, await alertFilter(tx, actor, query), query);
  const today = await lenderDay(tx, actor.now);
  const watch = await borrowerWatch(tx, scope, id, today);
  return {
    id: borrower.id,
    name: borrower.name,
    legalForm: borrower.legalForm,
    lei: borrower.lei,
    isListed: borrower.isListed,
    sectorCode: borrower.sectorCode,
    sectorLabel: borrower.sectorLabel,
    country: borrower.country,
    currency: borrower.currency,
    fiscalYearEndMonth: borrower.fiscalYearEndMonth,
    deskId: borrower.deskId,
    deskName: borrower.deskName,
    managerId: borrower.relationshipManagerId,
    managerName: borrower.relationshipManager,
    analystName: borrower.analyst,
    facilities: facilities.map(({ startsOn: _startsOn, limit, drawn, ...facility }) => ({
      ...facility,
      limit: limit.toFixed(),
      drawn: drawn.toFixed(),
    })),
    computed: stored && computedFacts(stored),
    covenants: stored ? await covenantViews(tx, id, stored, facilities) : [],
    quality: stored?.assessment.quality ?? null,
    outlook: stored && toOutlookView(stored.assessment),
    movements: stored && (await movementsOf(tx, id, stored)),
    today,
    alerts: await withStrips(tx, alerts.rows, actor.now),
    ...watch,
    mayImport: may(actor.person, 'import figures', borrower.deskId),
    mayPropose: may(actor.person, 'propose', borrower.deskId),
    deskMembers: await listDeskMembers(tx, borrower.deskId),
  };
}

const computedFacts = (stored: StoredAssessment): ComputedFacts => ({
  asOf: stored.assessment.asOf,
  dataCutOff: stored.knownAt.toISOString(),
  peersAsOf: stored.peersAsOf,
  peersAreLastNights: stored.runId === null,
  methodVersion: stored.assessment.methodVersion,
  policyVersion: stored.assessment.policyVersion,
  inputVersion: stored.inputVersion,
});

async function covenantViews(
  tx: Transaction,
  borrowerId: number,
  stored: StoredAssessment,
  facilities: readonly { id: number; name: string }[],
) {
  const covenants = (await loadCovenants(tx, [borrowerId], stored.knownAt)).get(borrowerId) ?? [];
  const checks = await listChecks(
    tx,
    covenants.map((covenant) => covenant.id),
  );
  const { justPassingBand: band } = await policyOfVersion(tx, stored.assessment.policyVersion);
  return toCovenantViews(covenants, stored.assessment, { facilities, checks, band });
}
