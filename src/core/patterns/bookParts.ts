/** The whole book's patterns and those of its parts, by type of covenant and by sector, as the night keeps them. */
import type { MeasureCode } from '../measures/measure.ts';
import { err, type Result } from '../result.ts';
import { BOOK_PATTERN_SETTINGS, bookPattern, type BookPattern } from './bookPattern.ts';
import { groupedBy } from './groupedBy.ts';
import type { HeadroomRow } from './headroomRow.ts';
import { borrowersOf, type TooFewNearLimit } from './nearLimit.ts';

export interface TooFewBorrowers {
  readonly kind: 'too few borrowers';
  readonly needed: number;
  readonly given: number;
}

/** Figures of fewer borrowers would speak of one of them, and cross from desk to desk. */
export const FEWEST_BORROWERS = 5;

/** Null is every type, every sector. */
export interface BookPart {
  readonly measure: MeasureCode | null;
  readonly sector: string | null;
  readonly pattern: Result<BookPattern, TooFewNearLimit | TooFewBorrowers>;
}

/**
 * The pattern of the whole book, of each type of covenant, of each sector, and of each type in each sector. `seed`
 * draws the bootstraps.
 *
 * A part of fewer than five borrowers or a hundred tests near the limit is refused. Source: methods.md Part C 1 and 3.
 *
 * @example bookParts([], 1).map(({ pattern }) => pattern.ok) // => [false]
 */
export function bookParts(rows: readonly HeadroomRow[], seed: number): readonly BookPart[] {
  const part = (
    own: readonly HeadroomRow[],
    measure: MeasureCode | null,
    sector: string | null,
  ): BookPart => ({ measure, sector, pattern: patternOf(own, seed) });
  const byMeasure = [...groupedBy(rows, (row) => row.measure)];
  return [
    part(rows, null, null),
    ...byMeasure.map(([measure, own]) => part(own, measure, null)),
    ...[...groupedBy(rows, (row) => row.sector)].map(([sector, own]) => part(own, null, sector)),
    ...byMeasure.flatMap(([measure, ofMeasure]) =>
      [...groupedBy(ofMeasure, (row) => row.sector)].map(([sector, own]) => part(own, measure, sector)),
    ),
  ];
}

function patternOf(rows: readonly HeadroomRow[], seed: number): BookPart['pattern'] {
  const given = borrowersOf(rows);
  return given < FEWEST_BORROWERS
    ? err({ kind: 'too few borrowers', needed: FEWEST_BORROWERS, given })
    : bookPattern(rows, { ...BOOK_PATTERN_SETTINGS, seed });
}
