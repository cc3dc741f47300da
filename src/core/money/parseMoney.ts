import { err, ok, type Result } from '../result.ts';
import { decimal, type Decimal } from './decimal.ts';

export interface NotAnAmount {
  readonly kind: 'not-an-amount';
  readonly text: string;
  readonly message: string;
}

const SHAPE =
  /^(?<minus>-?)(?<whole>\d{1,3}(?:,\d{3})+|\d{1,3}(?: \d{3})+|\d+)(?<fraction>\.\d+)?(?<unit>k|m|bn)?$/i;
const FACTORS: Readonly<Record<string, number>> = { k: 1_000, m: 1_000_000, bn: 1_000_000_000 };
const MOST_DIGITS = 16;

/**
 * An amount that a person typed: decimal point, thousands grouped by comma or space or not at all, minus or
 * parentheses for negatives, k, m or bn behind it. Anything that could be read two ways is refused.
 *
 * Whole currency units. Error 'not-an-amount' with a sentence that says what is accepted. Source: desk practice.
 *
 * @example parseMoney('(12.4m)') // => { ok: true, value: -12400000 }
 */
export function parseMoney(text: string): Result<Decimal, NotAnAmount> {
  const plain = text
    .trim()
    .replaceAll(/[\u00a0\u202f]/g, ' ')
    .replaceAll('−', '-');
  const inParentheses = /^\((.*)\)$/.exec(plain);
  const match = SHAPE.exec(inParentheses?.[1] ?? plain)?.groups;
  if (!match || (inParentheses && match['minus'])) return refused(text, 'is not an amount');
  const digits = `${match['whole'] ?? ''}`.replaceAll(/[ ,]/g, '');
  const amount = decimal(`${digits}${match['fraction'] ?? ''}`).times(
    FACTORS[(match['unit'] ?? '').toLowerCase()] ?? 1,
  );
  if (amount.trunc().precision(true) > MOST_DIGITS) return refused(text, 'is larger than this product keeps');
  return ok(inParentheses || match['minus'] ? amount.negated() : amount);
}

const refused = (text: string, why: string): Result<Decimal, NotAnAmount> =>
  err({
    kind: 'not-an-amount',
    text,
    message: `"${text}" ${why}. Write it as 12400000, 12,400,000, 12.4m or (12.4m), with a point before decimals.`,
  });
