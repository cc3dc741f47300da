/** Section 9: the way from reported to covenant EBITDA, each add-back with its evidence, the cap, the source cells. */
import type { BridgeRow, CovenantView } from '../../../contracts/borrowers.ts';
import type { SheetBlock, SheetCell, SheetColumn } from '../../../contracts/reviewSheet.ts';
import { plainDate } from '../../../core/calendar/plainDate.ts';
import { dayText } from '../../../core/calendar/printDay.ts';
import type { AddBack, Covenant } from '../../../core/covenants/covenant.ts';
import { COUNTERFACTUAL_WORDS, testedInWords, wouldHaveBeen } from '../../../core/covenants/wording.ts';
import { addBacksWithin, allowAddBacks } from '../../../core/measures/addBacks.ts';
import { monthsOfFlow } from '../../../core/measures/annualised.ts';
import { LEASE_RENT } from '../../../core/measures/leaseRent.ts';
import { Decimal, decimal } from '../../../core/money/decimal.ts';
import { formatMoney, formatShare, formatShareLevel } from '../../../core/money/print.ts';
import { absent, amountCell, notRecorded, textCell } from './cells.ts';
import { covenantName, NOT_ASSESSED, shownTest, termsOf, type SheetMaterial } from './material.ts';
import { referencesCell } from './sources.ts';

const COLUMNS: readonly SheetColumn[] = [
  { key: 'line', label: 'Line', span: 4 },
  { key: 'amount', label: 'Amount', span: 2, numeric: true },
  { key: 'kind', label: 'Kind', span: 2 },
  { key: 'evidence', label: 'Evidence', span: 6 },
  { key: 'cells', label: 'Source cells', span: 6 },
];

/** One way to covenant EBITDA, and the covenants that are tested on it. */
interface Bridge {
  readonly covenant: CovenantView;
  readonly testDate: string;
  readonly rows: readonly BridgeRow[];
  /** Tested on this way, or on a part of it that ends at the named line. */
  readonly alsoFor: readonly { readonly name: string; readonly upTo: string }[];
}

export function bridgeSection(material: SheetMaterial): readonly SheetBlock[] {
  const { covenants } = material.view;
  if (covenants.length === 0) return [{ kind: 'paragraph', text: NOT_ASSESSED }];
  const bridges = bridgesOf(covenants);
  if (bridges.length === 0)
    return [{ kind: 'paragraph', text: 'No latest test of this borrower has a bridge to EBITDA.' }];
  return bridges.flatMap((bridge) => bridgeBlocks(material, bridge));
}

/** Longest first, so that a way that is the beginning of another one is said there and not printed twice. */
function bridgesOf(covenants: readonly CovenantView[]): readonly Bridge[] {
  const all = covenants
    .flatMap((covenant) => {
      const test = shownTest(covenant);
      const rows = earningsRows(covenant.bridge);
      return test && rows.length > 0 ? [{ covenant, testDate: test.testDate, rows, alsoFor: [] }] : [];
    })
    .toSorted((one, other) => other.rows.length - one.rows.length);
  return all.reduce<readonly Bridge[]>((kept, bridge) => {
    const longer = kept.find((one) => one.testDate === bridge.testDate && beginsWith(one.rows, bridge.rows));
    if (!longer) return [...kept, bridge];
    const upTo = bridge.rows.at(-1)?.label ?? '';
    const also = { ...longer, alsoFor: [...longer.alsoFor, { name: covenantName(bridge.covenant), upTo }] };
    return kept.map((one) => (one === longer ? also : one));
  }, []);
}

/** Up to the last line of EBITDA; what follows is debt, cash or a charge. */
const earningsRows = (rows: readonly BridgeRow[]): readonly BridgeRow[] =>
  rows.slice(0, rows.findLastIndex(({ kind, label }) => kind === 'subtotal' && label.endsWith('EBITDA')) + 1);

const beginsWith = (rows: readonly BridgeRow[], start: readonly BridgeRow[]): boolean =>
  start.every((row, place) => rows[place]?.label === row.label && rows[place].amount === row.amount);

function bridgeBlocks(material: SheetMaterial, bridge: Bridge): readonly SheetBlock[] {
  const { covenant, testDate, rows, alsoFor } = bridge;
  const terms = termsOf(material, covenant);
  const months = terms ? monthsOfFlow(terms.definition, terms, plainDate(testDate)) : 12;
  const recorded = terms ? addBacksWithin(months, terms.addBacks, plainDate(testDate)) : [];
  const addBackRows = rows.filter(({ kind }) => kind === 'add-back');
  return [
    {
      kind: 'table',
      caption: `${covenantName(covenant)}, ${months === 12 ? 'twelve' : months} months to ${dayText(testDate)}, ${covenant.currency}`,
      columns: COLUMNS,
      rows: rows.map((row) => bridgeRow(material, row, recordedOf(row, addBackRows, recorded))),
    },
    {
      kind: 'list',
      lines: [
        ...alsoFor.map(({ name, upTo }) => `${name} is tested on ${upTo}.`),
        ...(terms ? [capLine(terms, rows, recorded)] : []),
        ...counterfactualLines(covenant),
      ],
    },
  ];
}

/** The add-backs of a bridge stand in the order in which they are recorded. */
function recordedOf(
  row: BridgeRow,
  addBackRows: readonly BridgeRow[],
  recorded: readonly AddBack[],
): AddBack | null {
  const addBack = recorded[addBackRows.indexOf(row)];
  return addBack && addBack.label === row.label && addBack.amount.eq(row.amount) ? addBack : null;
}

function bridgeRow(material: SheetMaterial, row: BridgeRow, addBack: AddBack | null): readonly SheetCell[] {
  return [
    textCell(row.label),
    amountCell(decimal(row.amount)),
    textCell(kindText(row, addBack)),
    row.kind === 'add-back'
      ? addBack
        ? textCell(evidenceText(addBack))
        : notRecorded
      : absent(row.note ?? ''),
    row.sources.length > 0 ? referencesCell(material.figureSources, row.sources) : absent(''),
  ];
}

function kindText({ kind }: BridgeRow, addBack: AddBack | null): string {
  if (kind === 'disallowed') return 'over the cap';
  if (kind === 'check') return 'beside, not in the sum';
  if (kind !== 'add-back') return kind === 'subtotal' ? 'subtotal' : 'reported';
  return addBack ? `add-back, ${addBack.capped ? 'capped' : 'not capped'}` : 'add-back';
}

const evidenceText = ({ reason, evidence, approvedBy, months, periodEnd }: AddBack): string =>
  [
    reason === '' ? 'no reason recorded' : reason,
    evidence === '' ? 'no evidence recorded' : evidence,
    approvedBy === null ? 'not approved by a second person yet' : `approved by ${approvedBy}`,
    `${months} months to ${dayText(periodEnd)}`,
  ].join('; ');

/** 'Cap 20 % of EBITDA before the capped add-backs: 3.9m. Capped add-backs 2.5m, taken 2.5m: 62.4 % of the cap used.' */
function capLine(
  { definition: { addBackCap, addBackCapBasis }, currency }: Covenant,
  rows: readonly BridgeRow[],
  recorded: readonly AddBack[],
): string {
  const reported = rows.find(({ kind, label }) => kind === 'subtotal' && label.endsWith('EBITDA'));
  if (addBackCap === null || !reported) return 'No cap on add-backs is recorded.';
  const rent = rows.find(({ label }) => label === LEASE_RENT);
  const sumOf = (capped: boolean) =>
    Decimal.sum(0, ...recorded.filter((one) => one.capped === capped).map(({ amount }) => amount));
  const { limit, allowed } = allowAddBacks({
    ebitda: decimal(reported.amount).plus(decimal(rent?.amount ?? 0)),
    uncapped: sumOf(false),
    capped: sumOf(true),
    terms: { cap: addBackCap, basis: addBackCapBasis },
  });
  const cap = `Cap on add-backs ${formatShareLevel(addBackCap)} of EBITDA ${addBackCapBasis} the capped add-backs`;
  if (limit === null) return `${cap}: no limit follows from it.`;
  const used = limit.isZero() ? '' : `: ${formatShare(allowed.div(limit))} of the cap used`;
  return `${cap}: ${currency} ${formatMoney(limit)}. Capped add-backs ${formatMoney(sumOf(true))}, taken ${formatMoney(allowed)}${used}.`;
}

const counterfactualLines = (covenant: CovenantView): readonly string[] =>
  covenant.counterfactuals.map((other) => {
    const test = shownTest(covenant);
    const level = test?.level ? decimal(test.level) : null;
    const ratio =
      other.ratio === null ? 'no meaning' : testedInWords(covenant.measure, decimal(other.ratio), level);
    const needed =
      other.breakEvenShare === null
        ? ''
        : ` The test needs ${formatShare(decimal(other.breakEvenShare))} of the add-backs to be met.`;
    return `${COUNTERFACTUAL_WORDS[other.label]}, ${covenant.currency} ${formatMoney(decimal(other.takenOut))} taken out: ${ratio}, ${wouldHaveBeen(other.outcome)}.${needed}`;
  });
