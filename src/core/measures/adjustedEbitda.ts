import { formatMoneyInFull, formatShareLevel } from '../money/print.ts';
import { annualisedByMonths } from '../statements/periodLength.ts';
import { Decimal, ZERO } from '../money/decimal.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import { addBacksWithin, allowAddBacks, type AllowedAddBacks } from './addBacks.ts';
import { annualised } from './annualised.ts';
import { bridgeFigure, bridgeSubtotal, type BridgeLine } from './bridge.ts';
import type { AddBack, MeasureDefinition, MeasureRequest } from './definition.ts';
import { ebitdaIn } from './ebitda.ts';
import { ebitdaChecks } from './ebitdaChecks.ts';
import { LEASE_RENT, leaseRentIn } from './leaseRent.ts';

export interface Earnings {
  /** Adjusted EBITDA, as the covenant defines it. */
  readonly reading: Reading;
  /** Add-backs taken, capped and uncapped together; nought where EBITDA is not known. */
  readonly addBacksTaken: Decimal;
  readonly bridge: readonly BridgeLine[];
}

/**
 * Adjusted EBITDA over the request's months up to the day, with the bridge from net income: impairment and the rent
 * of leases as the agreement counts them, then the add-backs, each with its reason, evidence and approver. The cap is
 * tested on all the months together, not quarter by quarter. Source: methods.md A3.
 *
 * @example adjustedEbitda({ ...request, addBacks: [buildAddBack('2026-09-30', 2e6)] }).reading.value // => 15000000
 */
export function adjustedEbitda(request: MeasureRequest): Earnings {
  const reported = ebitdaIn(request);
  const rent = leaseRentIn(request);
  const ebitda = rent
    ? sumOfReadings([
        { sign: 1, reading: reported.ebitda },
        { sign: -1, reading: rent },
      ])
    : reported.ebitda;
  const checks = reported.ebitda.kind === 'value' ? ebitdaChecks(request, reported.ebitda) : [];
  const bridge = [...reported.bridge, ...checks, ...(rent ? bridgeFigure(LEASE_RENT, rent, -1) : [])];
  const addBacks = addBacksWithin(request.months, request.addBacks, request.date);
  if (ebitda.kind !== 'value') return { reading: ebitda, addBacksTaken: ZERO, bridge };
  if (addBacks.length === 0)
    return {
      reading: ebitda,
      addBacksTaken: ZERO,
      bridge: rent ? [...bridge, ...bridgeSubtotal('Adjusted EBITDA', ebitda)] : bridge,
    };
  const { uncapped, allowance } = allowanceOf(request.definition, ebitda.value, addBacks);
  const adjusted: Reading = { kind: 'value', value: allowance.adjusted, inputs: ebitda.inputs };
  return {
    reading: adjusted,
    addBacksTaken: uncapped.plus(allowance.allowed),
    bridge: [
      ...bridge,
      ...addBacks.map(addBackLine),
      ...overCap(request.definition, allowance),
      ...bridgeSubtotal('Adjusted EBITDA', adjusted),
    ],
  };
}

/**
 * The same set to a year where the agreement annualises the test.
 *
 * @example annualEarnings({ ...request, months: 9 }).reading.value.toFixed(0) // => '13200000'
 */
export function annualEarnings(request: MeasureRequest): Earnings {
  const { reading, addBacksTaken, bridge } = adjustedEbitda(request);
  return {
    ...annualised(request.months, 'Annualised EBITDA', { reading, bridge }),
    addBacksTaken: request.months === 12 ? addBacksTaken : annualisedByMonths(addBacksTaken, request.months),
  };
}

function allowanceOf(
  { addBackCap, addBackCapBasis }: MeasureDefinition,
  ebitda: Decimal,
  addBacks: readonly AddBack[],
): { readonly uncapped: Decimal; readonly allowance: AllowedAddBacks } {
  const sumOf = (capped: boolean) =>
    Decimal.sum(0, ...addBacks.filter((one) => one.capped === capped).map(({ amount }) => amount));
  const uncapped = sumOf(false);
  const terms = { cap: addBackCap, basis: addBackCapBasis };
  return { uncapped, allowance: allowAddBacks({ ebitda, uncapped, capped: sumOf(true), terms }) };
}

const addBackLine = ({ label, amount, capped, reason, evidence, approvedBy }: AddBack): BridgeLine => ({
  label,
  amount,
  kind: 'add-back',
  inputs: [],
  note: [
    reason || 'no reason given',
    evidence || 'no evidence given',
    approvedBy === null ? 'not approved by a second person yet' : `approved by ${approvedBy}`,
    capped ? 'under the cap' : 'without cap',
  ].join('; '),
});

function overCap(
  { addBackCap, addBackCapBasis }: MeasureDefinition,
  { disallowed, limit }: AllowedAddBacks,
): readonly BridgeLine[] {
  if (disallowed.isZero() || limit === null || addBackCap === null) return [];
  const basis = addBackCapBasis === 'before' ? 'before' : 'including';
  return [
    {
      label: 'Add-backs over the cap',
      amount: disallowed.negated(),
      kind: 'disallowed',
      inputs: [],
      note: `cap ${formatShareLevel(addBackCap)} of EBITDA ${basis} them: ${formatMoneyInFull(limit)}`,
    },
  ];
}
