/** Where the figures come from: references to cells, and the list of every figure behind the sheet. */
import type { CovenantView, SourceLink } from '../../../contracts/borrowers.ts';
import type { CellReference, SheetCell, SheetSource } from '../../../contracts/reviewSheet.ts';
import { plainDate, type PlainDate } from '../../../core/calendar/plainDate.ts';
import { dayText } from '../../../core/calendar/printDay.ts';
import { addBacksWithin } from '../../../core/measures/addBacks.ts';
import { monthsOfFlow } from '../../../core/measures/annualised.ts';
import type { FigureSourceRecord } from '../../db/repositories/reviewSheets.ts';
import { absent } from './cells.ts';
import { shownTest, termsOf, type SheetMaterial } from './material.ts';

type Located = FigureSourceRecord & { readonly sheet: string; readonly cell: string };

const cellsOf = (
  records: readonly FigureSourceRecord[],
  { statementId, line }: SourceLink,
): readonly Located[] =>
  records.filter(
    (record): record is Located =>
      record.statementId === statementId &&
      record.line === line &&
      record.sheet !== null &&
      record.cell !== null,
  );

/** Cells by file: 'Figures.xlsx: Income!M14, N14 less J14'. */
export function referencesCell(
  records: readonly FigureSourceRecord[],
  links: readonly SourceLink[],
): SheetCell {
  const located = links
    .flatMap((link) => cellsOf(records, link).map((record) => ({ record, sign: link.sign })))
    .toSorted((one, other) => other.sign - one.sign);
  if (located.length === 0) return absent('entered without a file');
  const files = [...new Set(located.map(({ record }) => nameOf(record)))];
  const references = files.flatMap((file) =>
    located.filter(({ record }) => nameOf(record) === file).map(toReference),
  );
  const text = files.map((file) => {
    const listed = (sign: 1 | -1) =>
      references
        .filter((one) => one.fileName === file && one.sign === sign)
        .map(({ reference }) => reference)
        .join(', ');
    const [added, taken] = [listed(1), listed(-1)];
    return `${file}: ${[added, taken === '' ? '' : `less ${taken}`].filter((part) => part !== '').join(' ')}`;
  });
  return { kind: 'references', references, text: text.join('; ') };
}

interface Signed {
  readonly record: Located;
  readonly sign: 1 | -1;
}

const nameOf = ({ fileName }: Located): string => fileName ?? 'no file';

/** The sheet's name once for the cells that follow on it. */
function toReference({ record, sign }: Signed, place: number, ofFile: readonly Signed[]): CellReference {
  const before = ofFile[place - 1];
  const isSameSheet = before?.record.sheet === record.sheet && before.sign === sign;
  return {
    statementId: record.statementId,
    line: record.line,
    fileName: nameOf(record),
    reference: isSameSheet ? record.cell : `${sheetName(record.sheet)}!${record.cell}`,
    sign,
  };
}

/** As a spreadsheet writes it: quoted where the name is more than a word. */
const sheetName = (name: string): string =>
  /^[\p{L}_][\p{L}\p{N}_.]*$/u.test(name) ? name : `'${name.replaceAll("'", "''")}'`;

/** Every figure that a covenant's latest test rests on, once, with the covenants that use it; then the add-backs. */
export function sheetSources(material: SheetMaterial): readonly SheetSource[] {
  const tested = material.view.covenants.flatMap((covenant) => {
    const test = shownTest(covenant);
    return test ? [{ covenant, testDate: plainDate(test.testDate) }] : [];
  });
  const uses = new Map<string, { link: SourceLink; names: string[] }>();
  for (const { covenant } of tested)
    for (const link of linksOf(covenant)) {
      const key = `${link.statementId} ${link.line}`;
      const use = uses.get(key);
      if (!use) uses.set(key, { link, names: [covenant.name] });
      else if (!use.names.includes(covenant.name)) use.names.push(covenant.name);
    }
  const figures = [...uses.values()].map(({ link, names }) => figureSource(material, link, names));
  return [...figures.toSorted(byLineAndPeriod), ...tested.flatMap((one) => addBackSources(material, one))];
}

export const linksOf = (covenant: CovenantView): readonly SourceLink[] => [
  ...covenant.sources,
  ...covenant.bridge.flatMap(({ sources }) => sources),
];

const byLineAndPeriod = (one: SheetSource, other: SheetSource): number =>
  one.line.localeCompare(other.line, 'en') || one.periodEnd.localeCompare(other.periodEnd);

function figureSource(
  { view, figureSources }: SheetMaterial,
  link: SourceLink,
  names: readonly string[],
): SheetSource {
  const statement = figureSources.find(({ statementId }) => statementId === link.statementId);
  const cells = cellsOf(figureSources, link);
  return {
    usedIn: names.join(', '),
    line: link.label,
    period: periodText(link.months, link.periodEnd),
    periodEnd: link.periodEnd,
    amount: link.amount,
    currency: statement?.currency ?? view.currency,
    standing: statement ? `${statement.basis}, version ${statement.version}` : '',
    receivedOn: statement?.receivedOn ?? null,
    fileName: statement?.fileName ?? null,
    sha256: statement?.sha256 ?? null,
    sheet: [...new Set(cells.map(({ sheet }) => sheet))].join(', '),
    cells: cells.map(({ cell }) => cell).join(', '),
    rawText: cells.map(({ rawText }) => rawText ?? '').join('; '),
  };
}

function addBackSources(
  material: SheetMaterial,
  { covenant, testDate }: { readonly covenant: CovenantView; readonly testDate: PlainDate },
): readonly SheetSource[] {
  const terms = termsOf(material, covenant);
  if (!terms || !covenant.bridge.some(({ kind }) => kind === 'add-back')) return [];
  const months = monthsOfFlow(terms.definition, terms, testDate);
  return addBacksWithin(months, terms.addBacks, testDate).map((addBack) => ({
    usedIn: covenant.name,
    line: `Add-back: ${addBack.label}`,
    period: periodText(addBack.months, addBack.periodEnd),
    periodEnd: addBack.periodEnd,
    amount: addBack.amount.toFixed(),
    currency: covenant.currency,
    standing: `recorded by the desk: ${addBack.reason === '' ? 'no evidence recorded' : addBack.reason}`,
    receivedOn: null,
    fileName: null,
    sha256: null,
    sheet: '',
    cells: '',
    rawText: '',
  }));
}

const periodText = (months: number, periodEnd: string): string =>
  months === 0 ? `at ${dayText(periodEnd)}` : `${months} months to ${dayText(periodEnd)}`;
