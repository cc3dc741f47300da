/** What stands beside the number and is not hidden in it. */
import type { PreviousAssessment } from '../borrowerInputs.ts';
import { formatDay } from '../calendar/printDay.ts';
import { decimal } from '../money/decimal.ts';
import { formatScore } from '../money/print.ts';
import { revenueGrowth } from './comparedFigures.ts';
import type { PeerInputs } from './peerFigures.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import type { QuarterScore } from './score.ts';
import { percent } from './wording.ts';

/**
 * The remarks of the latest quarter end. Source: methods.md B5 (dampers) and B6.
 *
 * @example remarksOf(peer, quarterScore) // => ['The accounts of 30 Sep 2026 are management accounts, not audited.']
 */
export function remarksOf(peer: PeerInputs, score: QuarterScore): readonly string[] {
  const date = formatDay(peer.quarterEnd);
  return [
    peer.tie === 'does-not-tie' && `The accounts of ${date} do not tie; they are not scored.`,
    peer.tie === 'warning' && `The accounts of ${date} tie only roughly.`,
    peer.basis === 'management' && `The accounts of ${date} are management accounts, not audited.`,
    peer.basis === 'reviewed' && `The accounts of ${date} are reviewed, not audited.`,
    peer.derivedCashFlow &&
      'There is no cash flow statement: cash from operations is derived from the balance sheets.',
    peer.daysOnYear && 'There are no quarterly income statements: days are counted on the flows of the year.',
    growthRemark(peer),
    peer.acquisitionThisQuarter
      ? 'An acquisition closed in the quarter: receivable and inventory days are left out.'
      : peer.acquisitionInYear &&
        'There was an acquisition in the year: comparisons with the year before mix two groups.',
    peer.cashFlowPresentationChanged &&
      'The presentation of cash flows changed within the two years compared: no part of the score uses cash from operations until the year before is restated.',
    score.score !== null && peersRemark(score),
  ].filter((remark) => remark !== false);
}

function growthRemark(peer: PeerInputs): string | false {
  const growth = revenueGrowth(peer.figures);
  return (
    growth !== null &&
    growth > QUALITY_TABLE.fastGrowth &&
    `Revenue grew ${percent(growth)}: screens built on growth are left out, and fast growth alone doubles the chance of a low score.`
  );
}

function peersRemark({ sectorPeers, bookPeers, sectorWeight }: QuarterScore): string | false {
  if (sectorWeight >= 1) return false;
  const peers = sectorPeers === 1 ? '1 peer' : `${sectorPeers} peers`;
  return `Only ${peers} in the sector: the comparison leans ${percent(1 - sectorWeight)} on the whole book (${bookPeers} others).`;
}

/**
 * Whether a changed headline is news; null where there is nothing to compare or the quarter end is the same.
 *
 * @example moveRemark(61, '2026-09-30', { quarterEnd: '2026-06-30', headline: 58, band: null }, 10) // => 'Moved 3 points since 30 Jun 2026: under 10 points is not news.'
 */
export function moveRemark(
  headline: number | null,
  quarterEnd: string,
  previous: PreviousAssessment['quality'],
  newsFromPoints: number,
): string | null {
  if (headline === null || !previous || previous.headline === null || previous.quarterEnd >= quarterEnd)
    return null;
  const points = Math.abs(headline - previous.headline);
  return points < newsFromPoints
    ? `Moved ${formatScore(decimal(points), { beside: decimal(newsFromPoints) })} points since ${formatDay(previous.quarterEnd)}: under ${newsFromPoints} points is not news.`
    : null;
}
