/** An assessment as stored: JSON with every decimal as text, read back into the core's own type. */
import { z } from 'zod';
import { ALERT_KINDS, SEVERITIES } from '../../core/alerts/alert.ts';
import type { Assessment } from '../../core/assess.ts';
import { isPlainDate, type PlainDate } from '../../core/calendar/plainDate.ts';
import { OPERATORS } from '../../core/covenants/covenant.ts';
import { OUTCOMES } from '../../core/covenants/covenantTest.ts';
import { MEASURE_CODES } from '../../core/measures/measure.ts';
import { decimal } from '../../core/money/decimal.ts';
import { QUALITY_BANDS, QUALITY_BLOCKS } from '../../core/quality/score.ts';
import { isLineItemCode, type LineItemCode } from '../../core/statements/lineItems.ts';

const amount = z.string().transform((text) => decimal(text));
const amountOrNull = amount.nullable();
const day = z.custom<PlainDate>((value) => typeof value === 'string' && isPlainDate(value));
const line = z.custom<LineItemCode>((value) => typeof value === 'string' && isLineItemCode(value));
const outcome = z.enum(OUTCOMES);

const inputUsed = z.object({
  statementId: z.number(),
  line,
  sign: z.union([z.literal(1), z.literal(-1)]),
  amount,
  periodEnd: day,
  months: z.number(),
});

const covenantTest = z.object({
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

const quarterScore = z.object({
  quarterEnd: day,
  score: z.number().nullable(),
  noScoreReason: z.string().nullable(),
  coverage: z.number(),
  blocks: z.array(
    z.object({
      name: z.enum(QUALITY_BLOCKS),
      weight: z.number(),
      risk: z.number().nullable(),
      reason: z.string().nullable(),
      figures: z.record(z.string(), z.number()),
      peers: z.number(),
    }),
  ),
  sectorPeers: z.number(),
  bookPeers: z.number(),
  sectorWeight: z.number(),
  derivedCashFlow: z.boolean(),
});

const quality = z.object({
  headline: z.number().nullable(),
  band: z.enum(QUALITY_BANDS).nullable(),
  provisional: z.boolean(),
  noScoreReason: z.string().nullable(),
  latest: quarterScore.nullable(),
  history: z.array(quarterScore),
  explanations: z.array(z.string()),
  whatWouldChangeIt: z.string().nullable(),
  remarks: z.array(z.string()),
});

const assessment = z.object({
  borrowerId: z.number(),
  asOf: day,
  methodVersion: z.string(),
  policyVersion: z.number(),
  tests: z.array(covenantTest),
  smallestHeadroom: z.object({ covenantId: z.number(), mayFall: amount }).nullable(),
  quality,
  patterns: z.array(
    z.object({
      covenantId: z.number(),
      inBand: z.number(),
      ofLast: z.number(),
      run: z.number(),
      testDates: z.array(day),
    }),
  ),
  findings: z.array(
    z.object({
      kind: z.enum(ALERT_KINDS),
      covenantId: z.number().nullable(),
      severity: z.enum(SEVERITIES),
      factDate: day,
      sentence: z.string(),
      wouldChange: z.string(),
      evidence: z.array(z.object({ label: z.string(), value: z.string() })),
    }),
  ),
});

/**
 * Text to store. A decimal prints itself as text; a number that is no number would be stored as null and lost,
 * so it is refused here.
 */
export const storedAssessment = (value: Assessment): string =>
  JSON.stringify(value, (key, member: unknown) => {
    if (typeof member === 'number' && !Number.isFinite(member))
      throw new RangeError(`the assessment's ${key} is no number: ${member}`);
    return member;
  });

/** Throws where the stored text is no assessment: it was written by storedAssessment, or somebody changed it. */
export const readAssessment = (content: string): Assessment => assessment.parse(JSON.parse(content));
