import { z } from 'zod';
import { ALERT_KINDS } from '../../../core/alerts/alert.ts';
import { CAUSES, type Movement } from '../../../core/whyItMoved.ts';
import { amountOrNull, day } from './parts.ts';

const standing = z.object({
  word: z.string(),
  figure: amountOrNull,
  level: amountOrNull,
  on: day.nullable(),
});

const movements = z.array(
  z.object({
    subject: z.discriminatedUnion('kind', [
      z.object({ kind: z.literal('test'), covenantId: z.number() }),
      z.object({ kind: z.literal('score') }),
      z.object({ kind: z.literal('alert'), alert: z.enum(ALERT_KINDS), covenantId: z.number().nullable() }),
    ]),
    before: standing,
    after: standing,
    steps: z.array(z.object({ cause: z.enum(CAUSES), from: standing, to: standing })),
  }),
);

/** Decimals print themselves as text. */
export const storedMovements = (value: readonly Movement[]): string => JSON.stringify(value);

/** Throws where the stored text is none: it was written by storedMovements, or somebody changed it. */
export const readMovements = (content: string): readonly Movement[] => movements.parse(JSON.parse(content));
