/** Random damage to a borrower's file: to the bytes of its container, to the text of its parts, to its cells. */
import { rawArchive } from '../../tests/support/rawArchive.ts';

export type Random = () => number;

/** An example, whole and taken apart; a text file has no parts. */
export interface Example {
  readonly name: string;
  readonly bytes: Buffer;
  readonly parts: readonly { readonly name: string; readonly content: Buffer }[];
}

export interface Mutant {
  readonly name: string;
  readonly how: 'bytes' | 'parts' | 'cells';
  readonly bytes: Buffer;
}

const pick = <Value>(random: Random, values: readonly Value[]): Value =>
  values[Math.floor(random() * values.length)] as Value;
const upTo = (random: Random, most: number): number => Math.floor(random() * (most + 1));

const MOST_CHANGES = 6;

export function mutantOf(example: Example, random: Random): Mutant {
  const isText = example.parts.length === 0;
  const how = pick(random, ['bytes', 'parts', 'cells', 'cells', 'cells', 'cells'] as const);
  const { name } = example;
  if (how === 'bytes') return { name, how, bytes: changed(example.bytes, random) };
  if (isText) return { name, how, bytes: withFields(example.bytes, random) };
  return {
    name,
    how,
    bytes: rawArchive(how === 'parts' ? changedParts(example, random) : changedCells(example, random)),
  };
}

/** Bytes turned, cut out, doubled, put in, and cut off. */
function changed(bytes: Buffer, random: Random): Buffer {
  let result = Buffer.from(bytes);
  for (let left = 1 + upTo(random, MOST_CHANGES); left > 0; left -= 1) {
    const at = upTo(random, Math.max(0, result.length - 1));
    const length = 1 + upTo(random, pick(random, [1, 4, 64, 2_000]));
    const piece = result.subarray(at, at + length);
    const before = result.subarray(0, at);
    const behind = result.subarray(at + piece.length);
    const turned = Buffer.from(piece.map((byte) => byte ^ (1 << upTo(random, 7))));
    result = pick(random, [
      () => Buffer.concat([before, turned, behind]),
      () => Buffer.concat([before, behind]),
      () => Buffer.concat([before, piece, piece, behind]),
      () => Buffer.concat([before, Buffer.from(pick(random, HOSTILE_TEXTS)), piece, behind]),
      () => (random() < 0.3 ? before : Buffer.concat([before, Buffer.alloc(length, 255), behind])),
    ])();
  }
  return result;
}

type Parts = readonly { readonly name: string; readonly content: Buffer }[];

/** Parts whose text is damaged, that are missing, that are there twice or under another name. */
function changedParts({ parts }: Example, random: Random): Parts {
  const at = upTo(random, parts.length - 1);
  const hit = parts[at];
  if (!hit) return parts;
  const others = parts.filter((_, index) => index !== at);
  const kind = pick(random, [
    'damaged',
    'damaged',
    'damaged',
    'missing',
    'twice',
    'renamed',
    'swapped',
  ] as const);
  if (kind === 'missing') return others;
  if (kind === 'twice') return [...parts, hit];
  if (kind === 'renamed')
    return [...others, { ...hit, name: pick(random, parts).name.replace(/\d?\.xml/, '9.xml') }];
  if (kind === 'swapped') return [...others, { ...hit, content: pick(random, parts).content }];
  return [...others, { ...hit, content: changed(hit.content, random) }];
}

const HOSTILE_TEXTS = [
  '',
  '0',
  '-0',
  '1e308',
  '-1e-308',
  '1e400',
  'NaN',
  'Infinity',
  '9'.repeat(400),
  '0.'.concat('0'.repeat(300), '1'),
  '1,234',
  '1.234',
  '1.234.567,89',
  "1'234",
  '(1',
  '1)',
  '--',
  '-',
  '\u2212',
  'n/a',
  '#REF!',
  '#DIV/0!',
  'TRUE',
  'Q3 2026',
  'FY26',
  'P13 FY99',
  '31/02/2026',
  '99.99.9999',
  '2026-13-45',
  '53 weeks ended 31 Feb 2026',
  'LTM',
  'Revenue',
  'Total',
  'Summe',
  'EUR',
  '$',
  'in thousands of millions',
  'Budget',
  '% of %',
  '=1+1',
  '=A1',
  '&amp;#0;',
  '&#x0;',
  '&lt;',
  '<c/>',
  ']]>',
  '<!--',
  '\u0000',
  '\ufffe',
  '\u202e',
  '😀'.repeat(50),
  'ä'.repeat(300),
  'a'.repeat(40_000),
  '('.repeat(3_000),
  '1 '.repeat(3_000),
  ' -'.repeat(3_000),
  '12.'.repeat(2_000),
  'total '.repeat(2_000),
  '\n'.repeat(2_000),
  '__proto__',
  'constructor',
  'hasOwnProperty',
] as const;
const FORMULAS = [
  'A1',
  'B2',
  'SUM(A:A)',
  'SUM(A1:XFD1048576)',
  '1/0',
  'B3+B3+B3',
  '((((((1))))))',
  'ROUND(1,1E9)',
  '-'.repeat(500),
  'SUM('.repeat(400),
  "'No sheet'!A1",
  'B4*1E300*1E300',
];

const xml = (text: string): string => text.replace(/[<>&]/g, '');

type Change = (text: string, strike: () => boolean, random: Random) => string;

/** Values and formulas, texts, references, types, styles, merged areas. */
const CHANGES: readonly Change[] = [
  (text, strike, random) =>
    text.replace(/<v>[^<]*<\/v>/g, (value) => (strike() ? newValue(value, random) : value)),
  (text, strike, random) =>
    text.replace(/<t(?: [^>]*)?>[^<]*<\/t>/g, (value) =>
      strike() ? `<t>${xml(pick(random, HOSTILE_TEXTS))}</t>` : value,
    ),
  (text, strike, random) =>
    text.replace(/(?<=<c) r="[A-Z]+\d+"/g, (value) =>
      strike() ? ` r="${pick(random, REFERENCES)}"` : value,
    ),
  (text, strike, random) =>
    text.replace(/ t="[a-z]+"/gi, (value) => (strike() ? ` t="${pick(random, TYPES)}"` : value)),
  (text, strike, random) =>
    text.replace(/ s="\d+"/g, (value) => (strike() ? ` s="${upTo(random, 30)}"` : value)),
  (text, _strike, random) =>
    text.replace(
      '</sheetData>',
      `</sheetData><mergeCells><mergeCell ref="${pick(random, MERGES)}"/></mergeCells>`,
    ),
];
const REFERENCES = ['A1', 'B3', 'C7', 'D2', 'F30', 'XFD1048576', 'AAAA1', 'B0', '', 'B'];
const TYPES = ['s', 'str', 'n', 'b', 'e', 'd', 'inlineStr', 'x'];
const MERGES = ['A1:C3', 'B2:B2', 'C9:A1', 'B3:B9', 'A1:XFD9'];

/** One or two kinds of change, so that most files stay readable and are read to their end. */
function changedCells({ parts }: Example, random: Random): Parts {
  const changes = [pick(random, CHANGES.slice(0, 2)), ...(random() < 0.4 ? [pick(random, CHANGES)] : [])];
  const share = pick(random, [0.005, 0.03, 0.2]);
  return parts.map((part) => {
    if (!/(worksheets\/[^/]+|sharedStrings)\.xml$/.test(part.name)) return part;
    const text = changes.reduce(
      (before, change) => change(before, () => random() < share, random),
      part.content.toString('utf8'),
    );
    return { name: part.name, content: Buffer.from(text) };
  });
}

function newValue(value: string, random: Random): string {
  const hostile = xml(pick(random, HOSTILE_TEXTS)).slice(0, 5_000);
  return pick(random, [
    () => `<v>${hostile}</v>`,
    () => `<f>${pick(random, FORMULAS)}</f>`,
    () => `<f>${pick(random, FORMULAS)}</f>${value}`,
    () => '',
    () => `<v>${(random() - 0.5) * 10 ** upTo(random, 20)}</v>`,
    () => `<v>${1990 + upTo(random, 60)}</v>`,
  ])();
}

/** A text file, field by field. */
function withFields(bytes: Buffer, random: Random): Buffer {
  const text = bytes.toString('latin1');
  const share = pick(random, [0.005, 0.05, 0.3]);
  const fields = text.split(/([;,\t\n])/);
  return Buffer.from(
    fields
      .map((field) =>
        random() < share ? pick(random, [...HOSTILE_TEXTS, '"', '""', ';', '\r', '\t']) : field,
      )
      .join(''),
    'utf8',
  );
}
