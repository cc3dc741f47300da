import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import type { ProjectionRecord } from '../../../core/outlook/backTest.ts';
import { selectOne } from '../sql.ts';

/** Of the last night, without the rest of what it keeps; null before the first night that looked back. */
export async function latestProjectionRecord(
  tx: Transaction,
): Promise<{ readonly asOf: PlainDate; readonly record: ProjectionRecord } | null> {
  const row = await selectOne<{ asOf: PlainDate; record: string | null }>(
    tx,
    `select as_of as asOf, cast(json_extract(content, '$.projectionRecord') as char) as record
     from cross_sections order by as_of desc, known_at desc, id desc limit 1`,
  );
  const record = row?.record ? (JSON.parse(row.record) as ProjectionRecord | null) : null;
  return row && record && { asOf: row.asOf, record };
}
