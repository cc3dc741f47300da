import type { Covenant } from '../covenants/covenant.ts';
import type { BridgeLine } from '../measures/bridge.ts';
import { Decimal, decimal } from '../money/decimal.ts';
import type { InputUsed } from '../statements/reading.ts';
import { lineKey } from './workedLines.ts';
import type { WorkedRow } from './worked.ts';

/** A formula with what it comes to in decimals: the first that comes to the amount is the one. */
export type Candidate = readonly [formula: string, value: Decimal | null];

/**
 * A figure of the bridge out of the statement's lines: as they are, turned, netted up to a cap, carried over from last
 * year, or as a share of a profit; without lines, out of the subtotal above it. Null where none comes to the amount.
 *
 * @example figureFormula({ label: 'Cash', amount: decimal(6), kind: 'figure', inputs: [] }, null, covenant, new Set()) // => null
 */
export function figureFormula(
  line: BridgeLine,
  subtotal: WorkedRow | null,
  covenant: Pick<Covenant, 'definition' | 'levels'>,
  known: ReadonlySet<string>,
): string | null {
  const isKnown = line.inputs.every((input) => known.has(lineKey(input)));
  const candidates =
    line.inputs.length === 0 ? setToAYear(subtotal) : isKnown ? outOfLines(line.inputs, covenant) : [];
  return candidates.find(([, value]) => value?.eq(line.amount))?.[0] ?? null;
}

/** Months that the first tests after closing may have. */
const MONTHS = Array.from({ length: 11 }, (_, place) => place + 1);

/** As the core divides it: times twelve over the months, less what is there. */
const setToAYear = (subtotal: WorkedRow | null): readonly Candidate[] => {
  const amount = subtotal?.value;
  if (!subtotal || !(amount instanceof Decimal)) return [];
  return MONTHS.map((months) => [
    `{${subtotal.key}}*12/${months}-{${subtotal.key}}`,
    amount.times(12).div(months).minus(amount),
  ]);
};

function outOfLines(
  inputs: readonly InputUsed[],
  { definition, levels }: Pick<Covenant, 'definition' | 'levels'>,
): readonly Candidate[] {
  const sum = Decimal.sum(0, ...inputs.map(counted));
  const terms = inputs.map(termOf).join('');
  const { cashNettingCap: cap, capexCarriedShare: carried, profitShareInNetWorth: profit } = definition;
  return [
    [terms, sum],
    [`-(${terms})`, sum.negated()],
    ...(cap ? [netted(cap, terms, sum)] : []),
    ...(carried
      ? levels.flatMap(({ level }) => (level ? [carriedOver(carried, level, terms, sum)] : []))
      : []),
    ...(profit ? [shareOfProfit(profit, terms, sum)] : []),
  ];
}

const netted = (cap: Decimal, terms: string, sum: Decimal): Candidate => [
  `-MIN(${cap.toFixed()},${terms})`,
  Decimal.min(cap, sum).negated(),
];

/** Capital expenditure is an outflow, stored below nought. */
const carriedOver = (share: Decimal, level: Decimal, terms: string, sum: Decimal): Candidate => [
  `${share.toFixed()}*MAX(0,${level.toFixed()}-ABS(${terms}))`,
  Decimal.max(0, level.minus(sum.abs())).times(share),
];

const shareOfProfit = (share: Decimal, terms: string, sum: Decimal): Candidate => [
  `MAX(0,${terms})*${share.toFixed()}`,
  Decimal.max(0, sum).times(share),
];

const counted = ({ sign, amount, rate }: InputUsed): Decimal => amount.times(sign).times(rate ?? decimal(1));

const termOf = (input: InputUsed): string =>
  `${input.sign === 1 ? '+' : '-'}{${lineKey(input)}}${input.rate ? `*${input.rate.toFixed()}` : ''}`;
