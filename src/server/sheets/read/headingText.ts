/** What a column heading says besides its period: scenario, derived figures, notes, versions. */
import { plainText } from './plainWords.ts';
import { readPeriodText, type PeriodText } from './periodText.ts';
import { readScaleText, type ScaleText } from './scaleText.ts';

export type Scenario = 'actual' | 'budget' | 'forecast';

export interface HeadingText {
  readonly period: PeriodText;
  readonly scale: ScaleText;
  readonly scenario: Scenario | null;
  /** Variance, change, share: worked out from other columns. */
  readonly derived: boolean;
  /** Restated for a price index. */
  readonly indexed: boolean;
  /** Numbers of notes. */
  readonly note: boolean;
  /** 'Prior year': the same period a year before the column beside it. */
  readonly priorYear: boolean;
  readonly restated: boolean;
  readonly side: 'debit' | 'credit' | null;
  /** What is left: a name, of an entity perhaps. */
  readonly rest: string;
}

const WORDS = {
  derived:
    /(?<![a-z])(?:var(?:iance|iation)?s?\.?|diff(?:erence|erenz)?\.?|delta|abw(?:eichung)?\.?|ecart|desviacion|change|growth|yoy|y\/y|veranderung|evolution|margin|common size|share of|anteil|in %|of sales|of revenu|vs\.?|average|avg\.?|mean|durchschnitt\w*|run[ -]?rate|annuali[sz]ed|hochgerechnet|annualise|moyen(?:ne)?s?|promedio|pro[ -]?forma)(?![a-z])|[%δ△∆]/,
  indexed:
    /(?<![a-z])(?:(?:price[ -])?index(?:ed|ation)?(?:[ -]adjusted)?|(?:hyper)?inflation(?:[ -](?:adjusted|restated|accounting))?|inflationsberein\w*|kaufkraftberein\w*|ias ?29|indexe|ajustad[oa] por inflacion|constant (?:prices|purchasing power)|retraite de l inflation)(?![a-z])/,
  note: /^(?:notes?|anm(?:erkung)?\.?|anhang|ref\.?|annexe|nota|notas|no\.|nr\.?)$/,
  priorYear:
    /(?<![a-z])(?:prior year|previous year|last year|py|vorjahr|vj|annee precedente|exercice precedent|n-1|ano anterior|ejercicio anterior|same period last year)(?![a-z])/,
  restated:
    /(?<![a-z])(?:restated|as restated|adjusted comparatives|angepasst|retraite|reexpresado|reclassified)(?![a-z])/,
  original:
    /(?<![a-z])(?:as (?:originally |previously )?reported|original|as published|previously reported)(?![a-z])/,
  budget: /(?<![a-z])(?:budget|bud|plan(?:ned)?|soll|target|presupu?e?sto|budgete)(?![a-z])/,
  forecast:
    /(?<![a-z])(?:forecast|fcst|fc|rf ?\d?|guidance|latest (?:view|outlook)|\d{1,2} ?\+ ?\d{1,2}|estimate[ds]?|est\.?|outlook|latest estimate|projection|projected|prevision(?:nel|s)?|prognose|hochrechnung|expected|erwartet)(?![a-z])/,
  actual: /(?<![a-z])(?:actuals?|act\.?|ist|reel|real|realise)(?![a-z])/,
  debit: /(?<![a-z])(?:debits?|soll|debe|dr)(?![a-z])/,
  credit: /(?<![a-z])(?:credits?|haben|haber|cr)(?![a-z])/,
} as const;

/** 'LE Q4 2026', 'Q4 2026 LE'; but 'CLOS LE 31 DÉCEMBRE' is French. */
const LATEST_ESTIMATE = /(?<![A-Za-z])LE(?![A-Za-z])(?!\s*\d{1,2}(?!\d))/;

/** 'Dec-26E', '2026B', 'Q4 26F', '2025A': one letter behind the year. */
const SUFFIX = /(?<=\d)\s?\(?([ebfa])\)?$/;
const SUFFIXES: Readonly<Record<string, Scenario>> = {
  e: 'forecast',
  f: 'forecast',
  b: 'budget',
  a: 'actual',
};

/** What stands further behind in a long text is no heading. */
const LONGEST_HEADING = 300;

export function readHeadingText(whole: string): HeadingText {
  const text = whole.slice(0, LONGEST_HEADING);
  let plain = plainText(text).replace(/\s+/g, ' ').trim();
  const taken = (pattern: RegExp): boolean => {
    if (!pattern.test(plain)) return false;
    plain = plain.replace(pattern, ' ').replace(/\s+/g, ' ').trim();
    return true;
  };
  const note = WORDS.note.test(plain);
  const side = WORDS.credit.test(plain) ? 'credit' : WORDS.debit.test(plain) ? 'debit' : null;
  const suffix = SUFFIX.exec(plain)?.[1];
  if (suffix) plain = plain.replace(SUFFIX, '');
  const priorYear = taken(WORDS.priorYear);
  const restated = taken(WORDS.restated);
  taken(WORDS.original);
  const indexed = taken(WORDS.indexed);
  const derived = taken(WORDS.derived) || indexed;
  const budget = taken(WORDS.budget);
  const forecast = taken(WORDS.forecast) || LATEST_ESTIMATE.test(text);
  const actual = taken(WORDS.actual);
  const scale = readScaleText(text);
  const period = readPeriodText(plain);
  return {
    period,
    scale,
    scenario: budget
      ? 'budget'
      : forecast
        ? 'forecast'
        : actual
          ? 'actual'
          : ((suffix ? SUFFIXES[suffix] : null) ?? null),
    derived,
    indexed,
    note,
    priorYear,
    restated,
    side,
    rest: nameLeft(
      LATEST_ESTIMATE.test(text) ? period.rest.replace(/(?<![a-z])le(?![a-z])/, ' ') : period.rest,
    ),
  };
}

const CONNECTING =
  /(?<![a-z])(?:as|at|of|the|for|to|on|in|ended|ending|per|zum|vom|am|au|du|le|a|al|de|stand|and|quarter|period|month|months|year|half|unaudited|audited|reviewed|draft|final|preliminary|provisional|management accounts|mgmt accounts|mgmt|statutory accounts|statutory|vorlaufig|gepruft|ungepruft|testiert|entwurf|audite|non audite|provisoire|auditado|no auditado|provisional|borrador|thousands?|millions?|tsd|eur|usd|gbp|sek|teur|keur|meur|k|m|mio|000s?)(?![a-z])/g;

/** A name of at least two letters, without what connects dates and states units. */
function nameLeft(rest: string): string {
  const name = rest
    .replace(CONNECTING, ' ')
    .replace(/[^a-z0-9 ]+/g, ' ')
    .replace(/\s+/g, ' ')
    .trim();
  return /[a-z]{2}/.test(name) ? name : '';
}

/** Whether a heading says something that only headings of amounts say. */
export function saysPeriod({ period, scenario, derived, priorYear }: HeadingText): boolean {
  return (
    period.end !== null ||
    period.eitherDay !== null ||
    period.monthDay !== null ||
    period.year !== null ||
    period.quarter !== null ||
    period.half !== null ||
    period.periodNumber !== null ||
    period.yearToDate ||
    scenario !== null ||
    derived ||
    priorYear
  );
}
