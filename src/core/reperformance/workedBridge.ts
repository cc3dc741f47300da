import type { Covenant } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import type { BridgeLine } from '../measures/bridge.ts';
import { Decimal, decimal, ZERO } from '../money/decimal.ts';
import { figureFormula } from './workedFigure.ts';
import type { WorkedLine, WorkedRow } from './worked.ts';

/** Lines that stand beside the sum. */
const BESIDE = ['check', 'rate'];

/**
 * The bridge as formulas: figures out of statement lines, add-backs as recorded, what is over the cap out of the cap,
 * subtotals out of the rows above them.
 *
 * @example workedBridge({ bridge: [] }, covenant, []) // => []
 */
export function workedBridge(
  { bridge }: Pick<CovenantTest, 'bridge'>,
  covenant: Pick<Covenant, 'definition' | 'addBacks' | 'levels'>,
  lines: readonly WorkedLine[],
): readonly WorkedRow[] {
  const known = new Set(lines.map(({ key }) => key));
  const rows: WorkedRow[] = [];
  bridge.forEach((line, place) => {
    const common = {
      key: `bridge_${place + 1}`,
      label: line.label,
      unit: 'money' as const,
      value: line.amount,
      note: line.note ?? '',
    };
    const asRecorded = line.kind === 'add-back' || BESIDE.includes(line.kind) || isOfSchedule(line, covenant);
    const formula = asRecorded ? null : formulaOf(line, rows, bridge, covenant, known);
    rows.push({ ...common, formula, isOpen: formula === null && !asRecorded });
  });
  return rows;
}

/** A level as the schedule has it, which others are worked out from. */
const isOfSchedule = ({ inputs, amount }: BridgeLine, { levels }: Pick<Covenant, 'levels'>): boolean =>
  inputs.length === 0 && levels.some(({ level }) => level?.eq(amount));

const subtotalAbove = (above: readonly WorkedRow[], bridge: readonly BridgeLine[]): WorkedRow | null =>
  above.findLast((_, place) => bridge[place]!.kind === 'subtotal') ?? null;

function formulaOf(
  line: BridgeLine,
  above: readonly WorkedRow[],
  bridge: readonly BridgeLine[],
  covenant: Pick<Covenant, 'definition' | 'addBacks' | 'levels'>,
  known: ReadonlySet<string>,
): string | null {
  switch (line.kind) {
    case 'figure':
      return figureFormula(line, subtotalAbove(above, bridge), covenant, known);
    case 'subtotal':
      return sumAbove(line.amount, above, bridge);
    case 'disallowed':
      return overCap(line.amount, above, bridge, covenant);
    case 'add-back':
    case 'check':
    case 'rate':
      return null;
  }
}

/**
 * The rows since the last subtotal with it, without it, or all the rows since an earlier one: whichever comes to the
 * amount. Lines beside the sum are never in it.
 */
function sumAbove(
  amount: Decimal,
  above: readonly WorkedRow[],
  bridge: readonly BridgeLine[],
): string | null {
  const counting = above.filter((_, place) => !BESIDE.includes(bridge[place]!.kind));
  const isSubtotal = new Set(above.filter((_, place) => bridge[place]!.kind === 'subtotal'));
  for (let from = counting.length - 1; from >= 0; from -= 1) {
    const rows = counting.slice(from).filter((row, place) => place === 0 || !isSubtotal.has(row));
    if (sumOf(rows).eq(amount)) return rows.map(({ key }) => `+{${key}}`).join('');
  }
  const subtotals = counting.filter((row) => isSubtotal.has(row));
  return sumOf(subtotals).eq(amount) && subtotals.length > 0
    ? subtotals.map(({ key }) => `+{${key}}`).join('')
    : null;
}

const sumOf = (rows: readonly WorkedRow[]): Decimal =>
  Decimal.sum(0, ...rows.map(({ value }) => (value instanceof Decimal ? value : ZERO)));

/** Capped add-backs beyond their limit, taken off: 'before' is c B, 'after' c / (1 - c) B. Source: methods.md A3. */
function overCap(
  amount: Decimal,
  above: readonly WorkedRow[],
  bridge: readonly BridgeLine[],
  { definition, addBacks }: Pick<Covenant, 'definition' | 'addBacks'>,
): string | null {
  const { addBackCap: cap, addBackCapBasis: basis } = definition;
  const earnings = subtotalAbove(above, bridge);
  if (!cap || !earnings || !(earnings.value instanceof Decimal)) return null;
  const taken = above.filter((_, place) => bridge[place]!.kind === 'add-back');
  const isCapped = (row: WorkedRow) =>
    addBacks.some(({ label, amount: of, capped }) => capped && label === row.label && of.eq(row.value ?? 0));
  const capped = taken.filter(isCapped);
  const uncapped = taken.filter((row) => !isCapped(row));
  const share = basis === 'before' ? cap : cap.div(decimal(1).minus(cap));
  const base = earnings.value.plus(sumOf(uncapped));
  const over = Decimal.max(0, sumOf(capped).minus(Decimal.max(0, share.times(base))));
  if (!over.negated().eq(amount)) return null;
  const rowsOf = (rows: readonly WorkedRow[]) => rows.map(({ key }) => `+{${key}}`).join('');
  const shareOf = basis === 'before' ? cap.toFixed() : `${cap.toFixed()}/(1-${cap.toFixed()})`;
  return `-MAX(0,(${rowsOf(capped)})-MAX(0,${shareOf}*({${earnings.key}}${rowsOf(uncapped)})))`;
}
