/** What the night says of the whole book beside its parts: plain JSON, read by the page of the book. */
import type { MeasureCode } from '../measures/measure.ts';
import type { BookPart } from './bookParts.ts';
import type { NearLineStanding, PatternStanding } from './patternStanding.ts';
import { digitTests, type DigitTests, type StatementDigits } from './statementDigits.ts';

export interface BookStanding extends Omit<PatternStanding, 'nearLine'> {
  /** Only of types whose gate is open. */
  readonly published: readonly NearLineStanding[];
  readonly digits: DigitTests;
  /** What the book can be looked at by. */
  readonly measures: readonly MeasureCode[];
  readonly sectors: readonly string[];
}

/**
 * The gates, the published lists, the digits, and by what the book was split.
 *
 * @example bookStanding({ window: { band: 0.02, gap: 0.04 }, gates: [], refused: [], types: [], nearLine: [] }, { first: [], second: [] }, []).measures // => []
 */
export function bookStanding(
  { nearLine, ...standing }: PatternStanding,
  digits: StatementDigits,
  parts: readonly BookPart[],
): BookStanding {
  return {
    ...standing,
    published: nearLine.filter(({ isPublished }) => isPublished),
    digits: digitTests(digits),
    measures: parts.flatMap(({ measure, sector }) => (sector === null && measure !== null ? measure : [])),
    sectors: parts
      .flatMap(({ measure, sector }) => (measure === null && sector !== null ? sector : []))
      .sort(),
  };
}
