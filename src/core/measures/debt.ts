import { Decimal, ZERO } from '../money/decimal.ts';
import { formatMoneyInFull } from '../money/print.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import type { Lined } from './annualised.ts';
import { bridgeFigure, bridgeSubtotal, type BridgeLine } from './bridge.ts';
import type { MeasureDefinition, MeasureRequest } from './definition.ts';
import { balanceIn } from './readLines.ts';

interface DebtLine {
  readonly line: LineItemCode;
  readonly label: string;
}

const SENIOR: readonly DebtLine[] = [
  { line: 'short_term_debt', label: 'Short-term debt' },
  { line: 'senior_debt', label: 'Senior debt' },
];
const JUNIOR: DebtLine = { line: 'junior_debt', label: 'Junior debt' };
const SHAREHOLDER_LOANS: DebtLine = { line: 'shareholder_loans', label: 'Shareholder loans' };
const LEASES: DebtLine = { line: 'lease_liabilities', label: 'Lease liabilities' };

/**
 * Net debt = debt - the cash that may be netted: unrestricted cash, up to the agreement's cap.
 *
 * `restrictedCash` is what of `cash` is pledged. Same currency unit throughout. Source: methods.md A3.
 *
 * @example netDebt({ debt: decimal(40), cash: decimal(6), restrictedCash: ZERO, cashCap: decimal(5) }) // => 35
 *
 * @public the method pages compute their examples with it
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

/**
 * Borrowings on a day: short-term, senior and junior debt, shareholder loans, and leases where the definition
 * counts them. Shareholder loans count as debt unless the agreement counts them as net worth, which says that they
 * are subordinated; rules frozen at signing know no lease liabilities.
 *
 * Whole currency units. Missing where no debt line at all is there, or one that was carried before is left out.
 *
 * @example totalDebt(request).reading.value // => 45000000
 */
export const totalDebt = (request: MeasureRequest): Lined =>
  debtOf(request, 'Total debt', [
    ...SENIOR,
    JUNIOR,
    ...(request.definition.shareholderLoansInNetWorth ? [] : [SHAREHOLDER_LOANS]),
    ...leasesOf(request.definition),
  ]);

/**
 * Debt that ranks first: short-term and senior debt, and leases where the definition counts them.
 *
 * @example seniorDebt(request).reading.value // => 45000000
 */
export const seniorDebt = (request: MeasureRequest): Lined =>
  debtOf(request, 'Senior debt in all', [...SENIOR, ...leasesOf(request.definition)]);

/**
 * The loan against a property: short-term and senior debt, at the rate of the day.
 *
 * @example loanOn(request).reading.value // => 45000000
 */
export const loanOn = (request: MeasureRequest): Lined => debtOf(atClosingRate(request), 'Loan', SENIOR);

/**
 * The same request with debt at the rate of the day, whatever leverage takes: for tests that hold no earnings.
 *
 * @example atClosingRate(request).definition.debtRate // => 'closing'
 */
export const atClosingRate = (request: MeasureRequest): MeasureRequest =>
  request.definition.debtRate === 'closing'
    ? request
    : { ...request, definition: { ...request.definition, debtRate: 'closing' } };

const leasesOf = ({ leasesInDebt, accounting }: MeasureDefinition): readonly DebtLine[] =>
  leasesInDebt && accounting === 'current' ? [LEASES] : [];

function debtOf(request: MeasureRequest, label: string, lines: readonly DebtLine[]): Lined {
  const { date, definition } = request;
  const parts = lines.map(({ line, label: lineLabel }) => ({
    label: lineLabel,
    sign: 1 as const,
    reading: balanceIn(request, line, date, 'optional', definition.debtRate),
  }));
  const isGiven = parts.some(({ reading }) => reading.kind !== 'missing' && reading.inputs.length > 0);
  const reading = isGiven ? sumOfReadings(parts) : balanceIn(request, 'senior_debt', date);
  return {
    reading,
    bridge: [
      ...parts.flatMap((part) => bridgeFigure(part.label, part.reading)),
      ...bridgeSubtotal(label, reading),
    ],
  };
}

/**
 * Total debt less unrestricted cash, as far as the definition nets it; the balance line `cash` is unrestricted. The
 * cap on netting is in the covenant's currency.
 *
 * @example netDebtOn(request).reading.value // => 39000000
 */
export function netDebtOn(request: MeasureRequest): Lined {
  const { date, definition } = request;
  const debt = totalDebt(request);
  const cash = balanceIn(request, 'cash', date, 'required', definition.debtRate);
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
    cashCap: definition.cashNettingCap,
  });
  const reading: Reading = { kind: 'value', value, inputs: both.inputs };
  const netted: BridgeLine = {
    label: 'Cash that may be netted',
    amount: value.minus(debt.reading.value),
    kind: 'figure',
    inputs: cash.inputs,
    ...(definition.cashNettingCap?.lt(cash.value)
      ? { note: `of ${formatMoneyInFull(cash.value)}, the agreement nets no more` }
      : {}),
  };
  return { reading, bridge: [...debt.bridge, netted, ...bridgeSubtotal('Net debt', reading)] };
}
