import type { HeadroomHistogram as Histogram } from '../../core/patterns/headroomHistogram.ts';
import type { SidesOfLimit } from '../../core/patterns/sidesOfLimit.ts';
import { edge } from '../../core/patterns/windows.ts';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { countText, shareText } from './bookWords.ts';

interface HeadroomHistogramProps {
  readonly histogram: Histogram;
  /** At the same width: the counts expected from the neighbours. */
  readonly sides: SidesOfLimit;
}

const HEIGHT = 240;
/** Room above the tallest bar. */
const TALLEST = 220;
const LABEL_EVERY = 0.1;

/** Where test results land, as a share of the level, with the same figures as a table. */
export function HeadroomHistogram({ histogram, sides }: HeadroomHistogramProps) {
  const { width, from, counts, below, above } = histogram;
  const until = edge(counts.length, width, from);
  return (
    <figure>
      <p className="histogram-limit type-small" aria-hidden="true">
        limit
      </p>
      <Bars histogram={histogram} sides={sides} />
      <div className="histogram-axis type-small" aria-hidden="true">
        {labelsOf(from, until).map((label) => (
          <span key={label}>{shareText(label)}</span>
        ))}
      </div>
      <figcaption className="type-second mt-2">
        Headroom as a share of the level, intervals of {shareText(width)}. Shaded: failing side of the limit.
        The first interval on the passing side is filled; the two short lines at the limit are the counts
        expected from the neighbouring intervals. Tallest bar: {countText(Math.max(...counts))} tests. Further
        out on the failing side: {countText(below)}, on the passing side: {countText(above)}.
      </figcaption>
      <details className="mt-2">
        <summary className="cursor-pointer">Figures of this chart</summary>
        <HistogramTable histogram={histogram} />
      </details>
    </figure>
  );
}

function Bars({ histogram: { width, from, counts }, sides }: HeadroomHistogramProps) {
  const tallest = Math.max(...counts, sides.left.expected, sides.right.expected, 1);
  const heightOf = (count: number): number => (TALLEST * count) / tallest;
  const limit = Math.round(-from / width);
  const lineAt = (bin: number, expected: number) => (
    <path
      className="histogram-expected"
      d={`M${bin} ${HEIGHT - heightOf(expected)}h1`}
      vectorEffect="non-scaling-stroke"
    />
  );
  return (
    <svg
      className="histogram"
      viewBox={`0 0 ${counts.length} ${HEIGHT}`}
      preserveAspectRatio="none"
      role="img"
      aria-label={`${countText(sides.bins.right)} tests in the first interval on the passing side, ${sides.right.expected.toFixed(1)} expected from its neighbours; ${countText(sides.bins.left)} in the first on the failing side, ${sides.left.expected.toFixed(1)} expected`}
    >
      <rect className="strip-bed" x="0" y="0" width={limit} height={HEIGHT} />
      {counts.map((count, bin) => (
        <rect
          key={bin}
          className={bin === limit ? 'histogram-bar histogram-passing' : 'histogram-bar'}
          x={bin + 0.06}
          y={HEIGHT - heightOf(count)}
          width="0.88"
          height={heightOf(count)}
        />
      ))}
      <path className="histogram-line" d={`M${limit} 0V${HEIGHT}`} vectorEffect="non-scaling-stroke" />
      {lineAt(limit - 1, sides.left.expected)}
      {lineAt(limit, sides.right.expected)}
    </svg>
  );
}

function labelsOf(from: number, until: number): readonly number[] {
  const count = Math.round((until - from) / LABEL_EVERY) + 1;
  return Array.from({ length: count }, (_, k) => edge(k, LABEL_EVERY, from));
}

function HistogramTable({
  histogram: { width, from, counts, below, above },
}: {
  readonly histogram: Histogram;
}) {
  const until = edge(counts.length, width, from);
  return (
    <ScrollRegion label="Figures of the chart" className="mt-2">
      <Table caption="Tests by headroom as a share of the level; an interval begins at its first figure and ends before its second">
        <TableHead>
          <tr role="row">
            <HeadCell>Headroom</HeadCell>
            <HeadCell>Side</HeadCell>
            <HeadCell numeric>Tests</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          <Row>
            <th scope="row">below {shareText(from)}</th>
            <Cell>failing</Cell>
            <Cell numeric>{countText(below)}</Cell>
          </Row>
          {counts.map((count, bin) => {
            const low = edge(bin, width, from);
            return (
              <Row key={low}>
                <th scope="row">
                  {shareText(low)} to {shareText(edge(bin + 1, width, from))}
                </th>
                <Cell>{low < 0 ? 'failing' : 'passing'}</Cell>
                <Cell numeric>{countText(count)}</Cell>
              </Row>
            );
          })}
          <Row>
            <th scope="row">{shareText(until)} and more</th>
            <Cell>passing</Cell>
            <Cell numeric>{countText(above)}</Cell>
          </Row>
        </TableBody>
      </Table>
    </ScrollRegion>
  );
}
