/** Section 18: waivers, resets and cures of every covenant, with how many cures are used. */
import type { CovenantView } from '../../../contracts/borrowers.ts';
import type { SheetBlock, SheetCell, SheetColumn } from '../../../contracts/reviewSheet.ts';
import { dayText } from '../../../core/calendar/printDay.ts';
import type { Covenant } from '../../../core/covenants/covenant.ts';
import { METHOD_WORDS } from '../../../core/covenants/cures.ts';
import { levelInWords, OPERATOR_WORDS } from '../../../core/covenants/wording.ts';
import { formatMoney } from '../../../core/money/print.ts';
import { absent, dayCell, textCell } from './cells.ts';
import { NOT_ASSESSED, termsOf, type SheetMaterial } from './material.ts';

const COLUMNS: readonly SheetColumn[] = [
  { key: 'covenant', label: 'Covenant', span: 4 },
  { key: 'what', label: 'What', span: 2 },
  { key: 'of', label: 'Of', span: 2 },
  { key: 'on', label: 'On', span: 2 },
  { key: 'terms', label: 'Terms', span: 10 },
];

export function rightsSection(material: SheetMaterial): readonly SheetBlock[] {
  const { covenants } = material.view;
  if (covenants.length === 0) return [{ kind: 'paragraph', text: NOT_ASSESSED }];
  const agreed = covenants.filter(({ isOurs }) => !isOurs);
  const rows = agreed.flatMap((covenant) => {
    const terms = termsOf(material, covenant);
    return terms ? [...waiverRows(terms), ...resetRows(terms), ...cureRows(terms)] : [];
  });
  const table: SheetBlock =
    rows.length === 0
      ? { kind: 'paragraph', text: 'No waiver, reset or cure is recorded.' }
      : { kind: 'table', caption: 'Waivers, resets and cures', columns: COLUMNS, rows };
  const used = agreed.flatMap(usedLine);
  return [table, ...(used.length === 0 ? [] : [{ kind: 'list' as const, lines: used }])];
}

const waiverRows = ({ name, waivers }: Covenant): readonly (readonly SheetCell[])[] =>
  waivers.map(({ testDate, grantedOn, until, conditions }) => [
    textCell(name),
    textCell('waiver'),
    dayCell(testDate),
    dayCell(grantedOn),
    textCell(
      `${until === null ? 'without end' : `until ${dayText(until)}`}${conditions === '' ? '' : `: ${conditions}`}`,
    ),
  ]);

const resetRows = ({ name, levels, measure, operator }: Covenant): readonly (readonly SheetCell[])[] =>
  levels
    .filter(({ isReset }) => isReset)
    .map(({ from, level }) => [
      textCell(name),
      textCell('reset'),
      dayCell(from),
      absent(''),
      textCell(
        level === null
          ? 'covenant holiday'
          : `${OPERATOR_WORDS[operator]} ${levelInWords(measure, level)}; past tests keep their level`,
      ),
    ]);

const cureRows = ({ name, currency, cures }: Covenant): readonly (readonly SheetCell[])[] =>
  cures.map(({ quarterEnd, receivedOn, amount, method }) => [
    textCell(name),
    textCell('equity cure'),
    dayCell(quarterEnd),
    dayCell(receivedOn),
    textCell(`${currency} ${formatMoney(amount)} as ${METHOD_WORDS[method]}`),
  ]);

/** How many cures are used, as of the latest test; nothing where the agreement gives no right. */
const usedLine = ({ name, cure }: CovenantView): readonly string[] =>
  cure?.method
    ? [
        `${name}: ${cure.usedInFour} of ${cure.mostInFour ?? 0} cures used in four quarters, ${cure.usedInLife} of ${cure.mostInLife ?? 0} over the life${cure.periodEnds ? `; cure period until ${dayText(cure.periodEnds)}` : ''}.`,
      ]
    : [];
