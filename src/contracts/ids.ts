import { isPlainDate, type PlainDate } from '../core/calendar/plainDate.ts';
import { z } from './zod.ts';

const id = z
  .string()
  .regex(/^[1-9]\d{0,14}$/)
  .transform(Number);

/** `/…/[id]`: a positive whole number; anything else is not there. */
export const idParams = z.object({ id });

/** `/…/[id]/cells/[line]`: one line of one statement. */
export const lineParams = z.object({ id, line: z.string().max(40) });

/** `/…/[id]/covenants/[covenantId]/tests/[testDate]`: one test of one covenant. */
export const testParams = z.object({
  id,
  covenantId: id,
  testDate: z.custom<PlainDate>((value) => typeof value === 'string' && isPlainDate(value)),
});
export type NamedTest = z.infer<typeof testParams>;
