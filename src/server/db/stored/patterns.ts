import { z } from 'zod';
import { day } from './parts.ts';

/** Results stored before the night kept it have none. */
export const nearLine = z
  .array(
    z.object({
      covenantId: z.number(),
      figures: z
        .object({
          near: z.number(),
          passing: z.number(),
          expectedPassing: z.number(),
          share: z.number(),
          pAtLeast: z.number(),
          localFdr: z.number(),
          peers: z.enum(['sector', 'book']),
          peerCount: z.number(),
          isPublished: z.boolean(),
          latestNear: day,
          priorShare: z.number(),
          window: z.object({ band: z.number(), gap: z.number() }),
          gateP: z.number().nullable(),
        })
        .nullable(),
    }),
  )
  .default([]);
