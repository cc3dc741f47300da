import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import type { CrossSection } from '../../../core/quality/crossSection.ts';
import { execute, selectOne } from '../sql.ts';

/** Before the first night there are no peers: what rests on them says so. */
const NO_CROSS_SECTION: CrossSection = { version: 0, quarters: [] };

/**
 * Stores the peers' standing. Its version is the row's own number, so it is built once the number is known, in
 * the same transaction.
 */
export async function storeCrossSection(
  tx: Transaction,
  basis: {
    readonly runId: number;
    readonly asOf: PlainDate;
    readonly knownAt: Date;
    readonly methodVersion: string;
  },
  build: (version: number) => CrossSection,
): Promise<CrossSection> {
  const { insertId } = await execute(
    tx,
    `insert into cross_sections (run_id, as_of, known_at, method_version, content)
     values (:runId, :asOf, :knownAt, :methodVersion, '{}')`,
    basis,
  );
  const crossSection = build(insertId);
  await execute(tx, 'update cross_sections set content = :content where id = :id', {
    id: insertId,
    content: JSON.stringify(crossSection),
  });
  return crossSection;
}

/** Plain JSON that this file wrote. */
export async function findCrossSection(tx: Transaction, id: number): Promise<CrossSection | null> {
  const row = await selectOne<{ content: string }>(tx, 'select content from cross_sections where id = :id', {
    id,
  });
  return row && (JSON.parse(row.content) as CrossSection);
}

/** The peers as of the last night; NO_CROSS_SECTION before the first. */
export async function latestCrossSection(tx: Transaction): Promise<CrossSection> {
  const row = await selectOne<{ content: string }>(
    tx,
    'select content from cross_sections order by as_of desc, known_at desc, id desc limit 1',
  );
  return row ? (JSON.parse(row.content) as CrossSection) : NO_CROSS_SECTION;
}
