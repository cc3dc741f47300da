import { z } from 'zod';
import { OPERATORS } from '../../../core/covenants/covenant.ts';
import { COUNTERFACTUAL_KINDS } from '../../../core/covenants/covenantTest.ts';
import { BRIDGE_KINDS } from '../../../core/measures/bridge.ts';
import { MEASURE_CODES } from '../../../core/measures/measure.ts';
import { amount, amountOrNull, day, inputUsed, line, outcome } from './parts.ts';

const cureMethod = z.enum(['ebitda', 'debt', 'both']);

const springing = z.object({
  drawn: amount,
  commitment: amount,
  utilisation: amountOrNull,
  trigger: amount,
});

const waiver = z.object({ grantedOn: day, until: day.nullable(), conditions: z.string() });

const cure = z.object({
  curedBy: z.enum(['money', 'money of an earlier quarter', 'the next test']).nullable(),
  method: cureMethod.nullable(),
  periodEnds: day.nullable(),
  needed: z.object({ ebitda: amountOrNull, debt: amountOrNull, both: amountOrNull }),
  received: amountOrNull,
  receivedOn: day.nullable(),
  counted: amountOrNull,
  carried: amount,
  countsUntil: day.nullable(),
  ratioWith: amountOrNull,
  usedInFour: z.number(),
  mostInFour: z.number().nullable(),
  usedInLife: z.number(),
  mostInLife: z.number().nullable(),
});

const otherAccounting = z.object({
  accounting: z.enum(['current', 'frozen']),
  numerator: amount,
  denominator: amountOrNull,
  tested: amountOrNull,
  outcome,
});

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
  againstLaterLevels: z.array(
    z.object({
      from: day,
      level: amount,
      outcome,
      mayFall: amountOrNull,
      shareOfLevel: amountOrNull.default(null),
      moneyLeft: amountOrNull.default(null),
      otherSideMayRise: amountOrNull.default(null),
    }),
  ),
  justPassing: z.boolean(),
  roomInDeviations: amountOrNull.default(null),
  springing: springing.nullable().default(null),
  waiver: waiver.nullable().default(null),
  cure: cure.nullable().default(null),
  isFirstUnderReset: z.boolean().default(false),
  bridge: z.array(
    z.object({
      label: z.string(),
      amount,
      kind: z.enum(BRIDGE_KINDS),
      inputs: z.array(inputUsed),
      note: z.string().optional(),
    }),
  ),
  earnings: amountOrNull.default(null),
  otherAccounting: otherAccounting.nullable().default(null),
  counterfactuals: z.array(
    z.object({
      kind: z.enum(COUNTERFACTUAL_KINDS),
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
