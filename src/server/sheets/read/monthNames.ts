/** Months as headings write them, in English, German, French, Spanish, Italian, Dutch and the Nordic languages. */
import { plainText } from './plainWords.ts';

const NAMES: readonly (readonly string[])[] = [
  ['january', 'januar', 'janvier', 'enero', 'januari', 'gennaio', 'jan', 'janv', 'ene', 'jän', 'jänner'],
  ['february', 'februar', 'février', 'febrero', 'februari', 'febbraio', 'feb', 'févr', 'fév'],
  ['march', 'märz', 'mars', 'marzo', 'maart', 'mar', 'mrz', 'mär', 'marts', 'mrt'],
  ['april', 'avril', 'abril', 'aprile', 'apr', 'avr', 'abr'],
  ['may', 'mai', 'mayo', 'maj', 'mei', 'maggio'],
  ['june', 'juni', 'juin', 'junio', 'giugno', 'jun'],
  ['july', 'juli', 'juillet', 'julio', 'luglio', 'jul', 'juil'],
  ['august', 'août', 'agosto', 'augusti', 'augustus', 'aug', 'ago'],
  ['september', 'septembre', 'septiembre', 'settembre', 'sep', 'sept', 'setiembre'],
  ['october', 'oktober', 'octobre', 'octubre', 'ottobre', 'oct', 'okt'],
  ['november', 'novembre', 'noviembre', 'nov'],
  ['december', 'dezember', 'décembre', 'diciembre', 'dicembre', 'dec', 'dez', 'déc', 'dic'],
];

const MONTHS: ReadonlyMap<string, number> = new Map(
  NAMES.flatMap((names, index) => names.map((name) => [plainText(name), index + 1] as const)),
);

/** A pattern for one month's name, longest first, to be built into larger patterns. */
export const MONTH_PATTERN = [...MONTHS.keys()].sort((one, other) => other.length - one.length).join('|');

export const monthOf = (name: string): number | null => MONTHS.get(name.replace(/\.$/, '')) ?? null;
