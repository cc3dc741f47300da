/** Covers whose numerator is EBITDA less other cash items: methods.md A3. Paid items are positive here. */
import type { Decimal } from '../money/decimal.ts';
import { annualisedByMonths } from '../statements/periodLength.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import { adjustedEbitda, type Earnings } from './adjustedEbitda.ts';
import { annualised, annualisedRemark, type Lined } from './annualised.ts';
import { bridgeFigure, bridgeSubtotal } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import type { Measured } from './measured.ts';

/** One item of a side: what it is called, and whether it adds or takes away. */
export interface CashItem {
  readonly label: string;
  readonly sign: 1 | -1;
  readonly reading: Reading;
  /** What lies there on a day, which no more months would make more of. */
  readonly isBalance?: true;
}

/** One side of a cash cover by its items. */
export interface CashSide {
  readonly label: string;
  readonly items: readonly CashItem[];
}

/**
 * A cover out of adjusted EBITDA and the items of its two sides, both set to a year where the agreement annualises.
 *
 * @example cashCover(request, { cash: { label: 'Cash', items: [] }, charges: { label: 'Charges', items: [] } }).numerator.value // => 13000000
 */
export function cashCover(
  request: MeasureRequest,
  { cash, charges }: { readonly cash: CashSide; readonly charges: CashSide },
): Measured {
  const earnings = adjustedEbitda(request);
  const covers = sideOf(request, cash, earnings);
  const charge = sideOf(request, charges, null);
  return {
    numerator: covers.reading,
    denominator: charge.reading,
    earnings: annualised(request.months, '', { reading: earnings.reading, bridge: [] }).reading,
    addBacksTaken: ofYear(request, earnings.addBacksTaken),
    bridge: [...earnings.bridge, ...covers.bridge, ...charge.bridge],
    remarks: annualisedRemark(request.months),
  };
}

function sideOf({ months }: MeasureRequest, { label, items }: CashSide, earnings: Earnings | null): Lined {
  const balances = months === 12 ? [] : items.filter(({ isBalance }) => isBalance);
  const flows = items.filter((item) => !balances.includes(item));
  const parts = [...(earnings ? [{ sign: 1 as const, reading: earnings.reading }] : []), ...flows];
  const reading = sumOfReadings(parts);
  const year = annualised(months, `${label}, annualised`, {
    reading,
    bridge: [...linesOf(flows), ...bridgeSubtotal(label, reading)],
  });
  if (balances.length === 0) return year;
  const whole = sumOfReadings([{ sign: 1, reading: year.reading }, ...balances]);
  return {
    reading: whole,
    bridge: [...year.bridge, ...linesOf(balances), ...bridgeSubtotal(`${label} with what lay there`, whole)],
  };
}

const linesOf = (items: readonly CashItem[]) =>
  items.flatMap((item) => bridgeFigure(item.label, item.reading, item.sign));

const ofYear = ({ months }: MeasureRequest, amount: Decimal): Decimal =>
  months === 12 ? amount : annualisedByMonths(amount, months);

/**
 * Cash interest and scheduled principal; a bullet only where the agreement counts it.
 *
 * @example debtService({ cashInterest: decimal(2), scheduledPrincipal: decimal(3), bullet: ZERO }) // => 5
 */
export const debtService = ({
  cashInterest,
  scheduledPrincipal,
  bullet,
}: {
  readonly cashInterest: Decimal;
  readonly scheduledPrincipal: Decimal;
  /** What the agreement counts of final repayments; nought where it leaves them out. */
  readonly bullet: Decimal;
}): Decimal => cashInterest.plus(scheduledPrincipal).plus(bullet);
