/** What the leverage measures have in common: debt over adjusted EBITDA, and what other rates would make of it. */
import { formatRatio } from '../money/print.ts';
import type { Decimal } from '../money/decimal.ts';
import { annualEarnings } from './adjustedEbitda.ts';
import { annualisedRemark, type Lined } from './annualised.ts';
import type { MeasureRequest } from './definition.ts';
import { ebitdaIn } from './ebitda.ts';
import type { Measure, Measured } from './measured.ts';
import { translationInto } from './translation.ts';

type DebtOn = (request: MeasureRequest) => Lined;

/**
 * A leverage measure out of its debt: at most so many times adjusted EBITDA. Source: methods.md A3 and A4.
 *
 * @example leverage({ code: 'net-leverage', label: 'Net leverage', burden: 'net debt', debtOn: () => ({ reading: { kind: 'missing', missing: [] }, bridge: [] }) }).shape // => 'burden'
 */
export const leverage = ({
  code,
  label,
  burden,
  debtOn,
}: Pick<Measure, 'code' | 'label'> & { readonly burden: string; readonly debtOn: DebtOn }): Measure => ({
  code,
  label,
  unit: 'times',
  shape: 'burden',
  earningsSide: 'denominator',
  withoutCharge: 'net cash',
  words: { subject: 'EBITDA', otherSide: burden, carrier: 'earnings', charge: 'charge' },
  measure: (request) => leverageOf(request, debtOn),
});

function leverageOf(request: MeasureRequest, debtOn: DebtOn): Measured {
  const [debt, earnings] = [debtOn(request), annualEarnings(request)];
  return {
    numerator: debt.reading,
    denominator: earnings.reading,
    earnings: earnings.reading,
    addBacksTaken: earnings.addBacksTaken,
    bridge: [...earnings.bridge, ...debt.bridge],
    remarks: [...annualisedRemark(request.months), ...gapOfRates(request, debtOn)],
  };
}

/**
 * Debt at the closing rate over earnings at average rates opens a gap that no business stands behind: the ratio in
 * the statements' own currency is said beside the tested one, both before add-backs, which have one currency only.
 */
function gapOfRates(request: MeasureRequest, debtOn: DebtOn): readonly string[] {
  const [rate] = request.translation.used();
  if (!rate) return [];
  const own = { ...request, translation: translationInto(rate.from, []) };
  const [before, after] = [beforeAddBacks(own, debtOn), beforeAddBacks(request, debtOn)];
  if (!before || !after) return [];
  return [
    `before add-backs ${formatRatio(after)} in ${rate.to}, ${formatRatio(before)} in ${rate.from}: the difference is the rates`,
  ];
}

function beforeAddBacks(request: MeasureRequest, debtOn: DebtOn): Decimal | null {
  const [debt, { ebitda }] = [debtOn(request).reading, ebitdaIn(request)];
  if (debt.kind !== 'value' || ebitda.kind !== 'value' || ebitda.value.lte(0)) return null;
  return debt.value.div(ebitda.value.times(12).div(request.months));
}
