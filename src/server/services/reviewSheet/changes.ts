/** Section 3: at most five lines, each with number and date. There is no earlier sheet yet, so tests are held against the ones before. */
import type { CovenantView, TestView } from '../../../contracts/borrowers.ts';
import type { SheetBlock } from '../../../contracts/reviewSheet.ts';
import { WATCHLIST_GRADES } from '../../../contracts/watchlist.ts';
import { addMonthsToMonthEnd, plainDate } from '../../../core/calendar/plainDate.ts';
import { dayText } from '../../../core/calendar/printDay.ts';
import { levelInWords, OPERATOR_WORDS, testedInWords } from '../../../core/covenants/wording.ts';
import { decimal, type Decimal } from '../../../core/money/decimal.ts';
import { formatScore, formatShare } from '../../../core/money/print.ts';
import { headlineOf } from '../../../core/quality/headline.ts';
import { QUALITY_TABLE } from '../../../core/quality/qualityTable.ts';
import type { ReportingQuality } from '../../../core/quality/score.ts';
import { covenantName, type SheetMaterial } from './material.ts';

const LINES_MOST = 5;

interface TestMove {
  readonly covenant: CovenantView;
  readonly latest: TestView;
  readonly before: TestView;
}

export function changesSection(material: SheetMaterial): readonly SheetBlock[] {
  const moves = material.view.covenants.flatMap(testMove);
  const since = moves
    .map(({ before }) => before.testDate)
    .sort()
    .at(-1);
  const outcomes = moves.filter(({ latest, before }) => latest.outcome !== before.outcome);
  const others = moves.filter((move) => !outcomes.includes(move)).toSorted(byLargestMove);
  const facts = [qualityLine(material), ...restatedLines(material, since), watchlistLine(material, since)];
  const said = facts.filter((line) => line !== null);
  const room = Math.max(0, LINES_MOST - outcomes.length - said.length);
  const all = [...outcomes.map(moveLine), ...others.slice(0, room).map(moveLine), ...said];
  const lines = all.slice(0, LINES_MOST);
  const unsaid = all.length - lines.length + Math.max(0, others.length - room);
  return [
    {
      kind: 'paragraph',
      text: `Since the previous test date${since === undefined ? '' : ` (${dayText(since)})`}; no earlier sheet is recorded.`,
    },
    lines.length === 0
      ? { kind: 'paragraph', text: 'Nothing to hold against: there are no two tests yet.' }
      : { kind: 'list', lines },
    ...(unsaid === 0
      ? []
      : [
          {
            kind: 'paragraph' as const,
            text: `${unsaid} smaller ${unsaid === 1 ? 'move stands' : 'moves stand'} in section 6.`,
          },
        ]),
  ];
}

/** The latest test that says something with the one before it. */
function testMove(covenant: CovenantView): readonly TestMove[] {
  const [before, latest] = covenant.tests.filter(({ outcome }) => outcome !== 'awaiting figures').slice(-2);
  return before && latest ? [{ covenant, latest, before }] : [];
}

const moved = ({ latest, before }: TestMove): Decimal | null =>
  latest.mayFall === null || before.mayFall === null
    ? null
    : decimal(latest.mayFall).minus(before.mayFall).abs();

function byLargestMove(one: TestMove, other: TestMove): number {
  const [a, b] = [moved(one), moved(other)];
  if (a === null || b === null) return a === b ? 0 : a === null ? 1 : -1;
  return b.comparedTo(a);
}

const moveLine = ({ covenant, latest, before }: TestMove): string =>
  `${covenantName(covenant)}, ${dayText(latest.testDate)}: ${saidOf(covenant, latest)}. ${dayText(before.testDate)}: ${saidOf(covenant, before)}.`;

/** '3.47x, at most 3.50x: met, thin, earnings may fall 1.0 %' */
function saidOf({ measure, operator, fallOf }: CovenantView, test: TestView): string {
  const level = test.level === null ? null : decimal(test.level);
  const result = test.tested === null ? 'no ratio' : testedInWords(measure, decimal(test.tested), level);
  const limit = level ? `, ${OPERATOR_WORDS[operator]} ${levelInWords(measure, level)}` : '';
  const share = test.mayFall === null ? null : decimal(test.mayFall);
  const what = fallOf === 'earnings' ? 'earnings' : 'the tested amount';
  if (share === null) return `${result}${limit}: ${test.outcome}`;
  const room = share.lt(0) ? `${formatShare(share.abs())} short` : `may fall ${formatShare(share)}`;
  return `${result}${limit}: ${test.outcome}, ${what} ${room}`;
}

/** The headline of the quarter end before, by the same rule out of today's peers. */
export function headlineBefore(
  quality: ReportingQuality,
): { readonly headline: number; readonly quarterEnd: string } | null {
  const last = quality.history.at(-2);
  if (!last) return null;
  const from = addMonthsToMonthEnd(last.quarterEnd, -(QUALITY_TABLE.headlineQuarters - 1) * 3);
  const within = quality.history.filter(
    ({ quarterEnd }) => quarterEnd >= from && quarterEnd <= last.quarterEnd,
  );
  const { headline } = headlineOf(within.map(({ score }) => score));
  return headline === null ? null : { headline, quarterEnd: last.quarterEnd };
}

function qualityLine({ view: { quality } }: SheetMaterial): string | null {
  const before = quality && headlineBefore(quality);
  if (!quality?.latest || quality.headline === null || !before) return null;
  const score = (points: number) => formatScore(decimal(points));
  return `Reporting quality, ${dayText(quality.latest.quarterEnd)}: ${score(quality.headline)}, ${quality.band}. ${dayText(before.quarterEnd)}: ${score(before.headline)}, by today's method and peers.`;
}

function restatedLines({ signals }: SheetMaterial, since: string | undefined): readonly string[] {
  return signals
    .filter(({ kind, factDate }) => kind === 'prior figures restated' && (!since || factDate >= since))
    .map(({ sentence, factDate }) => `Received ${dayText(factDate)}: ${sentence}`);
}

function watchlistLine({ view: { watchlist } }: SheetMaterial, since: string | undefined): string | null {
  if (!watchlist || (since && watchlist.enteredOn < since)) return null;
  const meaning = WATCHLIST_GRADES.find(({ code }) => code === watchlist.grade)?.meaning ?? '';
  return `On the watchlist since ${dayText(plainDate(watchlist.enteredOn))} at ${watchlist.grade} (${meaning}), proposed by ${watchlist.proposedBy}, decided by ${watchlist.decidedBy}: ${watchlist.reason}`;
}
