import {
  HONEST_KINDS,
  type Bound,
  type Flags,
  type HeadroomCellFigures,
  type HeadroomTotals,
  type MeasuredArea,
  type Spread,
  type ValidationFigures,
} from '../../contracts/validation.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatShare } from '../../core/money/print.ts';
import { Panel } from '../ui/Panel.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';

/** An area to three digits; a dash where there is none. */
const area = (value: number | null): string => (value === null ? '–' : value.toFixed(3));
const share = (value: number | null): string => (value === null ? '–' : formatShare(decimal(value)));

interface FigureTableProps {
  readonly title: string;
  readonly caption: string;
  readonly heads: readonly string[];
  readonly rows: readonly (readonly string[])[];
}

/** A table of figures; the first column names its row. */
function FigureTable({ title, caption, heads, rows }: FigureTableProps) {
  const [named = '', ...numeric] = heads;
  return (
    <Panel flush title={title}>
      <ScrollRegion label={caption}>
        <Table caption={caption} className="mt-2">
          <TableHead>
            <tr role="row">
              <HeadCell>{named}</HeadCell>
              {numeric.map((head) => (
                <HeadCell key={head} numeric>
                  {head}
                </HeadCell>
              ))}
            </tr>
          </TableHead>
          <TableBody>
            {rows.map(([name, ...cells]) => (
              <Row key={name}>
                <th scope="row" role="rowheader">
                  {name}
                </th>
                {cells.map((cell, place) => (
                  <Cell key={numeric[place]} numeric nowrap>
                    {cell}
                  </Cell>
                ))}
              </Row>
            ))}
          </TableBody>
        </Table>
      </ScrollRegion>
    </Panel>
  );
}

/** What the command promises, and whether it holds: the figures by which it ends well or not. */
export const BoundsTable = ({ bounds }: { readonly bounds: readonly Bound[] }) => (
  <FigureTable
    title="What must hold"
    caption="Bounds of the validation, as reached"
    heads={['Bound', 'At', 'Reached', 'Holds']}
    rows={bounds.map(({ what, bound, reached, holds }) => [
      what,
      area(bound),
      area(reached),
      holds ? 'yes' : 'no',
    ])}
  />
);

const spread = ({ mean, deviation, least, most }: Spread): readonly string[] =>
  [mean, deviation, least, most].map(area);

/** The score, the headline and every published measure alone, on the same books. */
export function AreasTable({ books }: { readonly books: ValidationFigures['statementBooks'] }) {
  const measured: readonly MeasuredArea[] = [books.score, books.headline, ...books.measures];
  return (
    <FigureTable
      title="Score and published measures, on the same books"
      caption={`Area under the curve over the seeds, and what the worst tenth of each book holds; ${books.firms} firms a book, ${books.lifters} of them lifting, ${books.quarters} quarters`}
      heads={[
        'Measure',
        'Mean area',
        'Deviation',
        'Least',
        'Most',
        'Honest marked',
        'Lifting marked',
        'Marked that are honest',
      ]}
      rows={measured.map(({ name, area: over, worstTenth }) => [
        name,
        ...spread(over),
        share(worstTenth.size),
        share(worstTenth.power),
        share(worstTenth.falseShare),
      ])}
    />
  );
}

/** Where the score is strong and where it is weak. */
export const PartsTable = ({ books }: { readonly books: ValidationFigures['statementBooks'] }) => (
  <FigureTable
    title="By block, by channel, by how long it has gone on"
    caption="Area under the curve of the score’s parts"
    heads={['Part', 'Mean area', 'Deviation', 'Least', 'Most']}
    rows={[...books.blocks, ...books.byChannel, ...books.byQuartersIn].map(({ name, area: over }) => [
      name,
      ...spread(over),
    ])}
  />
);

/** False alarms by kind of firm, at lines that are published or that the product uses. */
export const LinesTable = ({ lines }: { readonly lines: readonly Flags[] }) => (
  <FigureTable
    title="At a line: false alarms by kind of firm"
    caption="Shares of honest firms marked, by what makes their accounts unusual"
    heads={['Line', 'Honest', 'Lifting', 'Marked that are honest', ...HONEST_KINDS.map((kind) => `${kind}s`)]}
    rows={lines.map(({ test, size, power, falseShare, falseAlarms }) => [
      test,
      share(size),
      share(power),
      share(falseShare),
      ...HONEST_KINDS.map((kind) => share(falseAlarms[kind])),
    ])}
  />
);

/** How often a list appears, and how much of it is false. */
export const ListsTable = ({ totals }: { readonly totals: readonly HeadroomTotals[] }) => (
  <FigureTable
    title="Lists of just-passing patterns"
    caption="Simulated books of tests, all sizes together"
    heads={[
      'Books',
      'Number',
      'With a list',
      'False share, mean of books',
      'False share, of all listed',
      'Never lifted',
    ]}
    rows={totals.map((total) => [
      total.kind,
      String(total.books),
      share(total.withList),
      share(total.falseShare),
      share(total.falseShareOfListed),
      share(total.neverLiftedOfListed),
    ])}
  />
);

const cellName = ({ headroom, tests, lifting, cushionSeekers }: HeadroomCellFigures): string =>
  `${headroom} headroom, ${tests} tests, ${share(lifting)} lifting, ${share(cushionSeekers)} cushion seekers`;

/** The same by kind of book, beside a plain count of tests just inside the limit. */
export const CellsTable = ({ cells }: { readonly cells: readonly HeadroomCellFigures[] }) => (
  <FigureTable
    title="By kind of book, beside a plain count"
    caption="Lists and ranking by headroom, number of tests, share that lifts and share of cushion seekers"
    heads={[
      'Books of',
      'Gate open',
      'With a list',
      'False share',
      'Lifting listed',
      'Area, ranking',
      'Area, plain count',
      'False share, plain count',
    ]}
    rows={cells.map((cell) => [
      cellName(cell),
      share(cell.gateOpen),
      share(cell.withList),
      share(cell.falseShareOfListed),
      share(cell.power),
      area(cell.area),
      area(cell.count.area),
      share(cell.count.falseShareOfListed),
    ])}
  />
);
