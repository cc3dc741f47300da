import { z } from 'zod';
import { OPERATORS } from '../../../core/covenants/covenant.ts';
import { MEASURE_CODES } from '../../../core/measures/measure.ts';
import { amount, amountOrNull, day, inputUsed, line, outcome } from './parts.ts';

export const covenantTest = z.object({
  covenantId: z.number(),
  measure: z.enum(MEASURE_CODES),
  testDate: day,
  operator: z.enum(OPERATORS),
  level: amountOrNull,
  nextLevel: z.object({ from: day, level: amountOrNull }).nullable(),
  tested: amountOrNull,
  numerator: amountOrNull,
  denominator: amountOrNull,
  outcome,
  underlyingOutcome: outcome,
  reason: z.string().nullable(),
  headroom: z.object({
    absolute: amountOrNull,
    shareOfLevel: amountOrNull,
    mayFall: amountOrNull,
    fallOf: z.enum(['earnings', 'tested amount']),
    moneyLeft: amountOrNull,
    otherSideMayRise: amountOrNull,
    otherSideShare: amountOrNull,
  }),
  againstLaterLevels: z.array(z.object({ from: day, level: amount, outcome, mayFall: amountOrNull })),
  justPassing: z.boolean(),
  bridge: z.array(
    z.object({
      label: z.string(),
      amount,
      kind: z.enum(['figure', 'subtotal', 'add-back', 'disallowed']),
      inputs: z.array(inputUsed),
    }),
  ),
  counterfactuals: z.array(
    z.object({
      kind: z.literal('without add-backs'),
      earningsTakenOut: amount,
      ratio: amountOrNull,
      outcome,
      breakEvenShare: amountOrNull,
    }),
  ),
  inputs: z.array(inputUsed),
  missing: z.array(
    z.object({ line: z.union([line, z.literal('statement')]), periodEnd: day, months: z.number() }),
  ),
});
