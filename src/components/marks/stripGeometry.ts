/**
 * Where everything of a sounding strip stands. Heights are what earnings may fall, on one scale for all strips, and the
 * limit is always at the same height, so that strips compare down a column.
 */
import type { StripTest } from '../../contracts/alerts.ts';
import { POLICY_VERSION_1 } from '../../core/policy.ts';

export type StripSize = 'row' | 'panel';

const STRIP_TESTS = 12;

/** Ends of the scale, in points of what earnings may fall. */
const SCALE_TOP_POINTS = 30;
const SCALE_BOTTOM_POINTS = -15;

export interface StripFrame {
  readonly width: number;
  /** Bottom of the bed. */
  readonly bedBottom: number;
  /** Height of the whole picture: the bed, and at panel size the dates under it. */
  readonly height: number;
  readonly limitY: number;
  readonly pixelsPerPoint: number;
  readonly ring: number;
  readonly newestRing: number;
  readonly diamond: number;
  readonly newestDiamond: number;
  readonly line: number;
}

export const STRIP_FRAMES: Readonly<Record<StripSize, StripFrame>> = {
  row: {
    width: 150,
    bedBottom: 48,
    height: 48,
    limitY: 34,
    pixelsPerPoint: 0.8,
    ring: 2.6,
    newestRing: 3.6,
    diamond: 3.6,
    newestDiamond: 4.6,
    line: 1.25,
  },
  panel: {
    width: 336,
    bedBottom: 122,
    height: 140,
    limitY: 82,
    pixelsPerPoint: 2.2,
    ring: 3.6,
    newestRing: 5,
    diamond: 5,
    newestDiamond: 6.4,
    line: 1.5,
  },
};

export type StripShape =
  'ring' | 'just passing' | 'not met' | 'waived' | 'past our trigger' | 'cross' | 'gap';

export interface StripMark {
  readonly test: StripTest;
  readonly shape: StripShape;
  readonly x: number;
  readonly y: number;
  readonly radius: number;
  readonly newest: boolean;
  /** Beyond the end of the scale: drawn at its end with a cut. */
  readonly cut: 'above' | 'below' | null;
}

export interface StripDrawing {
  readonly frame: StripFrame;
  readonly marks: readonly StripMark[];
  /** Where the level in force changed between two tests. */
  readonly steps: readonly { readonly x: number; readonly from: string; readonly to: string }[];
  readonly shoalY: number;
}

const BAND_OF_VERSION_1 = Number(POLICY_VERSION_1.justPassingBand);

/** The last twelve tests in date order, the newest at the right edge whatever their number; the band is the newest's. */
export function drawStrip(tests: readonly StripTest[], size: StripSize): StripDrawing {
  const frame = STRIP_FRAMES[size];
  const shown = lastTests(tests);
  const band = Number(shown.at(-1)?.band ?? BAND_OF_VERSION_1);
  const slot = frame.width / STRIP_TESTS;
  const firstSlot = STRIP_TESTS - shown.length;
  const marks = shown.map((test, position) => {
    const newest = position === shown.length - 1;
    return markOf(test, frame, (firstSlot + position + 0.5) * slot, newest);
  });
  const steps = marks.flatMap((mark, position) => {
    const before = shown[position - 1]?.level ?? null;
    const now = mark.test.level;
    if (before === null || now === null || Number(before) === Number(now)) return [];
    return [{ x: mark.x - slot / 2, from: before, to: now }];
  });
  return { frame, marks, steps, shoalY: heightOf(band * 100, frame) };
}

export function lastTests(tests: readonly StripTest[]): readonly StripTest[] {
  return [...tests].sort((a, b) => (a.testDate < b.testDate ? -1 : 1)).slice(-STRIP_TESTS);
}

function markOf(test: StripTest, frame: StripFrame, x: number, newest: boolean): StripMark {
  const shape = shapeOf(test);
  const below = shape === 'not met' || shape === 'waived' || shape === 'past our trigger';
  const radius = below
    ? newest
      ? frame.newestDiamond
      : frame.diamond
    : newest
      ? frame.newestRing
      : frame.ring;
  const base = { test, shape, x, newest, radius };
  if (shape === 'gap' || shape === 'cross') return { ...base, y: frame.limitY, cut: null };

  // A test without a meaningful share stands beyond the end of its side: net cash far above, a ratio without meaning below.
  const points = test.mayFall === null ? (below ? -Infinity : Infinity) : Number(test.mayFall) * 100;
  const cut = points > SCALE_TOP_POINTS ? 'above' : points < SCALE_BOTTOM_POINTS ? 'below' : null;
  const onScale = Math.min(Math.max(points, SCALE_BOTTOM_POINTS), SCALE_TOP_POINTS);
  const height = heightOf(onScale, frame);
  // The outcome decides the side, also where the agreement's rounding turns a hair's breadth either way.
  const y = below ? Math.max(height, frame.limitY + radius + 0.75) : Math.min(height, frame.limitY);
  return { ...base, y, cut };
}

function heightOf(points: number, frame: StripFrame): number {
  return frame.limitY - points * frame.pixelsPerPoint;
}

function shapeOf({ outcome, justPassing }: StripTest): StripShape {
  switch (outcome) {
    case 'met':
    case 'met, thin':
    case 'met, net cash':
    case 'met, no charge to cover':
      return justPassing ? 'just passing' : 'ring';
    case 'not met':
    case 'not met, ratio has no meaning':
    case 'not met, in cure period':
      return 'not met';
    case 'not met, waived':
    case 'cured':
      return 'waived';
    case 'above our trigger':
    case 'below our trigger':
      return 'past our trigger';
    case 'cannot be tested':
      return 'cross';
    case 'not tested':
    case 'awaiting figures':
      return 'gap';
  }
}
