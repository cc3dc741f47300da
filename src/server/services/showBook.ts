import type { Transaction } from 'sequelize';
import type { BookQuery, BookView, ListedCovenant } from '../../contracts/book.ts';
import { MEASURES } from '../../core/measures/index.ts';
import { FEWEST_BORROWERS } from '../../core/patterns/bookParts.ts';
import type { NearLineStanding } from '../../core/patterns/patternStanding.ts';
import { ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import type { DeskScope } from '../db/deskScope.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findBookPattern, latestBook, nameCovenants } from '../db/repositories/bookPatterns.ts';
import { listSectors } from '../db/repositories/sectors.ts';
import type { PersonActor } from './actor.ts';
import type { Outcome } from './write.ts';

/**
 * The book as the last night found it, or a part of it; null before the first night. Its figures are counts over all
 * desks; a borrower is named only to who may read it.
 */
export function showBook(actor: PersonActor, query: BookQuery): Promise<Outcome<BookView | null>> {
  const scope = deskScope(actor.person, 'read borrower');
  return inTransaction(async (tx) => ok(await bookView(tx, scope, query)));
}

async function bookView(
  tx: Transaction,
  scope: DeskScope,
  { measure = null, sector = null }: { measure?: BookQuery['measure'] | null; sector?: string | null },
): Promise<BookView | null> {
  const book = await latestBook(tx);
  if (!book) return null;
  const { published, measures, sectors, ...standing } = book.standing;
  const labels = new Map((await listSectors(tx)).map(({ code, label }) => [code, label]));
  const listed = await listedIn(tx, scope, published);
  const elsewhere = published.length - listed.length;
  return {
    asOf: book.asOf,
    dataCutOff: book.knownAt.toISOString(),
    methodVersion: book.methodVersion,
    measures: measures.map((code) => ({ code, name: MEASURES[code].label })),
    sectors: sectors.map((code) => ({ code, label: labels.get(code) ?? code })),
    pattern: await findBookPattern(tx, book.crossSectionId, { measure: measure ?? null, sector }),
    standing,
    listed,
    listedElsewhere: elsewhere < FEWEST_BORROWERS ? null : elsewhere,
    readsAll: scope === 'all',
  };
}

/** By rate, the lowest first; equal ones by name. */
async function listedIn(
  tx: Transaction,
  scope: DeskScope,
  published: readonly NearLineStanding[],
): Promise<readonly ListedCovenant[]> {
  const names = await nameCovenants(
    tx,
    scope,
    published.map(({ covenantId }) => covenantId),
  );
  return names
    .map((named) => {
      const evidence = published.find(({ covenantId }) => covenantId === named.covenantId);
      if (!evidence) throw new Error(`covenant ${named.covenantId} was not asked for`);
      const { measure, near, passing, expectedPassing, pAtLeast, localFdr, peers, peerCount } = evidence;
      return { ...named, measure, near, passing, expectedPassing, pAtLeast, localFdr, peers, peerCount };
    })
    .sort((a, b) => a.localFdr - b.localFdr);
}
