/** An assessment as stored: JSON with every decimal as text, read back into the core's own type. */
import { z } from 'zod';
import { ALERT_KINDS, SEVERITIES } from '../../core/alerts/alert.ts';
import type { Assessment } from '../../core/assess.ts';
import { finiteJson } from './finiteJson.ts';
import { covenantTest } from './stored/covenantTest.ts';
import { projections, sensitivity } from './stored/outlook.ts';
import { amount, day } from './stored/parts.ts';
import { nearLine } from './stored/patterns.ts';
import { quality } from './stored/quality.ts';

const assessment = z.object({
  borrowerId: z.number(),
  asOf: day,
  methodVersion: z.string(),
  policyVersion: z.number(),
  tests: z.array(covenantTest),
  smallestHeadroom: z.object({ covenantId: z.number(), mayFall: amount }).nullable(),
  headroomsAhead: z.array(z.object({ covenantId: z.number(), from: day, mayFall: amount })).default([]),
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
  nearLine,
  projections,
  sensitivity,
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

/** Text to store; refused where a number in it is none. */
export const storedAssessment = (value: Assessment): string => finiteJson('the assessment', value);

/** Throws where the stored text is no assessment: it was written by storedAssessment, or somebody changed it. */
export const readAssessment = (content: string): Assessment => assessment.parse(JSON.parse(content));
