import { err, ok, type Result } from '../result.ts';
import type { HeadroomRow } from './headroomRow.ts';
import { edge } from './windows.ts';

/** Fewer tests than this near the limit show nothing: the counts of the bins would be a handful each. */
export const FEWEST_NEAR_LIMIT = 100;
/** Near is within this share of the level on either side. */
export const NEAR_LIMIT = 0.1;

export interface TooFewNearLimit {
  readonly kind: 'too few tests near the limit';
  readonly needed: number;
  readonly given: number;
}

/** Tests that count, with those of them that have a headroom. */
export interface KeptRows {
  readonly rows: readonly HeadroomRow[];
  readonly headrooms: readonly number[];
  /** All of them, also those whose ratio has no meaning or that have net cash. */
  readonly n: number;
  readonly nearLimit: number;
}

/**
 * The rows that are not removed, refused where too few of them end near the limit.
 *
 * @example keptRows([]).error.needed // => 100
 */
export function keptRows(rows: readonly HeadroomRow[]): Result<KeptRows, TooFewNearLimit> {
  const kept = rows.filter(({ removal }) => removal === null);
  const headrooms = headroomsOf(kept);
  const [low, high] = [edge(-1, NEAR_LIMIT), edge(1, NEAR_LIMIT)];
  let nearLimit = 0;
  for (const headroom of headrooms) if (headroom >= low && headroom < high) nearLimit += 1;
  return nearLimit < FEWEST_NEAR_LIMIT
    ? err({ kind: 'too few tests near the limit', needed: FEWEST_NEAR_LIMIT, given: nearLimit })
    : ok({ rows: kept, headrooms, n: kept.length, nearLimit });
}

/**
 * The headrooms of those rows that have one.
 *
 * @example headroomsOf([{ headroom: 0.1 }, { headroom: null }]) // => [0.1]
 */
export function headroomsOf(rows: readonly Pick<HeadroomRow, 'headroom'>[]): readonly number[] {
  const headrooms: number[] = [];
  for (const { headroom } of rows) if (headroom !== null) headrooms.push(headroom);
  return headrooms;
}

/**
 * How many borrowers have a test that is not removed.
 *
 * @example borrowersOf([{ borrowerId: 1, removal: null }, { borrowerId: 2, removal: 'waived' }]) // => 1
 */
export function borrowersOf(rows: readonly Pick<HeadroomRow, 'borrowerId' | 'removal'>[]): number {
  const borrowers = new Set<number>();
  for (const { borrowerId, removal } of rows) if (removal === null) borrowers.add(borrowerId);
  return borrowers.size;
}
