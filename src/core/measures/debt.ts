import { Decimal, ZERO } from '../money/decimal.ts';
import { balanceAt } from '../statements/flows.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import { bridgeFigure, bridgeSubtotal, type BridgeLine } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';

const BORROWINGS = [
  { line: 'short_term_debt', label: 'Short-term debt' },
  { line: 'senior_debt', label: 'Senior debt' },
  { line: 'junior_debt', label: 'Junior debt' },
  { line: 'shareholder_loans', label: 'Shareholder loans' },
] as const satisfies readonly { line: LineItemCode; label: string }[];
const LEASES = { line: 'lease_liabilities', label: 'Lease liabilities' } as const;

/**
 * Net debt = debt - the cash that may be netted: unrestricted cash, up to the agreement's cap.
 *
 * `restrictedCash` is what of `cash` is pledged. Same currency unit throughout. Source: methods.md A3.
 *
 * @example netDebt({ debt: decimal(40), cash: decimal(6), restrictedCash: ZERO, cashCap: decimal(5) }) // => 35
 */
export function netDebt({
  debt,
  cash,
  restrictedCash,
  cashCap,
}: {
  readonly debt: Decimal;
  readonly cash: Decimal;
  readonly restrictedCash: Decimal;
  readonly cashCap: Decimal | null;
}): Decimal {
  const unrestricted = cash.minus(restrictedCash);
  return debt.minus(cashCap === null ? unrestricted : Decimal.min(unrestricted, cashCap));
}

/** A debt measure and its way from the balance sheet. */
export interface MeasuredDebt {
  readonly reading: Reading;
  readonly bridge: readonly BridgeLine[];
}

/**
 * Borrowings on a day: short-term, senior and junior debt, shareholder loans, and leases where the definition
 * counts them. Shareholder loans count as debt because nothing recorded says that they are subordinated.
 *
 * Whole currency units. Missing where no debt line at all is there, or one that was carried before is left out.
 *
 * @example totalDebt(request).reading.value // => 45000000
 */
export function totalDebt({ book, date, definition }: MeasureRequest): MeasuredDebt {
  const lines = definition.leasesInDebt ? [...BORROWINGS, LEASES] : BORROWINGS;
  const parts = lines.map(({ line, label }) => ({
    label,
    sign: 1 as const,
    reading: balanceAt(book, line, date, 'optional'),
  }));
  const isGiven = parts.some(({ reading }) => reading.kind === 'value' && reading.inputs.length > 0);
  const reading = isGiven ? sumOfReadings(parts) : balanceAt(book, 'senior_debt', date);
  return {
    reading,
    bridge: [
      ...parts.flatMap(({ label, reading }) => bridgeFigure(label, reading)),
      ...bridgeSubtotal('Total debt', reading),
    ],
  };
}

/**
 * Total debt less unrestricted cash, as far as the definition nets it; the balance line `cash` is unrestricted.
 *
 * @example netDebtOn(request).reading.value // => 39000000
 */
export function netDebtOn(request: MeasureRequest): MeasuredDebt {
  const debt = totalDebt(request);
  const cash = balanceAt(request.book, 'cash', request.date);
  const both = sumOfReadings([
    { sign: 1, reading: debt.reading },
    { sign: -1, reading: cash },
  ]);
  if (both.kind !== 'value' || debt.reading.kind !== 'value' || cash.kind !== 'value')
    return { reading: both, bridge: debt.bridge };
  const value = netDebt({
    debt: debt.reading.value,
    cash: cash.value,
    restrictedCash: ZERO,
    cashCap: request.definition.cashNettingCap,
  });
  const reading: Reading = { kind: 'value', value, inputs: both.inputs };
  const netted: BridgeLine = {
    label: 'Cash that may be netted',
    amount: value.minus(debt.reading.value),
    kind: 'figure',
    inputs: cash.inputs,
  };
  return { reading, bridge: [...debt.bridge, netted, ...bridgeSubtotal('Net debt', reading)] };
}
