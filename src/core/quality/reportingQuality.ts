import { NEVER_SCORED, type BorrowerInputs } from '../borrowerInputs.ts';
import { addMonthsToMonthEnd, type PlainDate } from '../calendar/plainDate.ts';
import type { Policy } from '../policy.ts';
import type { Books } from '../statements/statementBook.ts';
import { comparisonQuarterEnd } from './comparisonQuarterEnd.ts';
import type { CrossSection } from './crossSection.ts';
import { explain } from './explanations.ts';
import { bandAfter, headlineOf } from './headline.ts';
import { accountsAt } from './accountsAt.ts';
import { conditionsOf } from './conditions.ts';
import { figureSources } from './figureSources.ts';
import { peerInputsFrom, scoredBook } from './peerInputs.ts';
import { publishedMeasures } from './publishedMeasures.ts';
import { scoreQuarter, sectionOf } from './quarterScore.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import { moveRemark, remarksOf } from './remarks.ts';
import { QUALITY_BANDS, type QualityBand, type QuarterScore, type ReportingQuality } from './score.ts';

/**
 * How well the borrower's earnings are supported by cash and by what its peers show, 0 to 100, at its last quarter
 * ends known by `asOf`: the headline is the mean of the last three, with bands that move only by five points past a
 * line.
 *
 * The peers are those of the cross-section as it was built; the borrower's own earlier figures in it are left out.
 * It is no finding of misconduct, no default probability and no covenant result. No score has its reason. Source:
 * methods.md B6.
 *
 * @example reportingQuality(inputs, openBooks(inputs, '2026-11-30'), crossSection, POLICY_VERSION_1, '2026-11-30').provisional // => false
 */
export function reportingQuality(
  inputs: BorrowerInputs,
  books: Books,
  crossSection: CrossSection,
  policy: Policy,
  asOf: PlainDate,
): ReportingQuality {
  if (NEVER_SCORED.includes(inputs.legalForm))
    return unscored(`The legal form is ${inputs.legalForm}; this form is not scored.`);
  const book = scoredBook(books);
  const peers = peerInputsFrom(inputs, books);
  const latestPeer = peers.at(-1);
  if (!latestPeer) return unscored(`No balance sheet of a quarter end is known on ${asOf}.`);

  const history = peers.map((peer) => scoreQuarter(peer, crossSection));
  const latest = history.at(-1)!;
  const recent = withinHeadline(history, latest.quarterEnd);
  const { headline, provisional } = headlineOf(recent.map(({ score }) => score));
  const { lines, whatWouldChangeIt } = explain(latest, latestPeer);
  const previous = inputs.previous?.quality ?? null;
  const move = moveRemark(headline, latest.quarterEnd, previous, policy.qualityFell.points);
  return {
    headline,
    band: headline === null ? null : bandAfter(bandBefore(previous?.band ?? null), headline),
    provisional,
    noScoreReason: headline === null ? latest.noScoreReason : null,
    latest,
    history,
    explanations: lines,
    whatWouldChangeIt,
    remarks: [
      ...remarksOf(latestPeer, latest),
      ...conditionsOf(accountsAt(book, latest.quarterEnd), recent),
      ...(move === null ? [] : [move]),
    ],
    published: publishedMeasures({
      book,
      quarterEnd: latest.quarterEnd,
      peer: latestPeer,
      section: sectionOf(crossSection, latest.quarterEnd),
      currency: inputs.currency,
    }),
    // Filled in by the walk, which knows the tests and the patterns.
    beside: [],
    sources: figureSources(book, latestPeer),
  };
}

/** The last three quarter ends by the calendar: two for a half-yearly reporter, one for an annual one. */
function withinHeadline(
  history: readonly QuarterScore[],
  latestQuarterEnd: PlainDate,
): readonly QuarterScore[] {
  const monthsBack = (QUALITY_TABLE.headlineQuarters - 1) * 3;
  const from = addMonthsToMonthEnd(comparisonQuarterEnd(latestQuarterEnd), -monthsBack);
  return history.filter(({ quarterEnd }) => comparisonQuarterEnd(quarterEnd) >= from);
}

/** A band that an earlier method named is no ground for staying in it. */
const bandBefore = (band: string | null): QualityBand | null =>
  QUALITY_BANDS.find((each) => each === band) ?? null;

const unscored = (noScoreReason: string): ReportingQuality => ({
  headline: null,
  band: null,
  provisional: false,
  noScoreReason,
  latest: null,
  history: [],
  explanations: [],
  whatWouldChangeIt: null,
  remarks: [],
  published: [],
  beside: [],
  sources: [],
});
