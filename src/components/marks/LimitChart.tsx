import { Chart, Filler, LinearScale, LineElement, PointElement, Tooltip } from 'chart.js';
import { useMemo } from 'react';
import { Line } from 'react-chartjs-2';
import { plainDate } from '../../core/calendar/plainDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { directLabels, limitChartDatasets, limitChartOptions } from './limitChartDrawing.ts';
import { chartText, figureText, type ChartResult, type LimitChartFigures } from './limitChartFigures.ts';
import { OutcomeText } from './OutcomeText.tsx';
import { useSheetColours, type SheetColours } from './sheetColours.ts';

Chart.register(Filler, LinearScale, LineElement, PointElement, Tooltip);

/** A covenant's results against its level over time, with the same figures as a table. */
export function LimitChart(figures: LimitChartFigures) {
  const colours = useSheetColours();
  return (
    <figure>
      <div className="chart">
        {colours && figures.results.length > 0 && (
          <LimitCanvas key={colours.sheet} figures={figures} colours={colours} />
        )}
      </div>
      <figcaption className="type-second mt-2">
        {chartText(figures)} Shaded: {figures.maximum ? 'above' : 'below'} the limit. Filled circles are just
        passing, filled diamonds not met, open ones waived or cured, squares past our trigger.
      </figcaption>
      <details className="mt-2">
        <summary className="cursor-pointer">Figures of this chart</summary>
        <FiguresTable figures={figures} />
      </details>
    </figure>
  );
}

interface LimitCanvasProps {
  readonly figures: LimitChartFigures;
  readonly colours: SheetColours;
}

function LimitCanvas({ figures, colours }: LimitCanvasProps) {
  const data = useMemo(() => ({ datasets: limitChartDatasets(figures, colours) }), [figures, colours]);
  const options = useMemo(() => limitChartOptions(figures, colours, openSource), [figures, colours]);
  const plugins = useMemo(() => [directLabels(figures, colours)], [figures, colours]);
  return <Line role="img" aria-label={chartText(figures)} data={data} options={options} plugins={plugins} />;
}

function openSource({ href }: ChartResult) {
  if (href !== undefined) location.assign(href);
}

function FiguresTable({ figures }: { readonly figures: LimitChartFigures }) {
  const { label, unit, results, second } = figures;
  const secondOn = new Map(second?.values.map((value) => [value.testDate, value.tested]));
  return (
    <ScrollRegion label="Figures of the chart" className="mt-2">
      <Table caption={`${label}, every test of the chart`}>
        <TableHead>
          <tr>
            <HeadCell>Test date</HeadCell>
            <HeadCell numeric>As reported</HeadCell>
            {second && <HeadCell numeric>{second.name}</HeadCell>}
            <HeadCell numeric>Level</HeadCell>
            <HeadCell>Outcome</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {results.map((result) => {
            const other = secondOn.get(result.testDate) ?? null;
            const date = formatDay(plainDate(result.testDate));
            const level = levelOn(figures, result.testDate);
            return (
              <Row key={result.testDate}>
                <th scope="row">{result.href ? <a href={result.href}>{date}</a> : date}</th>
                <Cell numeric>{result.tested === null ? '–' : figureText(result.tested, unit)}</Cell>
                {second && <Cell numeric>{other === null ? '–' : figureText(other, unit)}</Cell>}
                <Cell numeric>{level === null ? '–' : figureText(level, unit)}</Cell>
                <Cell>
                  <OutcomeText outcome={result.outcome} justPassing={result.justPassing} />
                </Cell>
              </Row>
            );
          })}
        </TableBody>
      </Table>
    </ScrollRegion>
  );
}

const levelOn = ({ levels }: LimitChartFigures, date: string): string | null =>
  levels.find(({ from, until }) => from <= date && (until === null || until >= date))?.level ?? null;
