import { z } from 'zod';
import { PEER_FIGURES } from '../../../core/quality/peerFigures.ts';
import { PUBLISHED_MEASURES } from '../../../core/quality/publishedMeasure.ts';
import { BESIDE_FACTS, QUALITY_BANDS, QUALITY_BLOCKS } from '../../../core/quality/score.ts';
import { day, line } from './parts.ts';

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
  earningsAtRisk: z.object({ unexplained: z.number(), workingCapital: z.number() }).nullable().default(null),
});

export const quality = z.object({
  headline: z.number().nullable(),
  band: z.enum(QUALITY_BANDS).nullable(),
  provisional: z.boolean(),
  noScoreReason: z.string().nullable(),
  latest: quarterScore.nullable(),
  history: z.array(quarterScore),
  explanations: z.array(z.string()),
  whatWouldChangeIt: z.string().nullable(),
  remarks: z.array(z.string()),
  published: z
    .array(
      z.object({
        key: z.enum(PUBLISHED_MEASURES),
        value: z.number().nullable(),
        reason: z.string().nullable(),
        remarks: z.array(z.string()),
      }),
    )
    .default([]),
  beside: z.array(z.object({ fact: z.enum(BESIDE_FACTS), sentence: z.string() })).default([]),
  sources: z
    .array(
      z.object({
        figure: z.enum(PEER_FIGURES),
        amount: z.number(),
        cells: z.array(z.object({ statementId: z.number(), line, periodEnd: day, months: z.number() })),
      }),
    )
    .default([]),
});
