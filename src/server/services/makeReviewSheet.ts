import type { Transaction } from 'sequelize';
import type { BorrowerView } from '../../contracts/borrowers.ts';
import type { ReviewSheet } from '../../contracts/reviewSheet.ts';
import { plainDate } from '../../core/calendar/plainDate.ts';
import { POLICY_VERSION_1 } from '../../core/policy.ts';
import { err, ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findBorrower } from '../db/repositories/borrowers.ts';
import { loadCovenants } from '../db/repositories/covenantInputs.ts';
import { policyInForce } from '../db/repositories/policies.ts';
import { listFigureSources, listSignals } from '../db/repositories/reviewSheets.ts';
import type { PersonActor } from './actor.ts';
import { reviewSheet } from './reviewSheet/reviewSheet.ts';
import { SIGNALS_MOST } from './reviewSheet/signals.ts';
import { linksOf } from './reviewSheet/sources.ts';
import { borrowerView } from './showBorrower.ts';
import type { Outcome } from './write.ts';

export interface SheetOfBorrower {
  readonly borrower: BorrowerView;
  readonly sheet: ReviewSheet;
}

/** The borrower's review sheet as of now, a draft. */
export const makeReviewSheet = (actor: PersonActor, id: number): Promise<Outcome<SheetOfBorrower>> =>
  inTransaction((tx) => draftSheet(tx, actor, id));

/** The same inside a transaction that is under way, so that all of it is one snapshot. */
export async function draftSheet(
  tx: Transaction,
  actor: PersonActor,
  id: number,
): Promise<Outcome<SheetOfBorrower>> {
  const view = await borrowerView(tx, actor, id);
  const record = await findBorrower(tx, id, deskScope(actor.person, 'read borrower'));
  if (!view || !record) return err({ kind: 'not-found', what: 'borrower' });
  const { computed } = view;
  const knownAt = computed && new Date(computed.dataCutOff);
  const covenants = knownAt ? ((await loadCovenants(tx, [id], knownAt)).get(id) ?? []) : [];
  const policy =
    computed && knownAt ? await policyInForce(tx, plainDate(computed.asOf), knownAt) : POLICY_VERSION_1;
  return ok({
    borrower: view,
    sheet: reviewSheet({
      view,
      sectorScheme: record.sectorScheme,
      covenants,
      policy,
      signals: await listSignals(tx, id, SIGNALS_MOST + 1),
      figureSources: await listFigureSources(tx, id, view.covenants.flatMap(linksOf)),
      madeAt: actor.now,
    }),
  });
}
