/** Section 7: what it takes for each test not to be met. */
import type { CovenantView } from '../../../contracts/borrowers.ts';
import type { SheetBlock, SheetCell, SheetColumn } from '../../../contracts/reviewSheet.ts';
import { plainDate } from '../../../core/calendar/plainDate.ts';
import { isShort } from '../../../core/covenants/covenantTest.ts';
import { laterLevels } from '../../../core/covenants/levels.ts';
import { OPERATOR_WORDS } from '../../../core/covenants/wording.ts';
import { decimal } from '../../../core/money/decimal.ts';
import { formatShare } from '../../../core/money/print.ts';
import { absent, dayCell, levelCell, moneyOrAbsent, notRecorded, shareOrAbsent, textCell } from './cells.ts';
import { covenantName, NOT_ASSESSED, shownTest, termsOf, type SheetMaterial } from './material.ts';

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
const SIDES: Readonly<
  Record<CovenantView['measure'], readonly [falls: string | null, rises: string | null]>
> = {
  'total-leverage': ['EBITDA', 'Debt'],
  'senior-leverage': ['EBITDA', 'Senior debt'],
  'net-leverage': ['EBITDA', 'Net debt'],
  'interest-cover': ['EBITDA', 'Interest'],
  'debt-service-cover': ['EBITDA', 'Debt service'],
  'fixed-charge-cover': ['EBITDA', 'Fixed charges'],
  'loan-to-value': ['Value', 'Loan'],
  'debt-yield': ['Net operating income', 'Loan'],
  'current-ratio': ['Current assets', 'Current liabilities'],
  'quick-ratio': ['Quick assets', 'Current liabilities'],
  'tangible-net-worth': ['Tangible net worth', null],
  gearing: ['Net worth', 'Debt'],
  'minimum-liquidity': ['Liquidity', null],
  'minimum-ebitda': ['EBITDA', null],
  'capital-expenditure': [null, 'Capital expenditure'],
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
  const ownSide = { share: headroom?.mayFall ?? null, money: headroom?.moneyLeft ?? null };
  const otherSide = { share: headroom?.otherSideShare ?? null, money: headroom?.otherSideMayRise ?? null };
  const later = covenant.laterLevels.find(({ outcome }) => isShort(outcome));
  const agreed = test && terms ? laterLevels(terms.levels, plainDate(test.testDate)) : [];
  return [
    textCell(covenantName(covenant)),
    ...sideCells(falls, covenant.currency, ownSide, nm),
    ...sideCells(
      rises,
      covenant.currency,
      falls === null ? ownSide : otherSide,
      falls === null ? nm : 'n.m.',
    ),
    laterCell(covenant, later, agreed.length > 0),
    later ? dayCell(later.from) : absent(''),
    notRecorded,
  ];
}

/** What may move, by which share and by how much money; empty where nothing stands on that side. */
const sideCells = (
  name: string | null,
  currency: string,
  { share, money }: { readonly share: string | null; readonly money: string | null },
  nm: string,
): readonly SheetCell[] =>
  name === null
    ? [absent(''), absent(''), absent('')]
    : [textCell(name), shareOrAbsent(share, nm), moneyOrAbsent(currency, money, 'n.m.')];

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
