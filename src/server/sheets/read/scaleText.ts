/** What a text says of unit and currency. */

export interface ScaleText {
  readonly unit: 1 | 1000 | 1_000_000 | null;
  /** The unit 1 rests on 'in EUR' alone, which packs in thousands write as well. */
  readonly weak: boolean;
  readonly currency: string | null;
  /** A sign that several currencies share: '$', 'kr'. */
  readonly sharedSign: string | null;
}

const CODES =
  'EUR|USD|GBP|CHF|SEK|NOK|DKK|PLN|CZK|HUF|RON|BGN|TRY|JPY|CNY|INR|AUD|CAD|NZD|ZAR|SGD|HKD|BRL|MXN|ISK|ILS|KRW|THB|AED|SAR|RSD|UAH';
/** 'TEUR', 'kSEK', 'MUSD'. */
const PREFIXED = new RegExp(`(?<![A-Za-z])([TKkMt])(${CODES})(?![A-Za-z])`);
const SUFFIXED = new RegExp(`(?<![A-Za-z])(${CODES})\\s?(k|m|mm|mn|bn)(?![A-Za-z])`);
const CODE = new RegExp(`(?<![A-Za-z])(${CODES})(?![A-Za-z])`, 'g');

const NAMES: readonly (readonly [RegExp, string])[] = [
  [/€|(?<![a-z])euros?(?![a-z])/i, 'EUR'],
  [/US\s?\$|u\.s\. dollars?|us dollars?/i, 'USD'],
  [/A\$|australian dollars?/i, 'AUD'],
  [/C\$|CA\$|canadian dollars?/i, 'CAD'],
  [/£|pounds? sterling|(?<![a-z])sterling/i, 'GBP'],
  [/swiss francs?|schweizer franken|francs suisses/i, 'CHF'],
  [/swedish kron[ao]r?|svenska kronor/i, 'SEK'],
  [/norwegian kroner?|norske kroner/i, 'NOK'],
  [/danish kroner?|danske kroner/i, 'DKK'],
  [/zł|zlot(?:y|ych|e)/i, 'PLN'],
  [/Kč/, 'CZK'],
  [/₹/, 'INR'],
];

const THOUSAND =
  /['’‘´`]\s?000s?|(?<![\d.,])000['’]?s?(?![\d.,])|(?<![a-z])(?:thousands?|thous\.?|tsd\.?|tausend|milliers?|miles|tusental|tusen|duizend|ths\.?|tkr|tkr\.)(?![a-z])|[€£$]\s?k(?![a-z])|(?<![a-z])[kt]\s?[€£$]|x\s?1[.,]?000(?!\d)/i;
const MILLION =
  /['’]?000[,.\s]?000|(?<![a-z])(?:millions?|millionen|millones|miljoner|mio\.?|mln\.?|mill\.|mkr|mn)(?![a-z])|[€£$]\s?m{1,2}(?![a-z])|(?<![a-z])m\s?[€£$]/i;
const WHOLE =
  /(?<![a-z])(?:en|in|auf|in whole|in full|whole|full|vollen?)\s+(?:euros|euro|pounds|dollars|kronor|kroner|francs|units|currency units|unidades|unites)(?![a-z])|in units|whole currency/i;
const IN_CODE = new RegExp(
  `(?<![a-z])(?:in|en)\\s+(?:${CODES}|€|£)(?![A-Za-z'’]|\\s?(?:000|k|m|tsd|mio))`,
  'i',
);

const LONGEST = 500;

export function readScaleText(whole: string): ScaleText {
  const text = whole.slice(0, LONGEST);
  const prefixed = PREFIXED.exec(text);
  const suffixed = SUFFIXED.exec(text);
  const { unit, weak } = unitOf(text, prefixed?.[1], suffixed?.[2]);
  const currency = prefixed?.[2] ?? suffixed?.[1] ?? currencyOf(text);
  return { unit, weak, currency, sharedSign: currency ? null : sharedSignOf(text) };
}

function unitOf(text: string, prefix?: string, suffix?: string): Pick<ScaleText, 'unit' | 'weak'> {
  if (prefix) return { unit: /m/i.test(prefix) ? 1_000_000 : 1000, weak: false };
  if (suffix && suffix !== 'bn') return { unit: suffix === 'k' ? 1000 : 1_000_000, weak: false };
  if (MILLION.test(text)) return { unit: 1_000_000, weak: false };
  if (THOUSAND.test(text)) return { unit: 1000, weak: false };
  if (WHOLE.test(text)) return { unit: 1, weak: false };
  return IN_CODE.test(text) ? { unit: 1, weak: true } : { unit: null, weak: false };
}

/** Null where the text names two currencies. */
function currencyOf(text: string): string | null {
  const named = new Set([...text.matchAll(CODE)].map((match) => match[1] ?? ''));
  for (const [pattern, code] of NAMES) if (pattern.test(text)) named.add(code);
  const [only] = named;
  return named.size === 1 && only ? only : null;
}

function sharedSignOf(text: string): string | null {
  if (/\$/.test(text)) return '$';
  if (/(?<![a-z])[tm]?kr\.?(?![a-z])/i.test(text)) return 'kr';
  if (/¥/.test(text)) return '¥';
  return /(?<![a-z])(?:fr|sfr)\.(?![a-z])/i.test(text) ? 'Fr.' : null;
}

/** The currency that a number format prints. */
export function currencyOfFormat(format: string): Pick<ScaleText, 'currency' | 'sharedSign'> {
  const marks = [...format.matchAll(/\[\$([^\]-]*)[^\]]*\]|"([^"]*)"|\\([$€£])|([€£$])/g)]
    .map((match) => match[1] ?? match[2] ?? match[3] ?? match[4] ?? '')
    .join(' ');
  const { currency, sharedSign } = readScaleText(marks);
  return { currency, sharedSign };
}
