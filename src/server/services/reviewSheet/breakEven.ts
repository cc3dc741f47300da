/** Section 7: what it takes for each test not to be met. */
import type { CovenantView } from '../../../contracts/borrowers.ts';
import type { SheetBlock, SheetCell, SheetColumn } from '../../../contracts/reviewSheet.ts';
import { plainDate } from '../../../core/calendar/plainDate.ts';
import { isNotMet } from '../../../core/covenants/covenantTest.ts';
import { laterLevels } from '../../../core/covenants/levels.ts';
import { OPERATOR_WORDS } from '../../../core/covenants/wording.ts';
import { decimal } from '../../../core/money/decimal.ts';
import { formatShare } from '../../../core/money/print.ts';
import { absent, dayCell, levelCell, moneyOrAbsent, notRecorded, shareOrAbsent, textCell } from './cells.ts';
import { NOT_ASSESSED, shownTest, termsOf, type SheetMaterial } from './material.ts';

const COLUMNS: readonly SheetColumn[] = [
  { key: 'covenant', label: 'Covenant', span: 2 },
  { key: 'falls', label: 'May fall', span: 2 },
  { key: 'fallShare', label: 'by share', span: 1, numeric: true, under: 'falls' },
  { key: 'fallMoney', label: 'by money', span: 2, numeric: true, under: 'falls' },
  { key: 'rises', label: 'May rise', span: 2 },
  { key: 'riseShare', label: 'by share', span: 1, numeric: true, under: 'rises' },
  { key: 'riseMoney', label: 'by money', span: 2, numeric: true, under: 'rises' },
  { key: 'later', label: 'First later level not met', span: 4 },
  { key: 'laterFrom', label: 'from', span: 1, under: 'later' },
  { key: 'projection', label: 'Projection, base and downside', span: 3 },
];

/** What stands on each side of a measure. */
const SIDES: Readonly<Record<CovenantView['measure'], readonly [falls: string, rises: string | null]>> = {
  'total-leverage': ['EBITDA', 'Debt'],
  'net-leverage': ['EBITDA', 'Net debt'],
  'interest-cover': ['EBITDA', 'Interest'],
  'current-ratio': ['Current assets', 'Current liabilities'],
  'minimum-liquidity': ['Liquidity', null],
};

export function breakEvenSection(material: SheetMaterial): readonly SheetBlock[] {
  const { covenants } = material.view;
  if (covenants.length === 0) return [{ kind: 'paragraph', text: NOT_ASSESSED }];
  const isShort = covenants.some(({ headroom }) => headroom?.mayFall && decimal(headroom.mayFall).lt(0));
  return [
    {
      kind: 'table',
      caption: 'What it takes for each test not to be met, the other side unchanged',
      columns: COLUMNS,
      rows: covenants.map((covenant) => breakEvenRow(material, covenant)),
    },
    ...(isShort
      ? [{ kind: 'paragraph' as const, text: 'A figure below nought is what is short of the level.' }]
      : []),
    { kind: 'paragraph', text: 'Rise of the interest rate: not recorded.' },
  ];
}

function breakEvenRow(material: SheetMaterial, covenant: CovenantView): readonly SheetCell[] {
  const terms = termsOf(material, covenant);
  const test = shownTest(covenant);
  const { headroom } = covenant;
  const [falls, rises] = SIDES[covenant.measure];
  const nm = test?.reason ?? 'n.m.';
  const later = covenant.laterLevels.find(({ outcome }) => isNotMet(outcome));
  const agreed = test && terms ? laterLevels(terms.levels, plainDate(test.testDate)) : [];
  return [
    textCell(covenant.name),
    textCell(falls),
    shareOrAbsent(headroom?.mayFall ?? null, nm),
    moneyOrAbsent(covenant.currency, headroom?.moneyLeft ?? null, 'n.m.'),
    rises === null ? absent('') : textCell(rises),
    shareOrAbsent(headroom?.otherSideShare ?? null, rises === null ? '' : 'n.m.'),
    moneyOrAbsent(covenant.currency, headroom?.otherSideMayRise ?? null, rises === null ? '' : 'n.m.'),
    laterCell(covenant, later, agreed.length > 0),
    later ? dayCell(later.from) : absent(''),
    notRecorded,
  ];
}

function laterCell(
  covenant: CovenantView,
  later: CovenantView['laterLevels'][number] | undefined,
  isAgreed: boolean,
): SheetCell {
  if (!later)
    return absent(
      !isAgreed
        ? 'no later level agreed'
        : covenant.laterLevels.length === 0
          ? 'n.m.'
          : 'every later level met',
    );
  const cell = levelCell(covenant, OPERATOR_WORDS[covenant.operator], decimal(later.level));
  return later.mayFall === null
    ? cell
    : { ...cell, text: `${cell.text}, ${formatShare(decimal(later.mayFall).abs())} short` };
}
