import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import type { MeasureCode } from '../../../core/measures/measure.ts';
import type { BookPart } from '../../../core/patterns/bookParts.ts';
import type { BookStanding } from '../../../core/patterns/bookStanding.ts';
import { inScope, type DeskScope } from '../deskScope.ts';
import { finiteJson } from '../finiteJson.ts';
import { insertRows } from '../insertRows.ts';
import { execute, select, selectOne } from '../sql.ts';

/** In the columns every type and every sector are empty text: part of the key, which null cannot be. */
const EVERY = '';

/** What a night found over the book, with each of its parts, beside its cross-section. */
export async function storeBookPatterns(
  tx: Transaction,
  crossSectionId: number,
  standing: BookStanding,
  parts: readonly BookPart[],
): Promise<void> {
  await execute(
    tx,
    'insert into book_standings (cross_section_id, content) values (:crossSectionId, :content)',
    { crossSectionId, content: finiteJson('the book', standing) },
  );
  await insertRows(
    tx,
    'book_patterns',
    parts.map(({ measure, sector, pattern }) => ({
      cross_section_id: crossSectionId,
      measure: measure ?? EVERY,
      sector: sector ?? EVERY,
      content: finiteJson(`the book's part ${measure} ${sector}`, pattern),
    })),
  );
}

export interface StoredBook {
  readonly crossSectionId: number;
  readonly asOf: PlainDate;
  readonly knownAt: Date;
  readonly methodVersion: string;
  readonly standing: BookStanding;
}

/** As of the last night that looked over the book; null before the first. */
export async function latestBook(tx: Transaction): Promise<StoredBook | null> {
  const row = await selectOne<Omit<StoredBook, 'standing'> & { content: string }>(
    tx,
    `select c.id as crossSectionId, c.as_of as asOf, c.known_at as knownAt, c.method_version as methodVersion, s.content
     from book_standings s join cross_sections c on c.id = s.cross_section_id
     order by c.as_of desc, c.known_at desc, c.id desc limit 1`,
  );
  if (!row) return null;
  const { content, ...stored } = row;
  return { ...stored, standing: JSON.parse(content) as BookStanding };
}

/** The pattern of one part; null where no test of the book belongs to it. */
export async function findBookPattern(
  tx: Transaction,
  crossSectionId: number,
  part: { readonly measure: MeasureCode | null; readonly sector: string | null },
): Promise<BookPart['pattern'] | null> {
  const row = await selectOne<{ content: string }>(
    tx,
    `select content from book_patterns
     where cross_section_id = :crossSectionId and measure = :measure and sector = :sector`,
    { crossSectionId, measure: part.measure ?? EVERY, sector: part.sector ?? EVERY },
  );
  return row && (JSON.parse(row.content) as BookPart['pattern']);
}

export interface NamedCovenant {
  readonly covenantId: number;
  readonly covenantName: string;
  readonly borrowerId: number;
  readonly borrowerName: string;
}

/** Those of the covenants whose borrower is in the person's reach, by name. */
export async function nameCovenants(
  tx: Transaction,
  scope: DeskScope,
  covenantIds: readonly number[],
): Promise<NamedCovenant[]> {
  const { sql, values } = inScope(scope);
  return select<NamedCovenant>(
    tx,
    `select c.id as covenantId, t.name as covenantName, b.id as borrowerId, b.name as borrowerName
     from covenants c join covenant_terms t on t.covenant_id = c.id and t.known_to is null and t.valid_to is null
     join borrowers b on b.id = c.borrower_id
     where c.id in (:covenantIds) and ${sql} order by b.name, b.id, t.name, c.id`,
    { covenantIds, ...values },
  );
}
