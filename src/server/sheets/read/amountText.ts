/** Numbers written as text: every notation of sign, thousands and decimals that sheets and exports use. */
import { decimal, ZERO, type Decimal } from '#core/money/decimal.ts';

/** Which mark separates decimals in this file; null where its texts do not tell. */
export type DecimalMark = ',' | '.' | null;

export type TextMeaning =
  | { readonly kind: 'amount'; readonly amount: Decimal; readonly decimals: number }
  | { readonly kind: 'percent' }
  /** A dash or 'nil': zero, said so. */
  | { readonly kind: 'zero' }
  /** 'n/a', a full stop: said to be missing. */
  | { readonly kind: 'missing' }
  /** One group of three digits behind a mark that may be decimal or thousands, and nothing to tell. */
  | { readonly kind: 'ambiguous' }
  /** '#REF!' and its like, also as an export writes it. */
  | { readonly kind: 'error' }
  | { readonly kind: 'text' };

const LONGEST_NUMBER = 40;
const TEXT: TextMeaning = { kind: 'text' };
const DASHES = /^[-\u2010-\u2015\u2212]+$/;
const MISSING = /^(n\/a|n\.a\.?|na|k\.a\.|n\.d\.|nd|\.|not available|s\.o\.)$/i;
/** As English, German, French and Spanish programs write them. */
const ERRORS =
  /^#\u00a1?(?:REF|BEZUG|DIV\/0|N\/A|N\/D|NV|NAME|NOM|NOMBRE|VALUE|WERT|VALEUR|VALOR|SPILL|\u00dcBERLAUF|CALC|NULL|NULO|NUM|ZAHL|NOMBRE)[!?]?$/i;
const ZERO_WORDS = /^(nil|null|zero|néant|neant)$/i;
const CURRENCY = /(?:us\$|[€£$¥]|\b(?:eur|usd|gbp|chf|sek|nok|dkk|pln|czk|jpy|cad|aud|huf|ron|kr)\b\.?)/gi;

export function readAmountText(raw: string, mark: DecimalMark): TextMeaning {
  const text = raw
    .replace(/[\u00a0\u202f\u2007\u2009\u200a]/g, ' ')
    .trim()
    .replace(/^['\u2019]\s*(?=[-(\d.])/, '');
  if (text === '') return TEXT;
  if (DASHES.test(text) || ZERO_WORDS.test(text)) return { kind: 'zero' };
  if (MISSING.test(text)) return { kind: 'missing' };
  if (ERRORS.test(text)) return { kind: 'error' };
  if (!/\d/.test(text) || text.length > LONGEST_NUMBER) return TEXT;
  const { body, negative } = withoutSign(withoutFootnote(text));
  if (/^\d[\d.,' ]*\s*%$/.test(body)) return { kind: 'percent' };
  const digits = plainDigits(body, mark);
  if (digits === null) return TEXT;
  if (digits === 'ambiguous') return { kind: 'ambiguous' };
  const amount = decimal(digits);
  return {
    kind: 'amount',
    amount: negative && !amount.isZero() ? amount.neg() : amount.isZero() ? ZERO : amount,
    decimals: digits.split('.')[1]?.length ?? 0,
  };
}

/**
 * The decimal mark that the file's own texts prove: two different marks in one number, a mark that comes twice, or
 * a count of digits behind it that no thousands have. Three numbers or more that all have exactly three digits
 * behind the same mark prove it to be thousands.
 */
export function decimalMarkOf(texts: Iterable<string>): DecimalMark {
  const votes = { ',': 0, '.': 0 };
  const groupsOfThree = { ',': 0, '.': 0 };
  /** Votes of numbers from 1: a share such as 0.358 may be written in another notation than the amounts. */
  const strong = { ',': 0, '.': 0 };
  let plainHundreds = 0;
  for (const raw of texts) {
    if (raw.length > LONGEST_NUMBER) continue;
    const { body } = withoutSign(
      withoutFootnote(raw.replace(/[\u00a0\u202f\u2007\u2009\u200a]/g, ' ').trim()),
    );
    if (!/^\d[\d.,' ]*$/.test(body)) continue;
    if (/^[1-9]\d\d$/.test(body)) plainHundreds += 1;
    const proven = provenMark(body.replace(/[ ']/g, ''));
    if (proven === ',' || proven === '.') votes[proven] += 1;
    if ((proven === ',' || proven === '.') && !/^0?[.,]/.test(body)) strong[proven] += 1;
    if (proven === 'three behind ,') groupsOfThree[','] += 1;
    if (proven === 'three behind .') groupsOfThree['.'] += 1;
  }
  if (votes[','] !== votes['.']) {
    const winner = votes[','] > votes['.'] ? ',' : '.';
    return groupsOfThree[winner] > 0 && strong[winner] === 0 ? null : winner;
  }
  if (votes[','] > 0) return null;
  // Beside whole hundreds without a mark two such groups are enough: three decimals are not left away.
  const needed = plainHundreds > 0 ? 2 : 3;
  if (groupsOfThree[','] >= needed && groupsOfThree['.'] === 0) return '.';
  if (groupsOfThree['.'] >= needed && groupsOfThree[','] === 0) return ',';
  return null;
}

type Proof = ',' | '.' | 'three behind ,' | 'three behind .' | null;

function provenMark(digits: string): Proof {
  const marks = [...digits.replace(/\d/g, '')];
  const last = marks.at(-1) as ',' | '.' | undefined;
  if (!last) return null;
  const other = last === ',' ? '.' : ',';
  const behind = digits.length - digits.lastIndexOf(last) - 1;
  if (new Set(marks).size === 2) return last;
  if (marks.length > 1) return isGrouped(digits, last) ? other : null;
  if (behind !== 3 || /^0/.test(digits) || digits.indexOf(last) > 3) return last;
  return `three behind ${last}`;
}

/** Decimal text with a full stop, or null where the text is no number. */
function plainDigits(body: string, mark: DecimalMark): string | null {
  if (!/^\d[\d.,' ’]*$|^[.,]\d+$/.test(body)) return null;
  if (/^0\d/.test(body)) return null;
  if (/[ '’]/.test(body) && !/^\d{1,3}([ '’]\d{2,3})*([.,]\d+)?$/.test(body)) return null;
  const digits = body.replace(/[ '’]/g, '');
  const proof = provenMark(digits);
  if (proof === null) return /^\d+$/.test(digits) ? digits : null;
  if (proof === ',' || proof === '.') return withMark(digits, proof);
  if (mark === null) return 'ambiguous';
  return withMark(digits, mark);
}

function withMark(digits: string, mark: ',' | '.'): string | null {
  const group = mark === ',' ? '.' : ',';
  const [whole = '', fraction, ...more] = digits.split(mark);
  if (more.length > 0 || (fraction !== undefined && fraction.includes(group))) return null;
  if (whole.includes(group) && !isGrouped(whole, group)) return null;
  const plain = whole.split(group).join('') || '0';
  return fraction === undefined || fraction === '' ? plain : `${plain}.${fraction}`;
}

/** Groups of three, or of two before a last three as in 1,23,456. */
const isGrouped = (digits: string, group: ',' | '.'): boolean =>
  new RegExp(`^\\d{1,3}(\\${group}\\d{3})+$|^\\d{1,2}(\\${group}\\d{2})*\\${group}\\d{3}$`).test(digits);

/** '1,234*', '1,234 (a)', '1,234¹' carry a mark of a footnote, which is no part of the number. */
const withoutFootnote = (text: string): string =>
  text.replace(/(?<=\d\)?)\s*(\*+|[†‡¹²³⁴⁵⁶⁷⁸⁹]+|\s\([a-z0-9]\)|\s[a-z]\))$/i, '').trim();

/** Parentheses, a minus before or behind (also the Unicode minus and an en dash), 'Cr' for a credit. */
function withoutSign(text: string): { readonly body: string; readonly negative: boolean } {
  let body = text.replace(CURRENCY, ' ').trim();
  let negative = false;
  const take = (pattern: RegExp) => {
    if (!pattern.test(body)) return;
    negative = !negative;
    body = body.replace(pattern, '$1').replace(CURRENCY, ' ').trim();
  };
  take(/^\((.*)\)$/s);
  take(/^[-\u2010-\u2015\u2212]\s*(.*)$/s);
  take(/^(.*?)\s*[-\u2010-\u2015\u2212]$/s);
  take(/^(.*\d)\s*cr\.?$/is);
  body = body.replace(/^\+\s*/, '').replace(/(\d)\s*dr\.?$/i, '$1');
  return { body, negative };
}
