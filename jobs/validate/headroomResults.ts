/** What the product's gate, ranking and list make of a simulated book of tests, beside a plain count. */
import { patternLists } from '#core/patterns/patternLists.ts';
import { rankAuc } from '#core/statistics/rankAuc.ts';
import { headroomBook, type HeadroomCell, type TestedBorrower } from './headroomBook.ts';

export interface ListResult {
  readonly listed: number;
  /** Those of the listed that lift nothing by nature, and those without one lifted test, lifters or not. */
  readonly falselyListed: number;
  readonly neverLifted: number;
  /** Of the lifters, and of those that lifted twice at least. */
  readonly found: number;
  readonly foundOfRepeated: number;
}

export interface HeadroomResult {
  readonly lifters: number;
  readonly repeatedLifters: number;
  readonly isGateOpen: boolean;
  /** The list as published: none behind a closed gate. */
  readonly published: ListResult;
  /** Everybody with three tests just inside the limit, which is what counting by hand comes to. */
  readonly counted: ListResult;
  /** Area under the curve of lifters against others; null in a book without lifters. */
  readonly areas: { readonly ranking: number; readonly count: number } | null;
}

const JUST_INSIDE = 0.02;
const COUNTED_FROM = 3;

export function headroomResult(seed: number, place: number, cell: HeadroomCell): HeadroomResult {
  const borrowers = headroomBook(seed, place, cell);
  const lists = patternLists(borrowers.flatMap(({ rows }) => rows));
  const ranking = lists.rankings[0]!.ranking;
  const localFdr = new Map(ranking.series.map(({ id, localFdr }) => [id.borrowerId, localFdr]));
  const published = new Set(
    lists.published.flatMap(({ series }) => series.map(({ borrowerId }) => borrowerId)),
  );
  const counts = borrowers.map(countInside);
  const isLifter = borrowers.map(({ role }) => role === 'lifter');
  const area = (scores: readonly number[]): number | null => {
    const auc = rankAuc(scores, isLifter);
    return auc.ok ? auc.value.estimate : null;
  };
  const ours = area(borrowers.map(({ borrowerId }) => -localFdr.get(borrowerId)!));
  const plain = area(counts);
  return {
    lifters: borrowers.filter(({ role }) => role === 'lifter').length,
    repeatedLifters: borrowers.filter(({ lifted }) => lifted >= 2).length,
    isGateOpen: lists.gates.some(({ isOpen }) => isOpen),
    published: listResult(borrowers, ({ borrowerId }) => published.has(borrowerId)),
    counted: listResult(borrowers, (_, k) => counts[k]! >= COUNTED_FROM),
    areas: ours === null || plain === null ? null : { ranking: ours, count: plain },
  };
}

const countInside = ({ rows }: TestedBorrower): number =>
  rows.filter(
    ({ headroom, removal }) =>
      removal === null && headroom !== null && headroom >= 0 && headroom < JUST_INSIDE,
  ).length;

function listResult(
  borrowers: readonly TestedBorrower[],
  isListed: (borrower: TestedBorrower, place: number) => boolean,
): ListResult {
  const listed = borrowers.filter(isListed);
  return {
    listed: listed.length,
    falselyListed: listed.filter(({ role }) => role !== 'lifter').length,
    neverLifted: listed.filter(({ lifted }) => lifted === 0).length,
    found: listed.filter(({ role }) => role === 'lifter').length,
    foundOfRepeated: listed.filter(({ lifted }) => lifted >= 2).length,
  };
}
