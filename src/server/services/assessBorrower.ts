/** Load what a borrower's assessment rests on, assess it, store the result, raise its alerts: one transaction. */
import type { Transaction } from 'sequelize';
import type { ServiceProblem } from '../../contracts/problem.ts';
import type { AlertView } from '../../core/alerts/alertChanges.ts';
import { leavesOpen } from '../../core/alerts/unknownConditions.ts';
import { assess, type Assessment } from '../../core/assess.ts';
import type { BookCrossSection } from '../../core/bookCrossSection.ts';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { err, ok, type Result } from '../../core/result.ts';
import { holdAuditHead } from '../db/repositories/audit.ts';
import { findCurrentBasis, insertAssessment, makeCurrent } from '../db/repositories/assessments.ts';
import { holdBorrower, loadBorrowerInputs } from '../db/repositories/borrowerInputs.ts';
import { latestCrossSection } from '../db/repositories/crossSections.ts';
import { policyInForce } from '../db/repositories/policies.ts';
import { figuresChangedAt } from '../db/repositories/statementInputs.ts';
import type { Actor } from './actor.ts';
import { keepWhyItMoved, type CrossSectionOf } from './keepWhyItMoved.ts';
import { raiseAlerts, type AlertCounts } from './raiseAlerts.ts';
import { audit, write, type Outcome } from './write.ts';

export interface AssessmentRequest {
  /** Null by day. */
  readonly runId: number | null;
  /** What became known later is left out. */
  readonly knownAt: Date;
  readonly asOf: PlainDate;
  /** The night's own; left out by day, where the last stored one stands in: "peers as of last night". */
  readonly crossSection?: BookCrossSection;
  /** How peers of an earlier night are read; the night reads them once. */
  readonly crossSectionOf?: CrossSectionOf;
}

export interface AssessedBorrower {
  readonly assessmentId: number;
  /** False where a later result is there already: then this one is kept beside it and raises nothing. */
  readonly isCurrent: boolean;
  readonly alerts: AlertCounts;
}

const NO_ALERTS: AlertCounts = { raised: 0, worsened: 0, updated: 0, conditionGone: 0, closed: 0 };

/**
 * Assesses one borrower by day, after its inputs changed. The caller has checked that the person may change them;
 * the assessment itself is the product's.
 */
export const assessBorrower = (
  actor: Actor,
  borrowerId: number,
  request: AssessmentRequest,
): Promise<Outcome<AssessedBorrower>> =>
  // The key belongs to the change that led here; claimed twice it would be refused.
  write({ ...actor, idempotencyKey: null }, 'assess-borrower', { borrowerId }, (tx) =>
    assessWithin(tx, actor, borrowerId, request),
  );

/** The same inside the caller's transaction. */
export async function assessWithin(
  tx: Transaction,
  actor: Actor,
  borrowerId: number,
  request: AssessmentRequest,
): Promise<Result<AssessedBorrower, ServiceProblem>> {
  const { runId, knownAt, asOf } = request;
  await holdAuditHead(tx);
  const borrower = await holdBorrower(tx, borrowerId);
  const inputs = borrower && (await loadBorrowerInputs(tx, borrowerId, knownAt));
  if (!borrower || !inputs) return err({ kind: 'not-found', what: 'borrower' });

  const crossSection = request.crossSection ?? (await latestCrossSection(tx));
  const policy = await policyInForce(tx, asOf, knownAt);
  const assessment = assess(inputs, crossSection, policy, asOf);

  const latest = await findCurrentBasis(tx, borrowerId);
  const assessmentId = await insertAssessment(tx, assessment, {
    runId,
    knownAt,
    inputVersion: inputs.inputVersion,
    crossSectionId: crossSection.version === 0 ? null : crossSection.version,
  });
  const isCurrent = !latest || (latest.asOf <= asOf && latest.knownAt.getTime() <= knownAt.getTime());
  if (!isCurrent) return ok({ assessmentId, isCurrent, alerts: NO_ALERTS });

  await makeCurrent(tx, assessmentId, assessment);
  await keepWhyItMoved(
    tx,
    {
      assessmentId,
      isNight: runId !== null,
      basis: { inputs, crossSection, policy, asOf },
      result: assessment,
    },
    request.crossSectionOf,
  );
  const alerts = await raiseAlerts(
    tx,
    actor,
    { borrower, asOf, runId, view: await viewOf(tx, assessment, inputs.inputVersion, knownAt) },
    assessment.findings,
  );
  if (runId === null)
    await audit(
      tx,
      { ...actor, person: null },
      {
        action: 'assess-borrower',
        subjectKind: 'assessment',
        subjectId: String(assessmentId),
        borrowerId,
        deskId: borrower.deskId,
        summary: `${borrower.name}: assessed by day, peers as of last night`,
        before: null,
        after: { inputVersion: inputs.inputVersion, crossSection: crossSection.version, alerts },
      },
    );
  return ok({ assessmentId, isCurrent, alerts });
}

async function viewOf(
  tx: Transaction,
  assessment: Assessment,
  inputVersion: number,
  knownAt: Date,
): Promise<AlertView> {
  return {
    inputVersion,
    figuresChangedAt: await figuresChangedAt(tx, assessment.borrowerId, knownAt),
    isUnknown: leavesOpen(assessment),
  };
}
