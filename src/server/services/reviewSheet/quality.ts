/** Sections 11 and 12: how well earnings are supported, and how often tests ended just passing. */
import type { CovenantView } from '../../../contracts/borrowers.ts';
import type { SheetBlock, SheetCell, SheetColumn } from '../../../contracts/reviewSheet.ts';
import { dayText } from '../../../core/calendar/printDay.ts';
import { NO_FINDING_OF_MISCONDUCT, POPULATION_NOT_BORROWER } from '../../../core/cautions.ts';
import { decimal } from '../../../core/money/decimal.ts';
import { formatShareLevel } from '../../../core/money/print.ts';
import type { QualityBlock, QuarterScore, ReportingQuality } from '../../../core/quality/score.ts';
import { absent, countCell, dayCell, pointsCell, shareCell, textCell } from './cells.ts';
import { headlineBefore } from './changes.ts';
import { NOT_ASSESSED, type SheetMaterial } from './material.ts';

const QUARTERS_SHOWN = 4;

export function qualitySection({ view: { quality } }: SheetMaterial): readonly SheetBlock[] {
  const caution: SheetBlock = { kind: 'caution', text: NO_FINDING_OF_MISCONDUCT };
  if (!quality) return [{ kind: 'paragraph', text: NOT_ASSESSED }, caution];
  const { latest, explanations, remarks, whatWouldChangeIt } = quality;
  const lines = [
    ...(explanations.length === 0 && quality.headline !== null
      ? ['No block draws the score down.']
      : explanations),
    ...(whatWouldChangeIt === null ? [] : [whatWouldChangeIt]),
    ...remarks,
  ];
  return [
    { kind: 'facts', facts: scoreFacts(quality) },
    ...(latest ? [blocksTable(latest), historyTable(quality)] : []),
    ...(lines.length === 0 ? [] : [{ kind: 'list' as const, lines }]),
    caution,
  ];
}

function scoreFacts(quality: ReportingQuality) {
  const { headline, band, provisional, noScoreReason, latest } = quality;
  const before = headlineBefore(quality);
  const facts: (readonly [string, SheetCell])[] = [
    ['Score, 0 to 100', headline === null ? absent('no score') : pointsCell(headline)],
    [
      'Band',
      headline === null
        ? absent(noScoreReason ?? 'no score')
        : textCell(`${band}${provisional ? ', provisional: one quarter end' : ''}`),
    ],
  ];
  if (before) facts.push([`Score at ${dayText(before.quarterEnd)}`, pointsCell(before.headline)]);
  if (latest)
    facts.push(
      ['Quarter end', dayCell(latest.quarterEnd)],
      ['Peers in the sector', countCell(latest.sectorPeers)],
      ['Others in the book', countCell(latest.bookPeers)],
      ['Sector in the comparison', shareCell(decimal(latest.sectorWeight))],
      ['Coverage, of 100', countCell(latest.coverage)],
      [
        'Cash flow',
        textCell(latest.derivedCashFlow ? 'derived from the balance sheets' : 'cash flow statement'),
      ],
    );
  return facts.map(([label, value]) => ({ label, value }));
}

const BLOCK_COLUMNS: readonly SheetColumn[] = [
  { key: 'block', label: 'Block', span: 4 },
  { key: 'weight', label: 'Weight', span: 2, numeric: true },
  { key: 'score', label: 'Score, 0 to 100', span: 3, numeric: true },
  { key: 'peers', label: 'Compared with, n', span: 3, numeric: true },
  { key: 'remark', label: 'Remark', span: 8 },
];

const blocksTable = (latest: QuarterScore): SheetBlock => ({
  kind: 'table',
  caption: `Blocks of the quarter end ${dayText(latest.quarterEnd)}: ${latest.score === null ? `no score, ${latest.noScoreReason}` : `score ${Math.round(latest.score)}`}`,
  columns: BLOCK_COLUMNS,
  rows: latest.blocks.map(blockRow),
});

const blockRow = (block: QualityBlock): readonly SheetCell[] => [
  textCell(sentence(block.name)),
  countCell(block.weight),
  block.risk === null ? absent('not available') : pointsCell(100 * (1 - block.risk)),
  countCell(block.peers),
  block.reason === null ? absent('') : textCell(block.reason),
];

const HISTORY_COLUMNS: readonly SheetColumn[] = [
  { key: 'quarterEnd', label: 'Quarter end', span: 4 },
  { key: 'score', label: 'Score of the quarter end', span: 5, numeric: true },
  { key: 'coverage', label: 'Coverage', span: 5, numeric: true },
  { key: 'peers', label: 'Peers in the sector', span: 6, numeric: true },
];

const historyTable = ({ history }: ReportingQuality): SheetBlock => ({
  kind: 'table',
  caption: `Last ${Math.min(history.length, QUARTERS_SHOWN)} quarter ends; the score above is the mean of the last three`,
  columns: HISTORY_COLUMNS,
  rows: history
    .slice(-QUARTERS_SHOWN)
    .toReversed()
    .map((quarter) => [
      dayCell(quarter.quarterEnd),
      quarter.score === null ? absent(`no score: ${quarter.noScoreReason}`) : pointsCell(quarter.score),
      countCell(quarter.coverage),
      countCell(quarter.sectorPeers),
    ]),
});

const PATTERN_COLUMNS: readonly SheetColumn[] = [
  { key: 'covenant', label: 'Covenant', span: 4 },
  { key: 'inBand', label: 'Tests just passing', span: 3, numeric: true },
  { key: 'ofLast', label: 'Of the last tests', span: 3, numeric: true },
  { key: 'run', label: 'In a row, up to the latest', span: 3, numeric: true },
  { key: 'dates', label: 'Just passing on', span: 7 },
];

export function justPassingSection({ view: { covenants }, policy }: SheetMaterial): readonly SheetBlock[] {
  const caution: SheetBlock = { kind: 'caution', text: POPULATION_NOT_BORROWER };
  const counted = covenants.filter(({ pattern }) => pattern !== null && pattern.ofLast > 0);
  if (counted.length === 0) return [{ kind: 'paragraph', text: NOT_ASSESSED }, caution];
  return [
    {
      kind: 'paragraph',
      text: `Just passing: within ${formatShareLevel(policy.justPassingBand)} of the level on the passing side, as a share of the level. An observation, nothing about chance. How the whole book stands at its limits: not recorded.`,
    },
    {
      kind: 'table',
      caption: 'How often each covenant ended just passing',
      columns: PATTERN_COLUMNS,
      rows: counted.map(patternRow),
    },
    caution,
  ];
}

function patternRow({ name, pattern, tests }: CovenantView): readonly SheetCell[] {
  const dates = tests.filter(({ justPassing }) => justPassing).map(({ testDate }) => dayText(testDate));
  const inBand = pattern?.inBand ?? 0;
  return [
    textCell(name),
    countCell(inBand),
    countCell(pattern?.ofLast ?? 0),
    countCell(pattern?.run ?? 0),
    inBand === 0 ? absent('none') : textCell(dates.slice(-inBand).join(', ')),
  ];
}

const sentence = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
