/** Section 6: every covenant on its latest test date. */
import type { CovenantView, TestView } from '../../../contracts/borrowers.ts';
import type { SheetBlock, SheetCell, SheetColumn } from '../../../contracts/reviewSheet.ts';
import { addMonths, plainDate } from '../../../core/calendar/plainDate.ts';
import { dayText } from '../../../core/calendar/printDay.ts';
import { THE_AGREEMENT_GOVERNS } from '../../../core/cautions.ts';
import type { Covenant, CovenantLevel } from '../../../core/covenants/covenant.ts';
import { laterLevels, testDates } from '../../../core/covenants/levels.ts';
import { OPERATOR_WORDS, OURS, testedInWords } from '../../../core/covenants/wording.ts';
import { decimal, ZERO } from '../../../core/money/decimal.ts';
import {
  absent,
  dayCell,
  levelCell,
  moneyOrAbsent,
  notRecorded,
  shareOrAbsent,
  testedCell,
  textCell,
} from './cells.ts';
import { covenantName, NOT_ASSESSED, shownTest, termsOf, type SheetMaterial } from './material.ts';

const LAST_TESTS = 8;

const COLUMNS: readonly SheetColumn[] = [
  { key: 'covenant', label: 'Covenant', span: 3 },
  { key: 'clause', label: 'Terms', span: 0, under: 'covenant' },
  { key: 'level', label: 'Level on test date', span: 2 },
  { key: 'testDate', label: 'Test date', span: 1, under: 'level' },
  { key: 'nextLevel', label: 'Next step', span: 2, under: 'level' },
  { key: 'nextFrom', label: 'Step from', span: 1, under: 'level' },
  { key: 'computed', label: 'Computed', span: 2, numeric: true },
  { key: 'certified', label: 'Certified', span: 1, numeric: true, under: 'computed' },
  { key: 'difference', label: 'Difference', span: 1, numeric: true, under: 'computed' },
  { key: 'mayFall', label: 'Earnings may fall', span: 1, numeric: true },
  { key: 'moneyLeft', label: 'In money', span: 2, numeric: true, under: 'mayFall' },
  { key: 'tests', label: `Last ${LAST_TESTS} tests`, span: 0 },
  { key: 'status', label: 'Status', span: 3 },
  { key: 'nextTest', label: 'Next test', span: 1 },
  { key: 'delivered', label: 'Deliverables on time', span: 0, under: 'nextTest' },
];

export function covenantSection(material: SheetMaterial): readonly SheetBlock[] {
  const { covenants } = material.view;
  const table: SheetBlock =
    covenants.length === 0
      ? { kind: 'paragraph', text: NOT_ASSESSED }
      : {
          kind: 'table',
          caption: 'Every covenant on its latest test date',
          columns: COLUMNS,
          rows: covenants.map((covenant) => covenantRow(material, covenant)),
        };
  return [table, ...withoutEarnings(covenants), { kind: 'caution', text: THE_AGREEMENT_GOVERNS }];
}

function covenantRow(material: SheetMaterial, covenant: CovenantView): readonly SheetCell[] {
  const test = shownTest(covenant);
  const terms = termsOf(material, covenant);
  const level = test?.level ? decimal(test.level) : null;
  const operator = OPERATOR_WORDS[covenant.operator];
  const next = test && terms ? laterLevels(terms.levels, plainDate(test.testDate))[0] : undefined;
  const nm = 'n.m.';
  return [
    textCell(covenantName(covenant)),
    textCell(`${covenant.facilityName}, ${covenant.isOurs ? OURS : clauseText(covenant)}`),
    level ? levelCell(covenant, operator, level) : absent('no level in force'),
    test ? dayCell(test.testDate) : absent('not tested yet'),
    nextLevelCell(covenant, next),
    next ? dayCell(next.from) : absent(''),
    test?.tested ? testedCell(covenant, decimal(test.tested), level) : absent(nm),
    ...certifiedCells(covenant, test),
    shareOrAbsent(test?.mayFall ?? null, nm),
    moneyOrAbsent(covenant.currency, covenant.headroom?.moneyLeft ?? null, nm),
    testsCell(covenant),
    test ? statusCell(covenant, test, terms) : absent('not tested yet'),
    nextTestCell(material, terms),
    deliveredCell(material),
  ];
}

function nextLevelCell(covenant: CovenantView, next: CovenantLevel | undefined): SheetCell {
  if (!next) return absent('none agreed');
  if (next.level === null) return textCell('covenant holiday');
  return levelCell(covenant, OPERATOR_WORDS[covenant.operator], next.level);
}

const clauseText = ({ clause, currency, roundingPlaces }: CovenantView): string =>
  `clause ${clause}, ${currency}${roundingPlaces === null ? '' : `, rounded to ${roundingPlaces} places`}`;

/** Names the covenants whose column "Earnings may fall" holds something else. */
function withoutEarnings(covenants: readonly CovenantView[]): readonly SheetBlock[] {
  const names = covenants.filter(({ fallOf }) => fallOf === 'tested amount').map(({ name }) => name);
  if (names.length === 0) return [];
  const has = names.length === 1 ? 'has' : 'have';
  return [
    {
      kind: 'paragraph',
      text: `${names.join(', ')} ${has} no earnings: the share by which the tested amount may fall stands in.`,
    },
  ];
}

function certifiedCells(covenant: CovenantView, test: TestView | null): readonly [SheetCell, SheetCell] {
  if (!test || covenant.certified === null) return [notRecorded, notRecorded];
  const certified = decimal(covenant.certified);
  const level = test.level === null ? null : decimal(test.level);
  return [
    testedCell(covenant, certified, level),
    test.tested === null ? absent('n.m.') : testedCell(covenant, decimal(test.tested).minus(certified), ZERO),
  ];
}

function testsCell(covenant: CovenantView): SheetCell {
  const tests = covenant.tests
    .slice(-LAST_TESTS)
    .map(({ testDate, outcome, mayFall, justPassing, level, band }) => ({
      testDate,
      outcome,
      mayFall,
      justPassing,
      level,
      ...(band !== undefined && { band }),
    }));
  if (tests.length === 0) return absent('not tested yet');
  const line = (test: (typeof tests)[number]) =>
    `${dayText(test.testDate)} ${test.outcome}${test.justPassing ? ', just passing' : ''}`;
  return { kind: 'tests', label: covenantName(covenant), tests, text: tests.map(line).join('; ') };
}

function statusCell(covenant: CovenantView, test: TestView, terms: Covenant | null): SheetCell {
  const waiver = terms?.waivers.find(({ testDate }) => testDate === test.testDate);
  const awaited = covenant.tests.at(-1);
  const remarks = [
    test.reason !== null && !test.outcome.includes(test.reason) && test.reason,
    waiver &&
      `waived on ${dayText(waiver.grantedOn)}${waiver.until ? ` until ${dayText(waiver.until)}` : ''}: ${waiver.conditions}`,
    test.isFirstUnderReset && 'first test under a reset',
    covenant.cure?.ratioWith && withMoney(covenant, test, covenant.cure.ratioWith),
    covenant.checking,
    awaited && awaited !== test && `${dayText(awaited.testDate)}: ${awaited.outcome}`,
  ].filter((remark): remark is string => typeof remark === 'string' && remark !== '');
  const { outcome, justPassing } = test;
  return {
    kind: 'outcome',
    outcome,
    justPassing,
    remarks,
    text: [`${outcome}${justPassing ? ', just passing' : ''}`, ...remarks].join('; '),
  };
}

/** 'with the money put in 3.50x, for the covenant only' */
const withMoney = (covenant: CovenantView, { level }: TestView, ratio: string): string =>
  `with the money put in ${testedInWords(covenant.measure, decimal(ratio), level === null ? null : decimal(level))}, for the covenant only`;

function nextTestCell({ view: { computed } }: SheetMaterial, terms: Covenant | null): SheetCell {
  if (!computed || !terms) return notRecorded;
  const asOf = plainDate(computed.asOf);
  const next = testDates(terms, addMonths(asOf, terms.everyMonths)).find((date) => date > asOf);
  return dayCell(next ?? terms.firstTestOn);
}

const deliveredCell = ({ signals }: SheetMaterial): SheetCell =>
  signals.some(({ kind, isOpen }) => kind === 'statement late' && isOpen === 1)
    ? textCell('late, see 16')
    : notRecorded;
