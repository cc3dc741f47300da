/** What stands beside the computed result of a test: certified, accepted, checked. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { select } from '../sql.ts';

export interface CheckRecord {
  readonly covenantId: number;
  readonly testDate: PlainDate;
  readonly certifiedValue: string | null;
  readonly certifiedOutcome: string | null;
  readonly acceptedOutcome: string | null;
  readonly checking: string;
}

export async function listChecks(tx: Transaction, covenantIds: readonly number[]): Promise<CheckRecord[]> {
  return select<CheckRecord>(
    tx,
    `select covenant_id as covenantId, test_date as testDate, certified_value as certifiedValue,
       certified_outcome as certifiedOutcome, accepted_outcome as acceptedOutcome, checking
     from covenant_tests where covenant_id in (:covenantIds) order by covenant_id, test_date`,
    { covenantIds },
  );
}
