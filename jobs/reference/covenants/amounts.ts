/** How the files write amounts, and what the core's words are called there. */
import { z } from 'zod';
import type { Held } from '#core/covenants/holdAgainstLevel.ts';
import { isMet, isNotMet, type Outcome } from '#core/covenants/covenantTest.ts';
import type { Terms } from '#core/covenants/holdAgainstLevel.ts';
import { isPlainDate, plainDate } from '#core/calendar/plainDate.ts';
import { decimal, type Decimal } from '#core/money/decimal.ts';

export const amount = z.number().transform((value): Decimal => decimal(value));
export const day = z
  .string()
  .refine(isPlainDate, 'not a day')
  .transform((text) => plainDate(text));

/** The files' word for an outcome. */
export function status(outcome: Outcome): string {
  if (outcome === 'not met, waived') return 'waived';
  if (isMet(outcome)) return 'pass';
  if (isNotMet(outcome)) return 'fail';
  if (outcome === 'cannot be tested') return 'untestable';
  return outcome === 'awaiting figures' ? 'awaiting statements' : outcome;
}

export const atMost = (level: Decimal, roundingPlaces: number | null = null): Terms => ({
  operator: '<=',
  level,
  roundingPlaces,
});

export const atLeast = (level: Decimal): Terms => ({ operator: '>=', level, roundingPlaces: null });

/** What every ratio test gives. */
export const resultOf = ({ outcome, tested, reason, headroom }: Held): Record<string, unknown> => ({
  status: status(outcome),
  ratio: tested,
  reason,
  headroom_abs: headroom.absolute,
  headroom_rel: headroom.shareOfLevel,
});

/** The same with the cushions of a cover. */
export const coverResultOf = (held: Held): Record<string, unknown> => ({
  ...resultOf(held),
  numerator_cushion: held.headroom.mayFall,
  charge_cushion: held.headroom.otherSideShare,
});
