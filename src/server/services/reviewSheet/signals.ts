/** Section 16: what was signalled, what is open, what was closed and why. */
import type { SheetBlock, SheetCell, SheetColumn } from '../../../contracts/reviewSheet.ts';
import { CLOSING_REASONS } from '../../../core/alerts/alert.ts';
import type { SignalRecord } from '../../db/repositories/reviewSheets.ts';
import { absent, dayCell, textCell, textOrNotRecorded } from './cells.ts';
import type { SheetMaterial } from './material.ts';

/** One more is asked for, so that the sheet can say that it does not print all. */
export const SIGNALS_MOST = 60;

const OPEN_COLUMNS: readonly SheetColumn[] = [
  { key: 'kind', label: 'Signal', span: 3 },
  { key: 'severity', label: 'Severity', span: 1 },
  { key: 'sentence', label: 'What was found', span: 9 },
  { key: 'raised', label: 'Raised', span: 1 },
  { key: 'state', label: 'State', span: 2 },
  { key: 'owner', label: 'Owner', span: 3, under: 'state' },
  { key: 'due', label: 'Due', span: 1, under: 'raised' },
];

const CLOSED_COLUMNS: readonly SheetColumn[] = [
  { key: 'kind', label: 'Signal', span: 3 },
  { key: 'sentence', label: 'What was found', span: 5 },
  { key: 'raised', label: 'Raised', span: 1 },
  { key: 'closed', label: 'Closed', span: 1, under: 'raised' },
  { key: 'reason', label: 'Reason', span: 4 },
  { key: 'text', label: 'In words', span: 4, under: 'reason' },
  { key: 'by', label: 'By', span: 2 },
];

export function signalsSection({ signals }: SheetMaterial): readonly SheetBlock[] {
  const shown = signals.slice(0, SIGNALS_MOST);
  const open = shown.filter(({ isOpen }) => isOpen === 1);
  const closed = shown.filter(({ isOpen }) => isOpen !== 1);
  return [
    tableOr('No signal is open.', 'Open', OPEN_COLUMNS, open.map(openRow)),
    tableOr(
      'None was closed.',
      'Closed; no earlier sheet is recorded',
      CLOSED_COLUMNS,
      closed.map(closedRow),
    ),
    ...(signals.length > SIGNALS_MOST
      ? [
          {
            kind: 'paragraph' as const,
            text: `The ${SIGNALS_MOST} that matter most are printed; there are more.`,
          },
        ]
      : []),
  ];
}

const tableOr = (
  nothing: string,
  caption: string,
  columns: readonly SheetColumn[],
  rows: readonly (readonly SheetCell[])[],
): SheetBlock =>
  rows.length === 0 ? { kind: 'paragraph', text: nothing } : { kind: 'table', caption, columns, rows };

const openRow = (signal: SignalRecord): readonly SheetCell[] => [
  textCell(signal.kind),
  textCell(signal.severity),
  textCell(signal.sentence),
  instantCell(signal.raisedAt),
  textCell(signal.state === 'raised' ? 'not taken yet' : signal.state),
  textCell(signal.ownerName),
  dayCell(signal.dueOn),
];

function closedRow(signal: SignalRecord): readonly SheetCell[] {
  const reason = CLOSING_REASONS.find(({ code }) => code === signal.closingReason);
  const byItself = signal.closedBy === null;
  return [
    textCell(signal.kind),
    textCell(signal.sentence),
    instantCell(signal.raisedAt),
    signal.closedAt ? instantCell(signal.closedAt) : absent('–'),
    byItself ? textCell('closed by itself: the condition is gone') : textOrNotRecorded(reason?.label ?? null),
    byItself ? absent('–') : textOrNotRecorded(signal.closingText),
    byItself ? absent('nobody') : textCell(signal.closedBy),
  ];
}

/** The day in UTC: the workbook's columns are days. */
const instantCell = (instant: Date): SheetCell => dayCell(instant.toISOString().slice(0, 10));
