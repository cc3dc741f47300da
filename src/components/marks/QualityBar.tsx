import type { QualityBand } from '../../core/quality/score.ts';

const WIDTH = 66;
const HEIGHT = 8;

interface RuledScaleProps {
  /** 0 to 100. */
  readonly score: number;
}

/** The ruled scale alone, ink only; the number stands beside it. */
export function RuledScale({ score }: RuledScaleProps) {
  const filled = (Math.min(Math.max(score, 0), 100) / 100) * (WIDTH - 2);
  return (
    <svg
      className="inline-block flex-none"
      width={WIDTH}
      height={HEIGHT}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      aria-hidden="true"
      focusable="false"
    >
      <rect className="bar-frame" x="0.5" y="0.5" width={WIDTH - 1} height={HEIGHT - 1} />
      <rect className="bar-ink" x="1" y="1" width={filled} height={HEIGHT - 2} />
      {[0.25, 0.5, 0.75].map((quarter) => {
        const x = 1 + quarter * (WIDTH - 2);
        const over = x < 1 + filled;
        return (
          <path
            key={quarter}
            className={over ? 'bar-quarter-over-ink' : 'bar-quarter'}
            strokeWidth="1"
            d={`M${x} 1.5V${HEIGHT - 1.5}`}
          />
        );
      })}
    </svg>
  );
}

interface QualityBarProps {
  readonly score: number | null;
  readonly band: QualityBand | null;
  /** Why there is no score; printed in its place. */
  readonly noScoreReason?: string | null;
  /** One quarter end only. */
  readonly provisional?: boolean;
  /** In a table the word stands under the bar, elsewhere at its right. */
  readonly stacked?: boolean;
}

/** Reporting quality: number left, scale, word right. Never a colour. */
export function QualityBar({ score, band, noScoreReason, provisional, stacked }: QualityBarProps) {
  if (score === null)
    return (
      <span className="type-second type-small">No score{noScoreReason ? `: ${noScoreReason}` : ''}</span>
    );
  const word = `${band ?? ''}${provisional ? ', provisional' : ''}`;
  return (
    <span className={stacked ? 'block' : 'inline-flex items-center gap-3'}>
      <span className="inline-flex items-center gap-3">
        <span className="type-name min-w-5">{Math.round(score)}</span>
        <RuledScale score={score} />
      </span>
      <span className={stacked ? 'type-second type-small block' : undefined}>{word}</span>
    </span>
  );
}
