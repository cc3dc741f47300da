/** The whole book on one night: the peers' standing, the patterns, and how ratios changed. Plain JSON, stored. */
import type { BookMember } from './bookMember.ts';
import { projectionRecord, type ProjectionRecord } from './outlook/backTest.ts';
import type { RatioSeries } from './outlook/ratioSeries.ts';
import { patternStanding, type PatternStanding } from './patterns/patternStanding.ts';
import { buildCrossSection, type CrossSection } from './quality/crossSection.ts';

export interface BookCrossSection extends CrossSection {
  /** Null before the first night. */
  readonly patterns: PatternStanding | null;
  readonly ratios: readonly RatioSeries[];
  /** What was said of past tests, against what happened; null until the night has looked back. */
  readonly projectionRecord: ProjectionRecord | null;
}

/** Before the first night there are no peers: what rests on them says so. */
export const NO_BOOK: BookCrossSection = {
  version: 0,
  quarters: [],
  patterns: null,
  ratios: [],
  projectionRecord: null,
};

/**
 * What every borrower is held against, out of what each brought.
 *
 * @example bookCrossSection([], 1).version // => 1
 */
export function bookCrossSection(members: readonly BookMember[], version: number): BookCrossSection {
  const ratios = members.flatMap((member) => member.ratios);
  return {
    ...buildCrossSection(
      members.flatMap(({ peers }) => peers),
      version,
    ),
    patterns: patternStanding(members.flatMap(({ headrooms }) => headrooms)),
    ratios,
    projectionRecord: null,
  };
}

/**
 * The same with what was said of past tests, by the changes before them, against what happened: once a night, because
 * it goes over every quarter end.
 *
 * @example lookedBack(bookCrossSection([], 1)).projectionRecord?.horizons.length // => 4
 */
export const lookedBack = (crossSection: BookCrossSection): BookCrossSection => ({
  ...crossSection,
  projectionRecord: projectionRecord(crossSection.ratios),
});
