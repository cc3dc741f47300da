import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { NO_BOOK, type BookCrossSection } from '../../../core/bookCrossSection.ts';
import { finiteJson } from '../finiteJson.ts';
import { execute, selectOne } from '../sql.ts';
import { readCrossSection } from '../stored/crossSection.ts';

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
  build: (version: number) => BookCrossSection,
): Promise<BookCrossSection> {
  const { insertId } = await execute(
    tx,
    `insert into cross_sections (run_id, as_of, known_at, method_version, content)
     values (:runId, :asOf, :knownAt, :methodVersion, '{}')`,
    basis,
  );
  const crossSection = build(insertId);
  await execute(tx, 'update cross_sections set content = :content where id = :id', {
    id: insertId,
    content: finiteJson('the cross-section', crossSection),
  });
  return crossSection;
}

export async function findCrossSection(tx: Transaction, id: number): Promise<BookCrossSection | null> {
  const row = await selectOne<{ content: string }>(tx, 'select content from cross_sections where id = :id', {
    id,
  });
  return row && readCrossSection(row.content);
}

/** The peers as of the last night; NO_BOOK before the first. */
export async function latestCrossSection(tx: Transaction): Promise<BookCrossSection> {
  const row = await selectOne<{ content: string }>(
    tx,
    'select content from cross_sections order by as_of desc, known_at desc, id desc limit 1',
  );
  return row ? readCrossSection(row.content) : NO_BOOK;
}
