/**
 * How figures are printed, once for screens, mail and sheets. A figure beside a limit is printed with as many
 * digits as it takes to show the side it is on: 3.504x at most 3.50x, never 3.50x.
 */
import type { Decimal } from './decimal.ts';

const MOST_PLACES = 12;
const MINUS = '−';
/** Keeps a number and its sign on one line. */
export const NO_BREAK_SPACE = '\u00a0';

/** How many digits a figure needs. `beside` is the line it is held against; `places` the fewest decimals. */
export interface PrintOptions {
  readonly places?: number;
  readonly beside?: Decimal | null;
}

/**
 * A ratio, '3.45x'.
 *
 * @example formatRatio(decimal('3.4512')) // => '3.45x'
 * @example formatRatio(decimal('3.504'), { beside: decimal('3.5') }) // => '3.504x'
 */
export const formatRatio = (ratio: Decimal, { places = 2, beside = null }: PrintOptions = {}): string =>
  `${signed(ratio, placesThatShowTheSide(ratio, beside, places))}x`;

/**
 * A ratio's level as the agreement states it: every digit it has, two at least.
 *
 * @example formatLevel(decimal('3.5')) // => '3.50x'
 */
export const formatLevel = (level: Decimal): string =>
  formatRatio(level, { places: Math.max(2, level.dp()) });

/**
 * An amount's level in short, with every digit it has.
 *
 * @example formatMoneyLevel(decimal(5_250_000)) // => '5.25m'
 */
export function formatMoneyLevel(level: Decimal): string {
  const scaled = level.div(unitOf(level, 1)?.size ?? 1);
  return formatMoney(level, { places: Math.max(1, scaled.dp()) });
}

/**
 * A share of one in per cent, '1.4 %', number and sign on one line. A share that is not nought is never printed as nought.
 *
 * @example formatShare(decimal('0.0142')) // => '1.4\u00a0%'
 * @example formatShare(decimal('-0.0004')) // => '−0.04\u00a0%'
 */
export function formatShare(share: Decimal, { places = 1, beside = null }: PrintOptions = {}): string {
  const percent = share.times(100);
  const apart = Math.max(
    placesThatShowTheSide(percent, beside && beside.times(100), places),
    placesThatShowTheSide(percent, percent.times(0), places),
  );
  return `${signed(percent, apart)}${NO_BREAK_SPACE}%`;
}

/**
 * A share that an agreement or the policy states: every digit it has, whole where it is whole.
 *
 * @example formatShareLevel(decimal('0.02')) // => '2\u00a0%'
 * @example formatShareLevel(decimal('0.125')) // => '12.5\u00a0%'
 */
export const formatShareLevel = (share: Decimal): string =>
  formatShare(share, { places: share.times(100).dp() });

/**
 * A score of nought to a hundred, whole unless a line lies beside it.
 *
 * @example formatScore(decimal('29.6'), { beside: decimal(30) }) // => '29.6'
 */
export const formatScore = (score: Decimal, { places = 0, beside = null }: PrintOptions = {}): string =>
  signed(score, placesThatShowTheSide(score, beside, places));

/**
 * An amount in short, '12.4m'; below a thousand it is printed whole. Whole currency units in.
 *
 * @example formatMoney(decimal(12_440_000)) // => '12.4m'
 * @example formatMoney(decimal(4_999_600), { beside: decimal(5_000_000) }) // => '4.9996m'
 */
export function formatMoney(amount: Decimal, { places = 1, beside = null }: PrintOptions = {}): string {
  const unit = unitOf(amount, places);
  if (!unit) return signed(amount, placesThatShowTheSide(amount, beside, 0));
  const scaled = amount.div(unit.size);
  const apart = placesThatShowTheSide(scaled, beside && beside.div(unit.size), places);
  return `${signed(scaled, apart)}${unit.suffix}`;
}

/**
 * An amount with every digit it has, grouped by thousands: '12,440,000'. parseMoney reads it back.
 *
 * @example formatMoneyInFull(decimal('-1234.5')) // => '−1,234.5'
 */
export function formatMoneyInFull(amount: Decimal): string {
  const [whole = '0', fraction] = amount.abs().toFixed().split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ',');
  return `${amount.lt(0) ? MINUS : ''}${grouped}${fraction ? `.${fraction}` : ''}`;
}

const UNITS = [
  { size: 1_000_000_000, suffix: 'bn' },
  { size: 1_000_000, suffix: 'm' },
  { size: 1_000, suffix: 'k' },
] as const;

// Three digits more than printed, so that 999,960 is 1.0m and not 1000.0k.
const unitOf = (amount: Decimal, places: number) =>
  UNITS.find(({ size }) =>
    amount
      .abs()
      .div(size)
      .toDecimalPlaces(places + 3)
      .gte(1),
  );

/**
 * The fewest decimals, from `fewest` up, at which a figure prints on the side of the line that it is on.
 *
 * Both in the same unit. Source: practice, a result is compared unrounded and must not look otherwise.
 *
 * @example placesThatShowTheSide(decimal('3.504'), decimal('3.5'), 2) // => 3
 */
export function placesThatShowTheSide(value: Decimal, line: Decimal | null, fewest: number): number {
  if (!line || value.eq(line)) return fewest;
  const side = value.comparedTo(line);
  for (let places = fewest; places < MOST_PLACES; places += 1)
    if (value.toDecimalPlaces(places).comparedTo(line.toDecimalPlaces(places)) === side) return places;
  return MOST_PLACES;
}

function signed(value: Decimal, places: number): string {
  const digits = value.abs().toFixed(places);
  return value.lt(0) && /[1-9]/.test(digits) ? `${MINUS}${digits}` : digits;
}
