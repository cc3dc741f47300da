import type { Transaction } from 'sequelize';
import type { Assessment } from '../../../core/assess.ts';
import type { PreviousAssessment } from '../../../core/borrowerInputs.ts';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { tightestAhead } from '../../../core/covenants/smallestHeadroom.ts';
import { insertRows } from '../insertRows.ts';
import { execute, select, selectOne } from '../sql.ts';
import { readAssessment, storedAssessment } from '../storedAssessment.ts';

export interface AssessmentBasis {
  readonly runId: number | null;
  readonly knownAt: Date;
  readonly inputVersion: number;
  /** Null where no cross-section was there yet: no peers. */
  readonly crossSectionId: number | null;
}

export interface StoredAssessment extends AssessmentBasis {
  readonly id: number;
  readonly assessment: Assessment;
  /** The day of the cross-section's peers; earlier than the assessment's own day for "peers as of last night". */
  readonly peersAsOf: PlainDate | null;
}

/** Stores one result for ever; it becomes the borrower's current one only through makeCurrent. */
export async function insertAssessment(
  tx: Transaction,
  assessment: Assessment,
  basis: AssessmentBasis,
): Promise<number> {
  const ahead = tightestAhead(assessment.headroomsAhead);
  const { insertId } = await execute(
    tx,
    `insert into assessments (borrower_id, run_id, as_of, known_at, input_version, method_version, policy_version,
       cross_section_id, smallest_may_fall, smallest_covenant_id, ahead_may_fall, ahead_from, quality_headline, quality_band, content)
     values (:borrowerId, :runId, :asOf, :knownAt, :inputVersion, :methodVersion, :policyVersion,
       :crossSectionId, :smallestMayFall, :smallestCovenantId, :aheadMayFall, :aheadFrom, :qualityHeadline, :qualityBand, :content)`,
    {
      ...basis,
      borrowerId: assessment.borrowerId,
      asOf: assessment.asOf,
      methodVersion: assessment.methodVersion,
      policyVersion: assessment.policyVersion,
      smallestMayFall: assessment.smallestHeadroom?.mayFall.toFixed(10) ?? null,
      smallestCovenantId: assessment.smallestHeadroom?.covenantId ?? null,
      aheadMayFall: ahead?.mayFall.toFixed(10) ?? null,
      aheadFrom: ahead?.from ?? null,
      qualityHeadline: assessment.quality.headline,
      qualityBand: assessment.quality.band,
      content: storedAssessment(assessment),
    },
  );
  await insertRows(
    tx,
    'test_results',
    assessment.tests.map((test) => ({
      assessment_id: insertId,
      covenant_id: test.covenantId,
      test_date: test.testDate,
      level: test.level?.toFixed(6) ?? null,
      tested: test.tested?.toFixed(12) ?? null,
      outcome: test.outcome,
      underlying_outcome: test.underlyingOutcome,
      may_fall: test.headroom.mayFall?.toFixed(10) ?? null,
      share_of_level: test.headroom.shareOfLevel?.toFixed(10) ?? null,
      is_just_passing: test.justPassing ? 1 : 0,
    })),
  );
  return insertId;
}

/** The day and cut-off of the borrower's current result; null before the first. */
export async function findCurrentBasis(
  tx: Transaction,
  borrowerId: number,
): Promise<{ readonly asOf: PlainDate; readonly knownAt: Date } | null> {
  return selectOne(
    tx,
    `select a.as_of as asOf, a.known_at as knownAt
     from current_assessments c join assessments a on a.id = c.assessment_id
     where c.borrower_id = :borrowerId`,
    { borrowerId },
  );
}

/** Whether the result that screens show rests on the inputs as they are now. */
export async function isAssessedAsItStands(tx: Transaction, borrowerId: number): Promise<boolean> {
  const row = await selectOne<{ id: number }>(
    tx,
    `select a.id from current_assessments c
     join assessments a on a.id = c.assessment_id
     join borrower_input_versions v on v.borrower_id = c.borrower_id and v.input_version = a.input_version
     where c.borrower_id = :borrowerId`,
    { borrowerId },
  );
  return row !== null;
}

/**
 * Makes the result the one that screens show, and writes what we computed beside what was certified and accepted.
 * Those two and the checking stay as people left them; the version moves only where our figure moved, so that a
 * check of an older figure is seen to be stale.
 */
export async function makeCurrent(
  tx: Transaction,
  assessmentId: number,
  assessment: Assessment,
): Promise<void> {
  await execute(
    tx,
    `insert into current_assessments (borrower_id, assessment_id) values (:borrowerId, :assessmentId)
     on duplicate key update assessment_id = values(assessment_id)`,
    { borrowerId: assessment.borrowerId, assessmentId },
  );
  await insertRows(
    tx,
    'covenant_tests',
    assessment.tests.map((test) => ({
      covenant_id: test.covenantId,
      test_date: test.testDate,
      computed_assessment_id: assessmentId,
      computed_outcome: test.outcome,
      computed_value: test.tested?.toFixed(12) ?? null,
    })),
    `on duplicate key update
       version = version + if(computed_outcome <=> values(computed_outcome)
         and computed_value <=> values(computed_value), 0, 1),
       computed_assessment_id = values(computed_assessment_id),
       computed_outcome = values(computed_outcome), computed_value = values(computed_value)`,
  );
}

interface StoredRow {
  readonly id: number;
  readonly runId: number | null;
  readonly knownAt: Date;
  readonly inputVersion: number;
  readonly crossSectionId: number | null;
  readonly peersAsOf: PlainDate | null;
  readonly content: string;
}

/** The result that screens show; null before the first assessment. The caller has checked the desk. */
export async function findCurrentAssessment(
  tx: Transaction,
  borrowerId: number,
): Promise<StoredAssessment | null> {
  const row = await selectOne<StoredRow>(
    tx,
    `select a.id, a.run_id as runId, a.known_at as knownAt, a.input_version as inputVersion,
       a.cross_section_id as crossSectionId, x.as_of as peersAsOf, a.content
     from current_assessments c join assessments a on a.id = c.assessment_id
       left join cross_sections x on x.id = a.cross_section_id
     where c.borrower_id = :borrowerId`,
    { borrowerId },
  );
  if (!row) return null;
  const { content, ...stored } = row;
  return { ...stored, assessment: readAssessment(content) };
}

interface PreviousRow {
  readonly id: number;
  readonly borrowerId: number;
  readonly quarterEnd: PlainDate | null;
  readonly headline: string | null;
  readonly band: string | null;
}

/**
 * What was said of each borrower before its inputs last changed: the latest result known by then under a lower
 * input version. Last night's result would do for one night only: the second night after a fall would see none.
 */
export async function loadPrevious(
  tx: Transaction,
  borrowers: readonly { readonly id: number; readonly inputVersion: number }[],
  knownAt: Date,
): Promise<ReadonlyMap<number, PreviousAssessment>> {
  const rows = await select<PreviousRow>(
    tx,
    `select a.id, a.borrower_id as borrowerId, a.quality_headline as headline, a.quality_band as band,
       json_value(a.content, '$.quality.latest.quarterEnd') as quarterEnd
     from assessments a join (
       select p.id, row_number() over (partition by p.borrower_id order by p.known_at desc, p.id desc) as place
       from assessments p join borrower_input_versions v on v.borrower_id = p.borrower_id
       where p.borrower_id in (:borrowerIds) and p.known_at <= :knownAt and p.input_version < v.input_version
     ) latest on latest.id = a.id and latest.place = 1`,
    { borrowerIds: borrowers.map((borrower) => borrower.id), knownAt },
  );
  return new Map(
    rows.map((row) => [
      row.borrowerId,
      {
        quality: row.quarterEnd && {
          quarterEnd: row.quarterEnd,
          headline: row.headline === null ? null : Number(row.headline),
          band: row.band,
        },
      },
    ]),
  );
}
