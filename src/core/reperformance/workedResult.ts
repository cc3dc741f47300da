import { isMaximum, type Covenant } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { verdictOn } from '../covenants/holdAgainstLevel.ts';
import { MEASURES } from '../measures/index.ts';
import type { Measure } from '../measures/measured.ts';
import { Decimal, decimal } from '../money/decimal.ts';
import type { Policy } from '../policy.ts';
import type { Candidate } from './workedFigure.ts';
import type { WorkedRow } from './worked.ts';

/**
 * From the two sides to the outcome: ratio, headroom in every form, and the word.
 *
 * Spreadsheets count in binary: the compared figure is rounded to twelve decimals, or to the agreement's own.
 *
 * @example workedResult(test, covenant, POLICY_VERSION_1, []).at(-1)?.value // => 'met'
 */
export function workedResult(
  test: CovenantTest,
  covenant: Pick<Covenant, 'roundingPlaces'>,
  policy: Pick<Policy, 'thinBelow'>,
  bridge: readonly WorkedRow[],
): readonly WorkedRow[] {
  const measure = MEASURES[test.measure];
  const sides = [
    sideRow('numerator', 'Numerator', test.numerator, bridge),
    ...(measure.shape === 'amount' ? [] : [sideRow('denominator', 'Denominator', test.denominator, bridge)]),
  ];
  const level = levelRow(test, measure, bridge);
  const rows = [...sides, level];
  if (!test.numerator || !test.level) return [...rows, ...outcomeAsRecorded(test)];
  return [
    ...rows,
    ...testedRows(test, measure, covenant.roundingPlaces),
    ...headroomRows(test, measure, bridge),
    recorded(
      'thin',
      'Thin where earnings (or the tested amount) may fall less than',
      'share',
      policy.thinBelow,
    ),
    ...outcomeRows(test, measure, covenant.roundingPlaces),
  ];
}

/** A side is a row of the bridge, or the sum of some at its end. */
function sideRow(key: string, label: string, value: Decimal | null, bridge: readonly WorkedRow[]): WorkedRow {
  const row = value && bridge.findLast((each) => each.value instanceof Decimal && each.value.eq(value));
  return {
    key,
    label: row ? `${label}: ${row.label}` : label,
    unit: 'money',
    value,
    formula: row ? `{${row.key}}` : null,
    isOpen: value !== null && !row,
    note: '',
  };
}

/** A level that the agreement computes is a subtotal of the bridge; any other is as its schedule has it. */
function levelRow(
  { level }: CovenantTest,
  { unit }: Pick<Measure, 'unit'>,
  bridge: readonly WorkedRow[],
): WorkedRow {
  const row = recorded('level', 'Level in force', unit, level);
  const computed =
    level && bridge.find(({ value, formula }) => formula && value instanceof Decimal && value.eq(level));
  return unit === 'money' && computed ? { ...row, formula: `{${computed.key}}` } : row;
}

const recorded = (
  key: string,
  label: string,
  unit: WorkedRow['unit'],
  value: WorkedRow['value'],
): WorkedRow => ({ key, label, unit, value, formula: null, isOpen: false, note: '' });

function testedRows(
  test: CovenantTest,
  measure: Pick<Measure, 'shape' | 'unit'>,
  places: number | null,
): readonly WorkedRow[] {
  const ratio = measure.shape === 'amount' ? '{numerator}' : '{numerator}/{denominator}';
  const isMeant = test.tested !== null;
  return [
    {
      key: 'tested',
      label: measure.shape === 'amount' ? 'Tested amount' : 'Tested ratio',
      unit: measure.unit,
      value: test.tested,
      formula: isMeant ? ratio : null,
      isOpen: false,
      note: isMeant ? '' : 'has no meaning',
    },
    {
      key: 'compared',
      label: places === null ? 'Compared, unrounded' : `Compared at ${places} decimal places, as agreed`,
      unit: measure.unit,
      value: test.tested && (places === null ? test.tested : test.tested.toDecimalPlaces(places)),
      formula: isMeant ? `ROUND({tested},${places ?? 12})` : null,
      isOpen: false,
      note: '',
    },
  ];
}

interface Form {
  readonly key: string;
  readonly label: string;
  readonly unit: WorkedRow['unit'];
  readonly value: Decimal | null;
  readonly candidates: readonly Candidate[];
}

function headroomRows(
  test: CovenantTest,
  measure: Pick<Measure, 'shape' | 'unit'>,
  bridge: readonly WorkedRow[],
): readonly WorkedRow[] {
  const { headroom } = test;
  const forms: readonly Form[] = [
    {
      key: 'absolute',
      label: 'Headroom in the unit of the level',
      unit: measure.unit,
      value: headroom.absolute,
      candidates: absoluteForms(test),
    },
    {
      key: 'share_of_level',
      label: 'Headroom as a share of the level',
      unit: 'share',
      value: headroom.shareOfLevel,
      candidates: [['{absolute}/ABS({level})', quotient(headroom.absolute, test.level?.abs())]],
    },
    {
      key: 'money_left',
      label: 'What is left in money',
      unit: 'money',
      value: headroom.moneyLeft,
      candidates: moneyForms(test),
    },
    {
      key: 'may_fall',
      label: headroom.fallOf === 'earnings' ? 'Earnings may fall by' : 'The tested amount may move by',
      unit: 'share',
      value: headroom.mayFall,
      candidates: fallForms(test, bridge),
    },
  ];
  return forms.map(({ candidates, ...row }) => {
    const found = row.value && candidates.find(([, value]) => value && isClose(value, row.value!));
    return { ...row, formula: found?.[0] ?? null, isOpen: row.value !== null && !found, note: '' };
  });
}

/** Divided in another order the last of 40 digits may differ. */
const isClose = (one: Decimal, other: Decimal): boolean =>
  one.minus(other).abs().lte(Decimal.max(1, other.abs()).times('1e-25'));

const quotient = (over: Decimal | null | undefined, under: Decimal | null | undefined): Decimal | null =>
  over && under && !under.isZero() ? over.div(under) : null;

function absoluteForms({ tested, level }: CovenantTest): readonly Candidate[] {
  if (!tested || !level) return [];
  return [
    ['{level}-{tested}', level.minus(tested)],
    ['{tested}-{level}', tested.minus(level)],
  ];
}

function moneyForms({ numerator, denominator, level, headroom }: CovenantTest): readonly Candidate[] {
  if (!numerator || !level) return [];
  if (!denominator) return [['{absolute}', headroom.absolute]];
  const carried = quotient(numerator, level);
  return [
    ['{denominator}-{numerator}/{level}', carried && denominator.minus(carried)],
    ['{numerator}-{level}*{denominator}', numerator.minus(level.times(denominator))],
    ['{denominator}', denominator],
  ];
}

function fallForms(test: CovenantTest, bridge: readonly WorkedRow[]): readonly Candidate[] {
  const { headroom, numerator, denominator } = test;
  const money = headroom.moneyLeft;
  return [
    ['{share_of_level}', headroom.shareOfLevel],
    ['{money_left}/{numerator}', quotient(money, numerator)],
    ['{money_left}/{denominator}', quotient(money, denominator)],
    ['1', decimal(1)],
    ...bridge.map(({ key, value }): Candidate => [
      `{money_left}/{${key}}`,
      value instanceof Decimal ? quotient(money, value) : null,
    ]),
  ];
}

const quoted = (word: string): string => `"${word}"`;

function outcomeRows(
  test: CovenantTest,
  measure: Measure,
  roundingPlaces: number | null,
): readonly WorkedRow[] {
  const isDecided = isDecidedByFigures(test, measure, roundingPlaces);
  const words: WorkedRow = {
    key: 'underlying',
    label: 'Outcome on the borrower’s own figures',
    unit: 'words',
    value: test.underlyingOutcome,
    formula: isDecided ? outcomeFormula(test, measure) : null,
    isOpen: false,
    note: isDecided ? '' : (test.reason ?? ''),
  };
  if (test.outcome === test.underlyingOutcome) return [{ ...words, label: 'Outcome' }];
  return [
    words,
    {
      ...recorded('outcome', 'Outcome with what stands over it', 'words', test.outcome),
      note: test.reason ?? '',
    },
  ];
}

/** A springing condition, a figure behind the level or an operator that does not fit decide before the two sides do. */
function isDecidedByFigures(
  { numerator, denominator, operator, level, underlyingOutcome }: CovenantTest,
  measure: Measure,
  roundingPlaces: number | null,
): boolean {
  if (!numerator || !level) return false;
  if (measure.shape !== 'amount' && (measure.shape === 'burden') !== isMaximum(operator)) return false;
  const { outcome } = verdictOn(measure, { numerator, denominator }, { operator, level, roundingPlaces });
  return outcome === (underlyingOutcome === 'met, thin' ? 'met' : underlyingOutcome);
}

const outcomeAsRecorded = ({ outcome, reason }: CovenantTest): readonly WorkedRow[] => [
  { ...recorded('outcome', 'Outcome', 'words', outcome), note: reason ?? '' },
];

/** The words of the table in methods.md A4. */
function outcomeFormula({ operator, headroom }: CovenantTest, { shape, withoutCharge }: Measure): string {
  const met = headroom.mayFall === null ? quoted('met') : `IF({may_fall}<{thin},"met, thin","met")`;
  const compared = `IF({compared}${operator}{level},${met},"not met")`;
  if (shape === 'amount') return compared;
  if (isMaximum(operator))
    return `IF({denominator}<=0,IF({numerator}>0,"not met, ratio has no meaning","cannot be tested"),IF({numerator}<=0,${quoted(withoutCharge === 'net cash' ? 'met, net cash' : 'met')},${compared}))`;
  const nothingToCover = quoted('met, no charge to cover');
  const withoutCover = withoutCharge === 'met' ? nothingToCover : quoted('cannot be tested');
  return `IF({denominator}<=0,IF({numerator}>0,${nothingToCover},${withoutCover}),${compared})`;
}
