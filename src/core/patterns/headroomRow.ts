import type { PlainDate } from '../calendar/plainDate.ts';
import { isMet, type CovenantTest } from '../covenants/covenantTest.ts';
import { hasResult } from '../covenants/latestLiveTest.ts';
import type { MeasureCode } from '../measures/measure.ts';

/** Why a test is left out of the counts: each of these can put a result just inside the line with no choice at all. */
export const REMOVALS = ['waived', 'reset', 'cured', 'first test'] as const;
export type Removal = (typeof REMOVALS)[number];

/** One test of one covenant at one date, as the pattern statistics take it. */
export interface HeadroomRow {
  readonly borrowerId: number;
  readonly covenantId: number;
  readonly measure: MeasureCode;
  readonly sector: string;
  readonly testDate: PlainDate;
  /**
   * Distance to the level as a share of it, negative on the failing side. Null where it has no meaning (earnings not
   * positive, net cash): such a test counts among all and lies outside every window.
   */
  readonly headroom: number | null;
  /** The same distance in the measure's own unit. */
  readonly distance: number | null;
  /** The tested ratio or amount. */
  readonly tested: number | null;
  /** Where the agreement rounds the ratio before comparing: its step, in the measure's own unit; 0.01 for two places. */
  readonly ratioStep: number | null;
  /** Tests in a row, up to the one before, that were met. */
  readonly metBefore: number;
  readonly removal: Removal | null;
}

/** What the rows of a covenant rest on besides its tests. */
export interface CovenantHistory {
  readonly borrowerId: number;
  readonly sector: string;
  /** Decimal places that the agreement rounds to; null compares unrounded. */
  readonly roundingPlaces: number | null;
  /** Oldest first. */
  readonly tests: readonly CovenantTest[];
  /** Test dates that were the first after an amendment of the level. */
  readonly resetOn: ReadonlySet<PlainDate>;
  /** Test dates for which an equity cure was paid in, whether it cured or not; a deemed cure says so by its outcome. */
  readonly curedOn: ReadonlySet<PlainDate>;
}

/**
 * The rows of one covenant. Tests without a result are no rows. A test that would be removed for two reasons has the
 * first of the list; removed tests still count in the runs of tests met, by what they came to without waiver.
 *
 * @example headroomRows({ borrowerId: 1, sector: 'metal goods', roundingPlaces: null, tests: [test, test], resetOn: new Set(), curedOn: new Set() })[1].metBefore // => 1
 */
export function headroomRows(history: CovenantHistory): readonly HeadroomRow[] {
  const { roundingPlaces } = history;
  const ratioStep = roundingPlaces === null ? null : Number(`1e-${roundingPlaces}`);
  let metBefore = 0;
  return history.tests.filter(hasResult).map((test, place) => {
    const row = {
      borrowerId: history.borrowerId,
      covenantId: test.covenantId,
      measure: test.measure,
      sector: history.sector,
      testDate: test.testDate,
      headroom: test.headroom.shareOfLevel?.toNumber() ?? null,
      distance: test.headroom.absolute?.toNumber() ?? null,
      tested: test.tested?.toNumber() ?? null,
      ratioStep,
      metBefore,
      removal: removalOf(test, place, history),
    };
    metBefore = isMet(test.underlyingOutcome) ? metBefore + 1 : 0;
    return row;
  });
}

function removalOf(test: CovenantTest, place: number, history: CovenantHistory): Removal | null {
  if (test.outcome === 'not met, waived') return 'waived';
  if (history.resetOn.has(test.testDate)) return 'reset';
  if (test.outcome === 'cured' || history.curedOn.has(test.testDate)) return 'cured';
  return place === 0 ? 'first test' : null;
}

/**
 * How many rows are left out, by reason.
 *
 * @example removedRows([{ removal: 'waived' }, { removal: null }]).waived // => 1
 */
export const removedRows = (
  rows: readonly Pick<HeadroomRow, 'removal'>[],
): Readonly<Record<Removal, number>> => {
  const counts = { waived: 0, reset: 0, cured: 0, 'first test': 0 };
  for (const { removal } of rows) if (removal !== null) counts[removal] += 1;
  return counts;
};
