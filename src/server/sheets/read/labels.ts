/** Finds the line that a label means, within its part of the statements and its section. */
import type { StatementPart } from '#core/statements/lineItems.ts';
import { plainLabel } from './plainWords.ts';
import { BALANCE_WORDINGS } from './wordings/balance.ts';
import { CASH_FLOW_WORDINGS } from './wordings/cashFlow.ts';
import { PART_HEADINGS, SECTION_HEADINGS } from './wordings/headings.ts';
import { INCOME_WORDINGS } from './wordings/income.ts';
import type { Line, Section, Wordings } from './wordings/lines.ts';

export type Part = Exclude<StatementPart, 'memo'>;
export const PARTS: readonly Part[] = ['income', 'balance', 'cash-flow'];

interface Index {
  readonly anywhere: ReadonlyMap<string, Line>;
  readonly within: ReadonlyMap<Section, ReadonlyMap<string, Line>>;
}

const indexOf = (wordings: Wordings): Map<string, Line> => {
  const index = new Map<string, Line>();
  for (const [line, texts] of Object.entries(wordings)) {
    for (const text of texts.split('|')) index.set(plainLabel(text), line as Line);
  }
  return index;
};

const INDEXES: ReadonlyMap<Part, Index> = new Map(
  [INCOME_WORDINGS, BALANCE_WORDINGS, CASH_FLOW_WORDINGS].map(({ part, anywhere, within }) => [
    part,
    {
      anywhere: indexOf(anywhere),
      within: new Map(
        Object.entries(within).map(([section, wordings]) => [section as Section, indexOf(wordings)] as const),
      ),
    },
  ]),
);

/** Longer texts are remarks, no labels; comparing them with every wording would take seconds. */
const LONGEST_LABEL = 200;

/** A section that is part of another looks there next. */
const WIDER: Readonly<Partial<Record<Section, Section>>> = {
  'current-liabilities': 'liabilities',
  'non-current-liabilities': 'liabilities',
};

/** The line of a label that is a known wording; null where it is none. */
export function lineOf(label: string, part: Part, section: Section | null): Line | null {
  if (label.length > LONGEST_LABEL) return null;
  return lineOfWords(label, part, section) ?? lineOfTwoLanguages(label, part, section);
}

/** 'Umsatzerlöse / Revenue', 'Net sales (Umsatzerlöse)': both halves name the same line. */
function lineOfTwoLanguages(label: string, part: Part, section: Section | null): Line | null {
  const halves = /^(.{3,}?)\s*(?:[/|]|\s[-–—]\s|\()\s*([^()/|]{3,}?)\)?\s*$/.exec(label);
  if (!halves) return null;
  const [first, second] = [halves[1] ?? '', halves[2] ?? ''].map((half) => lineOfWords(half, part, section));
  return first && first === second ? first : null;
}

function lineOfWords(label: string, part: Part, section: Section | null): Line | null {
  const index = INDEXES.get(part);
  if (!index) return null;
  for (const text of variants(plainLabel(label.replace(SUM_OF_LETTERS, ' ')))) {
    for (let at: Section | undefined = section ?? undefined; at; at = WIDER[at]) {
      const line = index.within.get(at)?.get(text);
      if (line) return line;
    }
    const line = index.anywhere.get(text);
    if (line) return line;
  }
  return null;
}

/** '(B + C)', '(A)', '(1+2)' behind a label say what was added, not what it is. */
const SUM_OF_LETTERS = /\(\s*(?:[a-z]|[ivx]+|\d{1,2})(?:\s*[-+–]\s*(?:[a-z]|[ivx]+|\d{1,2}))*\s*\)/gi;

/** The words as they stand, then without what says nothing of the line. */
function variants(text: string): string[] {
  const shorter = text
    .replace(
      /(?<![a-z])(?:eur|usd|gbp|sek|chf|thousands?|teur|tsd|000s?|note \d+|see note|unaudited|consolidated)(?![a-z])/g,
      ' ',
    )
    .replace(/ +/g, ' ')
    .trim();
  const withoutTotal = shorter.replace(/^(?:total|summe|sum of|net|less|add|plus|minus|davon|\d+) /, '');
  const withoutNet = shorter.replace(/ (?:net|netto|nettes?|total|gesamt|neto)$/, '');
  const singular = shorter.replace(/(?<=[a-z]{4})s(?= |$)/g, '');
  return [...new Set([text, shorter, withoutNet, withoutTotal, singular])].filter(
    (variant) => variant !== '',
  );
}

export interface NearLine {
  readonly line: Line;
  /** 0 to 1. */
  readonly likeness: number;
}

/** Lines whose wordings are like the label, the likest first. */
export function nearLines(label: string, part: Part, section: Section | null): NearLine[] {
  const index = INDEXES.get(part);
  if (!index || label.length > LONGEST_LABEL) return [];
  const text = plainLabel(label);
  const best = new Map<Line, number>();
  const maps = [index.anywhere, ...(section ? [index.within.get(section) ?? new Map<string, Line>()] : [])];
  for (const map of maps) {
    for (const [wording, line] of map) {
      const likeness = likenessOf(text, wording);
      if (likeness > 0.45 && likeness > (best.get(line) ?? 0)) best.set(line, likeness);
    }
  }
  return [...best]
    .map(([line, likeness]) => ({ line, likeness }))
    .sort((one, other) => other.likeness - one.likeness);
}

const FILLERS = new Set(
  'and of the for to in on by from with a an und der die das des von aus im zum zur et de du des les la le l d y e el los las del en'.split(
    ' ',
  ),
);
const tokensOf = (text: string): string[] => text.split(' ').filter((word) => !FILLERS.has(word));

/** Words in common, a misspelt word counting almost as itself. */
function likenessOf(text: string, wording: string): number {
  const [own, other] = [tokensOf(text), tokensOf(wording)];
  if (own.length === 0 || other.length === 0) return 0;
  const free = [...other];
  let common = 0;
  for (const word of own) {
    const at = bestMatch(word, free);
    if (at.likeness < 0.8) continue;
    common += at.likeness;
    free.splice(at.index, 1);
  }
  return (2 * common) / (own.length + other.length);
}

function bestMatch(word: string, candidates: readonly string[]): { index: number; likeness: number } {
  let best = { index: -1, likeness: 0 };
  candidates.forEach((candidate, index) => {
    const likeness = word === candidate ? 1 : wordLikeness(word, candidate);
    if (likeness > best.likeness) best = { index, likeness };
  });
  return best;
}

/** One less the share of letters to change; short words must be the same. */
function wordLikeness(word: string, other: string): number {
  const longest = Math.max(word.length, other.length);
  if (longest < 5 || Math.abs(word.length - other.length) > 2) return 0;
  return 1 - editDistance(word, other) / longest;
}

/** Letters changed, left out, added, or exchanged with their neighbour. */
function editDistance(word: string, other: string): number {
  let before: number[] = [];
  let previous = Array.from({ length: other.length + 1 }, (_, index) => index);
  for (let row = 1; row <= word.length; row += 1) {
    const current = [row];
    for (let column = 1; column <= other.length; column += 1) {
      const change = (previous[column - 1] ?? 0) + (word[row - 1] === other[column - 1] ? 0 : 1);
      const exchanged = word[row - 1] === other[column - 2] && word[row - 2] === other[column - 1];
      const exchange = exchanged ? (before[column - 2] ?? Infinity) + 1 : Infinity;
      current.push(Math.min(change, exchange, (previous[column] ?? 0) + 1, (current[column - 1] ?? 0) + 1));
    }
    before = previous;
    previous = current;
  }
  return previous[other.length] ?? 0;
}

const headingIndex = <Key extends string>(wordings: Readonly<Record<Key, string>>): Map<string, Key> =>
  new Map(
    Object.entries<string>(wordings).flatMap(([key, texts]) =>
      texts.split('|').map((text) => [plainLabel(text), key as Key] as const),
    ),
  );
const PART_INDEX = headingIndex(PART_HEADINGS);
const SECTION_INDEX = headingIndex(SECTION_HEADINGS);

/** The statement that a title names, or null where it names none or several. */
export function partOfTitle(title: string): Part | null {
  const text = plainLabel(title);
  const exact = PART_INDEX.get(text);
  if (exact) return exact;
  const named = new Set<Part>();
  let longest = 0;
  for (const [wording, part] of PART_INDEX) {
    if (wording.length < 6 && !['p and l', 'guv', 'pnl'].includes(wording)) continue;
    if (!` ${text} `.includes(` ${wording} `)) continue;
    if (wording.length > longest) longest = wording.length;
    named.add(part);
  }
  const [only] = named;
  return named.size === 1 && only ? only : null;
}

export function sectionOfHeading(heading: string): Section | null {
  const text = plainLabel(heading);
  return (
    SECTION_INDEX.get(text) ??
    SECTION_INDEX.get(text.replace(/^(?:total|net cash from|net cash used in) /, '')) ??
    null
  );
}
