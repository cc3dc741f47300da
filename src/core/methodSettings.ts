/**
 * Fixed values of the methods that a method page prints beside those of the policy. Nobody changes them on a screen:
 * a new value is a new method version. Whoever writes a page adds the lines that it names.
 */
import { CLOCK_BY_SEVERITY, CLOCK_OF_TEST_NOT_MET, type AlertClock } from './alerts/clock.ts';
import { DUE_SOON_DAYS } from './calendar/deadline.ts';
import { formatShareLevel } from './money/print.ts';
import { ROUNDING_SHARE, WARNING_SHARE } from './statements/tolerance.ts';
import { FEWEST_PEERS as FEWEST_CHANGES, FEWEST_PEER_BORROWERS } from './outlook/nextTest.ts';
import { QUARTERS_OF_CHANGES, TRUNCATED_SHARE } from './outlook/peerChanges.ts';
import { FEWEST_OWN_TESTS, PERSISTENCE } from './outlook/reversion.ts';
import { BOOK_PATTERN_SETTINGS, LOW_POWER_BELOW, SIGNIFICANCE } from './patterns/bookPattern.ts';
import { FEWEST_BORROWERS } from './patterns/bookParts.ts';
import { NEAR_LINE } from './patterns/headroomGrid.ts';
import { FEWEST_NEAR_LIMIT, NEAR_LIMIT } from './patterns/nearLimit.ts';
import { FEWEST_NEAR } from './patterns/nearLineEvidence.ts';
import { FEWEST_PEERS, LARGEST_MEAN_FDR } from './patterns/nearLineRanking.ts';
import { FEWEST_AMOUNTS } from './patterns/statementDigits.ts';
import { QUALITY_TABLE } from './quality/qualityTable.ts';

export interface MethodSetting {
  readonly label: string;
  /** As printed, with its unit. */
  readonly value: string;
}

const percent = (share: number): string => `${Number((share * 100).toPrecision(12))} %`;

const clockText = ({ assessWithin, decideWithin }: AlertClock): string =>
  [assessWithin === null ? null : `assess in ${assessWithin}`, `decide in ${decideWithin} business days`]
    .filter((part) => part !== null)
    .join(', ');

export const METHOD_SETTINGS = {
  'statements.roundingShare': {
    label: 'Rounding share of the reference',
    value: formatShareLevel(ROUNDING_SHARE),
  },
  'statements.warningShare': {
    label: 'Small differences up to, of the reference',
    value: formatShareLevel(WARNING_SHARE),
  },
  'statements.dueSoonDays': { label: 'Said to be due within', value: `${DUE_SOON_DAYS} days` },
  'alerts.clock.notMet': { label: 'Test not met', value: clockText(CLOCK_OF_TEST_NOT_MET) },
  'alerts.clock.urgent': { label: 'Urgent', value: clockText(CLOCK_BY_SEVERITY.urgent) },
  'alerts.clock.soon': { label: 'Soon', value: clockText(CLOCK_BY_SEVERITY.soon) },
  'alerts.clock.note': { label: 'Note', value: clockText(CLOCK_BY_SEVERITY.note) },
  'quality.date': { label: 'Date of the table of weights', value: QUALITY_TABLE.date },
  'quality.weights': {
    label: 'Weights of the blocks',
    value: Object.entries(QUALITY_TABLE.weights)
      .map(([block, weight]) => `${block} ${weight}`)
      .join(', '),
  },
  'quality.fastGrowth': {
    label: 'Growth above which screens and noise are left out',
    value: percent(QUALITY_TABLE.fastGrowth),
  },
  'quality.fewestCoverage': {
    label: 'Fewest weights with figures for a score',
    value: `${QUALITY_TABLE.fewestCoverage} of 100`,
  },
  'quality.bands': {
    label: 'Bands, from',
    value: QUALITY_TABLE.bands.map(({ band, from }) => `${band} ${from}`).join(', '),
  },
  'quality.bandHysteresisPoints': {
    label: 'A band changes only when its line is passed by',
    value: `${QUALITY_TABLE.bandHysteresisPoints} points`,
  },
  'quality.headlineQuarters': {
    label: 'Quarter ends in the headline',
    value: String(QUALITY_TABLE.headlineQuarters),
  },
  'patterns.nearLine': {
    label: 'Near the limit',
    value: `${percent(NEAR_LINE.band)} of the level on the passing side, ${percent(NEAR_LINE.gap)} on the failing side`,
  },
  'patterns.fewestNear': { label: 'Fewest tests near the line', value: String(FEWEST_NEAR) },
  'patterns.fewestPeers': {
    label: 'Fewest covenants of a sector that are fitted by themselves',
    value: String(FEWEST_PEERS),
  },
  'patterns.largestMeanFdr': {
    label: 'Largest mean local false-discovery rate of a list',
    value: percent(LARGEST_MEAN_FDR),
  },
  'patterns.significance': { label: 'Level of the one-sided tests', value: percent(SIGNIFICANCE) },
  'patterns.widths': {
    label: 'Intervals, the headline first',
    value: BOOK_PATTERN_SETTINGS.widths.map(percent).join(', '),
  },
  'patterns.placebos': {
    label: 'Placebo points',
    value: BOOK_PATTERN_SETTINGS.placeboPoints.map(percent).join(', '),
  },
  'patterns.fewestNearLimit': {
    label: 'Fewest tests near the limit',
    value: `${FEWEST_NEAR_LIMIT} within ${percent(NEAR_LIMIT)} of the level`,
  },
  'patterns.fewestBorrowers': { label: 'Fewest borrowers of a part', value: String(FEWEST_BORROWERS) },
  'patterns.lowPowerBelow': { label: 'Low power below', value: `${LOW_POWER_BELOW} tests` },
  'patterns.draws': { label: 'Draws of borrowers', value: String(BOOK_PATTERN_SETTINGS.draws) },
  'patterns.fewestAmounts': { label: 'Fewest amounts for a digit test', value: String(FEWEST_AMOUNTS) },
  'outlook.fewestPeers': { label: 'Fewest changes of peers', value: String(FEWEST_CHANGES) },
  'outlook.fewestBorrowers': {
    label: 'Fewest borrowers that they are of',
    value: String(FEWEST_PEER_BORROWERS),
  },
  'outlook.changesEnd': {
    label: 'Changes count that end in the last',
    value: `${QUARTERS_OF_CHANGES} quarters`,
  },
  'outlook.truncated': {
    label: 'Left out of the changes, at either end',
    value: percent(TRUNCATED_SHARE),
  },
  'outlook.persistence': { label: 'Persistence of headroom, a quarter', value: String(PERSISTENCE) },
  'outlook.ownTests': { label: 'Fewest own tests for the check', value: String(FEWEST_OWN_TESTS) },
} as const satisfies Record<string, MethodSetting>;

export type MethodSettingKey = keyof typeof METHOD_SETTINGS;

export const METHOD_SETTING_KEYS = Object.keys(METHOD_SETTINGS) as readonly MethodSettingKey[];
