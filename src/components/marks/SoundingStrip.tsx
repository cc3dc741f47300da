import type { StripTest } from '../../contracts/alerts.ts';
import { plainDate } from '../../core/calendar/plainDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { drawStrip, type StripDrawing, type StripMark, type StripSize } from './stripGeometry.ts';
import { stripText, testText } from './stripText.ts';

interface SoundingStripProps {
  readonly tests: readonly StripTest[];
  readonly size: StripSize;
  /** What was tested: "Net leverage". */
  readonly label: string;
}

/** The last twelve tests of a covenant, as soundings over the bed. */
export function SoundingStrip({ tests, size, label }: SoundingStripProps) {
  const drawing = drawStrip(tests, size);
  const { frame } = drawing;
  return (
    <svg
      className={size === 'row' ? 'strip' : 'strip strip-panel'}
      role="img"
      aria-label={stripText(label, tests)}
      width={frame.width}
      height={frame.height}
      viewBox={`0 0 ${frame.width} ${frame.height}`}
    >
      <Bed drawing={drawing} />
      {drawing.marks.map((mark) => (
        <Sounding key={mark.test.testDate} mark={mark} drawing={drawing} />
      ))}
      {size === 'panel' && <Dates drawing={drawing} />}
    </svg>
  );
}

function Bed({ drawing: { frame, steps, shoalY } }: { readonly drawing: StripDrawing }) {
  const { width, limitY, bedBottom, line } = frame;
  return (
    <>
      <rect className="strip-bed" x="0" y={limitY} width={width} height={bedBottom - limitY} />
      <rect className="strip-shoal" x="0" y={shoalY} width={width} height={limitY - shoalY} />
      {steps.map((step) => (
        <path
          key={step.x}
          className="strip-step"
          strokeWidth={line}
          d={`M${step.x} ${limitY}V${(limitY + bedBottom) / 2}`}
        />
      ))}
      <path className="strip-limit" strokeWidth={line} d={`M0 ${limitY + line / 2}H${width}`} />
    </>
  );
}

function Sounding({
  mark,
  drawing: { frame },
}: {
  readonly mark: StripMark;
  readonly drawing: StripDrawing;
}) {
  if (mark.shape === 'gap') return null;
  const { x, y, radius, shape, cut } = mark;
  return (
    <g>
      <title>{testText(mark.test)}</title>
      {shape !== 'cross' && (
        <path className="strip-lead" strokeWidth="1" d={`M${x} 0V${Math.max(y - radius, 0)}`} />
      )}
      {cut === 'above' && <Cut x={x} y={y - radius - frame.ring - 1} reach={frame.ring} line={frame.line} />}
      <Shape mark={mark} line={frame.line} />
      {cut === 'below' && <Cut x={x} y={y + radius + 2} reach={frame.ring} line={frame.line} />}
    </g>
  );
}

function Shape({ mark: { shape, x, y, radius }, line }: { readonly mark: StripMark; readonly line: number }) {
  const diamond = `M${x} ${y - radius}l${radius} ${radius}l${-radius} ${radius}l${-radius} ${-radius}z`;
  switch (shape) {
    case 'ring':
      return <circle className="strip-ring" strokeWidth={line} cx={x} cy={y} r={radius} />;
    case 'just passing':
      return <circle className="strip-just-passing" strokeWidth="0.75" cx={x} cy={y} r={radius + 0.6} />;
    case 'not met':
      return <path className="strip-not-met" strokeWidth="0.75" d={diamond} />;
    case 'waived':
      return <path className="strip-waived" strokeWidth={line} d={diamond} />;
    case 'past our trigger': {
      const half = radius * 0.75;
      return (
        <rect
          className="strip-waived"
          strokeWidth={line}
          x={x - half}
          y={y - half}
          width={2 * half}
          height={2 * half}
        />
      );
    }
    case 'cross': {
      const cross = `M${x - radius} ${y - radius}l${2 * radius} ${2 * radius}m0 ${-2 * radius}l${-2 * radius} ${2 * radius}`;
      return (
        <>
          <path className="strip-halo" strokeWidth={line + 2.5} d={cross} />
          <path className="strip-cross" strokeWidth={line + 0.25} d={cross} />
        </>
      );
    }
    case 'gap':
      return null;
  }
}

interface CutProps {
  readonly x: number;
  readonly y: number;
  readonly reach: number;
  readonly line: number;
}

/** Two short strokes across: the value lies beyond the end of the scale. */
function Cut({ x, y, reach, line }: CutProps) {
  const stroke = (dy: number) => `M${x - reach} ${y + dy + 1}l${2 * reach} -2`;
  return <path className="strip-cut" strokeWidth={line * 0.8} d={`${stroke(-1.2)}${stroke(1.2)}`} />;
}

function Dates({ drawing: { frame, marks } }: { readonly drawing: StripDrawing }) {
  const oldest = marks[0];
  const newest = marks.at(-1);
  const y = frame.height - 4;
  return (
    <g aria-hidden="true">
      {oldest && marks.length > 3 && (
        <text className="strip-text" x={oldest.x - frame.width / 24} y={y}>
          {formatDay(plainDate(oldest.test.testDate))}
        </text>
      )}
      {newest && (
        <text className="strip-text" x={frame.width} y={y} textAnchor="end">
          {formatDay(plainDate(newest.test.testDate))}
        </text>
      )}
    </g>
  );
}
