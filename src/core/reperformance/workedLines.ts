import { decimal, type Decimal } from '../money/decimal.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { lineItem } from '../statements/lineItems.ts';
import type { InputUsed } from '../statements/reading.ts';
import type { SourceCell, WorkedLine } from './worked.ts';

/** Units that sheets are kept in, and cents; either sign. */
const POWERS = [0, 3, 6, 9, -2].map((power) => decimal(10).pow(power));

/**
 * Every statement line behind a test, once, with its cells and what their unit is worth.
 *
 * @example workedLines(test, [])[0]?.factor // => null
 */
export function workedLines(
  test: Pick<CovenantTest, 'inputs' | 'bridge'>,
  cells: readonly (SourceCell & { readonly number: Decimal | null })[],
): readonly WorkedLine[] {
  const used = new Map<string, InputUsed>();
  for (const input of [...test.bridge.flatMap(({ inputs }) => inputs), ...test.inputs])
    used.set(lineKey(input), input);
  return [...used].map(([key, { statementId, line, amount, periodEnd, months }]) => {
    const own = cells
      .filter((cell) => cell.statementId === statementId && cell.line === line)
      .map((cell, place) => ({ ...cell, key: `${key}_${place + 1}` }));
    return {
      key,
      label: lineItem(line).label,
      periodEnd,
      months,
      cells: own,
      factor: factorOf(
        own.map(({ number }) => number),
        amount,
      ),
      amount,
    };
  });
}

/**
 * Names a line of a statement in formulas.
 *
 * @example lineKey({ statementId: 7, line: 'cash' }) // => 'line_7_cash'
 */
export const lineKey = ({ statementId, line }: Pick<InputUsed, 'statementId' | 'line'>): string =>
  `line_${statementId}_${line}`;

/** Null where the amount is not the cells' sum in some unit: it was entered, or put together by an answer. */
function factorOf(numbers: readonly (Decimal | null)[], amount: Decimal): Decimal | null {
  if (numbers.length === 0) return null;
  let sum = decimal(0);
  for (const number of numbers) {
    if (number === null) return null;
    sum = sum.plus(number);
  }
  if (sum.isZero()) return amount.isZero() ? decimal(1) : null;
  const signed = POWERS.flatMap((power) => [power, power.negated()]);
  return signed.find((power) => sum.times(power).eq(amount)) ?? null;
}
