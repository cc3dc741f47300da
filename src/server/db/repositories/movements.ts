/** What moved a result since an earlier one; kept with the later result. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import type { Movement } from '../../../core/whyItMoved.ts';
import { execute, selectOne } from '../sql.ts';
import { readMovements, storedMovements } from '../stored/movements.ts';
import { readAssessment } from '../storedAssessment.ts';
import type { StoredAssessment } from './assessments.ts';

export interface EarlierResult extends Pick<
  StoredAssessment,
  'id' | 'knownAt' | 'crossSectionId' | 'assessment'
> {
  readonly asOf: PlainDate;
}

/** The last night's result before this one: of an earlier day for a night, of the latest night for a result by day. */
export async function findEarlierNight(
  tx: Transaction,
  result: {
    readonly borrowerId: number;
    readonly assessmentId: number;
    readonly asOf: PlainDate;
    readonly isNight: boolean;
  },
): Promise<EarlierResult | null> {
  const row = await selectOne<Omit<EarlierResult, 'assessment'> & { readonly content: string }>(
    tx,
    `select id, known_at as knownAt, cross_section_id as crossSectionId, as_of as asOf, content
     from assessments
     where borrower_id = :borrowerId and id < :assessmentId and run_id is not null
       and (as_of < :asOf or (as_of = :asOf and not :isNight))
     order by as_of desc, id desc limit 1`,
    { ...result },
  );
  if (!row) return null;
  const { content, ...earlier } = row;
  return { ...earlier, assessment: readAssessment(content) };
}

export async function keepMovements(
  tx: Transaction,
  assessmentId: number,
  earlierId: number,
  movements: readonly Movement[],
): Promise<void> {
  await execute(
    tx,
    `update assessments set earlier_assessment_id = :earlierId, movements = :movements where id = :assessmentId`,
    { assessmentId, earlierId, movements: storedMovements(movements) },
  );
}

export interface KeptMovements {
  /** The night that the result is held against. */
  readonly since: PlainDate;
  readonly movements: readonly Movement[];
}

/** Null where there was no earlier night to hold the result against. */
export async function findMovements(tx: Transaction, assessmentId: number): Promise<KeptMovements | null> {
  const row = await selectOne<{ readonly since: PlainDate; readonly movements: string }>(
    tx,
    `select e.as_of as since, a.movements
     from assessments a join assessments e on e.id = a.earlier_assessment_id
     where a.id = :assessmentId`,
    { assessmentId },
  );
  return row && { since: row.since, movements: readMovements(row.movements) };
}
