import { formatDay } from '../calendar/printDay.ts';
import type { Reading } from '../statements/reading.ts';
import { bridgeFigure } from './bridge.ts';
import { latestValuation } from './collateral.ts';
import { loanOn } from './debt.ts';
import type { MeasureRequest } from './definition.ts';
import { WITHOUT_EARNINGS, type Measure } from './measured.ts';
import { balanceIn } from './readLines.ts';
import { valuationTooOld } from './valuation.ts';

/** The loan over the latest valuation, which must be young enough for the agreement. Source: methods.md A3 and A4. */
export const loanToValue: Measure = {
  code: 'loan-to-value',
  label: 'Loan to value',
  unit: 'share',
  shape: 'burden',
  earningsSide: null,
  withoutCharge: 'met',
  words: { subject: 'Value', otherSide: 'loan', carrier: 'value', charge: 'loan' },
  measure: (request) => {
    const loan = loanOn(request);
    const { value, label } = valueOn(request);
    return {
      numerator: loan.reading,
      denominator: value,
      bridge: [...loan.bridge, ...bridgeFigure(label, value)],
      ...WITHOUT_EARNINGS,
    };
  },
};

/** No value, none above nought and one that is too old cannot be tested: a loan is not held against a guess. */
function valueOn(request: MeasureRequest): { readonly value: Reading; readonly label: string } {
  const { book, date, definition } = request;
  const valuation = latestValuation(book, date);
  const label = valuation ? `Valuation of ${formatDay(valuation.valuedOn)}` : 'Valuation';
  if (!valuation)
    return {
      label,
      value: { kind: 'missing', missing: [{ line: 'collateral_value', periodEnd: date, months: 0 }] },
    };
  const value = balanceIn(request, 'collateral_value', valuation.statement.periodEnd);
  if (value.kind !== 'value') return { label, value };
  const mostMonths = definition.valuationMaxAgeMonths;
  const tooOld =
    mostMonths === null
      ? null
      : valuationTooOld({ valuationDate: valuation.valuedOn, testDate: date, mostMonths });
  const reason = tooOld ?? (value.value.gt(0) ? null : 'valuation not positive');
  return {
    label,
    value: reason === null ? value : { kind: 'not-meaningful', reason, inputs: value.inputs },
  };
}
