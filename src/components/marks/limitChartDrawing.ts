import type { Chart, ChartDataset, ChartOptions, Plugin, PointStyle } from 'chart.js';
import { formatDay } from '../../core/calendar/printDay.ts';
import { fromEpochDay } from '../../core/calendar/plainDate.ts';
import { isNotMet, isPastOurTrigger, isShort } from '../../core/covenants/covenantTest.ts';
import {
  chartRange,
  dayOf,
  figureText,
  levelSegments,
  type ChartPoint,
  type ChartResult,
  type LevelSegment,
  type LimitChartFigures,
} from './limitChartFigures.ts';
import type { SheetColours } from './sheetColours.ts';

type LineDataset = ChartDataset<'line', { x: number; y: number | null }[]>;

/** 1 below a line on the screen, -1 above it. */
type Side = 1 | -1;

const RING = 5;
const TEXT_AIR = 8;

const RESULTS_DATASET = 0;

export function limitChartDatasets(figures: LimitChartFigures, colours: SheetColours): LineDataset[] {
  const { results, second, maximum } = figures;
  const datasets: LineDataset[] = [
    {
      label: 'as reported',
      data: results.map(({ testDate, tested }) => pointAt(testDate, tested)),
      borderColor: colours['ink-2'],
      borderWidth: 1,
      pointStyle: results.map(styleOf),
      pointRadius: results.map((result) => (isShort(result.outcome) ? RING + 1 : RING)),
      pointHoverRadius: RING + 2,
      pointBorderWidth: 1.5,
      pointBorderColor: results.map((result) => (isFilled(result) ? colours.magenta : colours.ink)),
      pointBackgroundColor: results.map((result) => (isFilled(result) ? colours.magenta : colours.sheet)),
    },
    {
      label: 'level',
      data: levelLine(levelSegments(figures)),
      borderColor: colours.ink,
      borderWidth: 2,
      pointRadius: 0,
      pointHitRadius: 0,
      fill: maximum ? 'end' : 'start',
      backgroundColor: colours.land,
      order: 2,
    },
  ];
  if (second)
    datasets.push({
      label: second.name,
      data: second.values.map(({ testDate, tested }) => pointAt(testDate, tested)),
      borderColor: colours.ink,
      borderWidth: 1.5,
      borderDash: [6, 4],
      pointRadius: 0,
      order: 1,
    });
  return datasets;
}

const pointAt = (testDate: string, tested: string | null) => ({
  x: dayOf(testDate),
  y: tested === null ? null : Number(tested),
});

/** Segments as one line; a gap between two (a holiday) stays open. */
function levelLine(segments: readonly LevelSegment[]) {
  return segments.flatMap(({ start, end }, position) => {
    const before = segments[position - 1];
    const gap = before && before.end.x < start.x ? [{ x: before.end.x, y: null }] : [];
    return [...gap, { ...start }, { ...end }];
  });
}

const isWaived = (result: ChartResult): boolean => result.outcome === 'not met, waived';
const isFilled = (result: ChartResult): boolean =>
  result.justPassing || (isNotMet(result.outcome) && !isWaived(result));
const styleOf = ({ outcome }: ChartResult): PointStyle => {
  if (isPastOurTrigger(outcome)) return 'rect';
  return isShort(outcome) ? 'rectRot' : 'circle';
};

export function limitChartOptions(
  figures: LimitChartFigures,
  colours: SheetColours,
  onOpen: (result: ChartResult) => void,
): ChartOptions<'line'> {
  const range = chartRange(figures);
  const font = { family: 'Roboto Flex Variable', size: 12 };
  const days = figures.results.map((result) => dayOf(result.testDate));
  return {
    animation: false,
    responsive: true,
    maintainAspectRatio: false,
    layout: { padding: { top: 6, right: 8 } },
    onClick: (_event, elements) => {
      const hit = elements.find((element) => element.datasetIndex === RESULTS_DATASET);
      const result = hit && figures.results[hit.index];
      if (result) onOpen(result);
    },
    scales: {
      x: {
        type: 'linear',
        min: range.first - 20,
        max: range.last,
        border: { display: false },
        grid: { display: false },
        afterBuildTicks: (axis) => {
          axis.ticks = days.map((value) => ({ value }));
        },
        ticks: {
          color: colours['ink-2'],
          font,
          maxRotation: 0,
          autoSkipPadding: 18,
          callback: (value) => formatDay(fromEpochDay(Number(value))).slice(-8),
        },
      },
      y: {
        min: range.low,
        max: range.high,
        border: { display: false },
        grid: { display: false },
        ticks: {
          color: colours['ink-2'],
          font,
          includeBounds: false,
          maxTicksLimit: 6,
          callback: (value) => figureText(String(value), figures.unit),
        },
      },
    },
    plugins: {
      tooltip: {
        filter: (item) => item.datasetIndex !== 1,
        backgroundColor: colours.ink,
        titleColor: colours.sheet,
        bodyColor: colours.sheet,
        titleFont: font,
        bodyFont: font,
        cornerRadius: 0,
        displayColors: false,
        callbacks: {
          title: (items) => (items[0] ? formatDay(fromEpochDay(Number(items[0].parsed.x))) : ''),
          label: (item) => tooltipText(figures, item.datasetIndex, item.dataIndex),
        },
      },
    },
  };
}

function tooltipText(figures: LimitChartFigures, dataset: number, index: number): string {
  const result = figures.results[index];
  if (dataset === RESULTS_DATASET && result?.tested)
    return `${figureText(result.tested, figures.unit)}, ${result.outcome}${result.justPassing ? ', just passing' : ''}`;
  const value = figures.second?.values[index]?.tested;
  return value && figures.second ? `${figureText(value, figures.unit)} ${figures.second.name}` : '';
}

/** Names each line where it runs, so that no legend is needed. */
export function directLabels(figures: LimitChartFigures, colours: SheetColours): Plugin<'line'> {
  const [passing, failing]: [Side, Side] = figures.maximum ? [1, -1] : [-1, 1];
  return {
    id: 'directLabels',
    afterDatasetsDraw(chart) {
      const { ctx } = chart;
      ctx.save();
      ctx.font = '13px "Roboto Flex Variable", sans-serif';
      ctx.fillStyle = colours.ink;
      const segments = levelSegments(figures);
      const results = figures.results.map(({ testDate, tested }) => pointAt(testDate, tested));
      const lines = [
        results,
        (figures.second?.values ?? []).map(({ testDate, tested }) => pointAt(testDate, tested)),
        levelLine(segments),
      ].map((line) => drawnPoints(chart, line));
      segments.forEach((segment) =>
        labelLevel(chart, segment, { side: failing, isLast: segment === segments.at(-1), lines }),
      );
      ctx.strokeStyle = colours.sheet;
      labelLine(chart, results, 'as reported', passing, 0.75);
      const { second } = figures;
      if (second) {
        const values = second.values.map(({ testDate, tested }) => pointAt(testDate, tested));
        labelLine(chart, values, second.name, failing, 1);
      }
      ctx.restore();
    },
  };
}

type Line = readonly ChartPoint[];

const drawnPoints = (
  chart: Chart<'line'>,
  line: readonly { readonly x: number; readonly y: number | null }[],
): Line => line.flatMap(({ x, y }) => (y === null ? [] : [pixel(chart, { x, y })]));

/** Shares of the room along a segment at which its name is tried, the start first. */
const PLACES = [0, 0.25, 0.5, 0.75, 1] as const;

/**
 * On the failing side of its segment, at the first place where no line runs through the name; else on the other side.
 * Where the segment is too short, the last level is named at the right edge on the other side, and an earlier one only
 * in the table.
 */
function labelLevel(
  chart: Chart<'line'>,
  { start, end, text }: LevelSegment,
  { side, isLast, lines }: { readonly side: Side; readonly isLast: boolean; readonly lines: readonly Line[] },
) {
  const left = pixel(chart, start);
  const right = pixel(chart, end);
  const { width } = chart.ctx.measureText(text);
  const room = right.x - left.x - width - 2 * TEXT_AIR;
  const other: Side = side === 1 ? -1 : 1;
  if (room < 0) {
    chart.ctx.textAlign = 'right';
    if (isLast) write(chart, text, chart.chartArea.right, left.y, other);
    return;
  }
  const places = [side, other].flatMap((onSide) =>
    PLACES.map((share) => ({ onSide, x: left.x + 6 + share * room })),
  );
  const free = places.find(
    ({ onSide, x }) => !lines.some((line) => crosses(line, boxOf(x, left.y, width, onSide))),
  );
  const { onSide, x } = free ?? { onSide: side, x: left.x + 6 };
  chart.ctx.textAlign = 'left';
  write(chart, text, x, left.y, onSide);
}

interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

const TEXT_HEIGHT = 13;

function boxOf(x: number, y: number, width: number, side: Side): Box {
  const near = y + side * (TEXT_AIR / 2);
  const far = y + side * (TEXT_AIR + TEXT_HEIGHT);
  return { left: x, right: x + width, top: Math.min(near, far), bottom: Math.max(near, far) };
}

const STEPS_ALONG = 24;

/** Whether a line runs through a box; looked at in small steps along each of its parts. */
const crosses = (line: Line, box: Box): boolean =>
  line.some((to, place) => {
    const from = line[place - 1] ?? to;
    return Array.from({ length: STEPS_ALONG + 1 }, (_, step) => step / STEPS_ALONG).some((share) => {
      const x = from.x + share * (to.x - from.x);
      const y = from.y + share * (to.y - from.y);
      return x >= box.left && x <= box.right && y >= box.top && y <= box.bottom;
    });
  });

/** Beside the point that lies so far along the line. */
function labelLine(
  chart: Chart<'line'>,
  points: readonly { readonly x: number; readonly y: number | null }[],
  text: string,
  side: Side,
  along: number,
) {
  const drawn = points.flatMap(({ x, y }) => (y === null ? [] : [{ x, y }]));
  const point = drawn[Math.round((drawn.length - 1) * along)];
  if (!point) return;
  const at = pixel(chart, point);
  chart.ctx.textAlign = along === 1 ? 'right' : 'center';
  // The name may lie on its own line: a halo of the sheet keeps it readable.
  if (along < 1) halo(chart, text, at.x, at.y, side, RING);
  write(chart, text, at.x + (along === 1 ? RING : 0), at.y, side, RING);
}

function write(chart: Chart<'line'>, text: string, x: number, y: number, side: Side, off = 0) {
  chart.ctx.textBaseline = side === 1 ? 'top' : 'bottom';
  chart.ctx.fillText(text, x, y + side * (TEXT_AIR + off));
}

function halo(chart: Chart<'line'>, text: string, x: number, y: number, side: Side, off: number) {
  chart.ctx.textBaseline = side === 1 ? 'top' : 'bottom';
  chart.ctx.lineWidth = 5;
  chart.ctx.lineJoin = 'round';
  chart.ctx.strokeText(text, x, y + side * (TEXT_AIR + off));
}

function pixel(chart: Chart<'line'>, { x, y }: ChartPoint): ChartPoint {
  return {
    x: chart.scales['x']?.getPixelForValue(x) ?? 0,
    y: chart.scales['y']?.getPixelForValue(y) ?? 0,
  };
}
