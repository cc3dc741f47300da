/** The pieces that stored results are made of: decimals and days as text, read back into the core's own types. */
import { z } from 'zod';
import { isPlainDate, type PlainDate } from '../../../core/calendar/plainDate.ts';
import { OUTCOMES } from '../../../core/covenants/covenantTest.ts';
import { decimal } from '../../../core/money/decimal.ts';
import { isLineItemCode, type LineItemCode } from '../../../core/statements/lineItems.ts';

export const amount = z.string().transform((text) => decimal(text));
export const amountOrNull = amount.nullable();
export const day = z.custom<PlainDate>((value) => typeof value === 'string' && isPlainDate(value));
export const line = z.custom<LineItemCode>((value) => typeof value === 'string' && isLineItemCode(value));
export const outcome = z.enum(OUTCOMES);

export const inputUsed = z.object({
  statementId: z.number(),
  line,
  sign: z.union([z.literal(1), z.literal(-1)]),
  amount,
  periodEnd: day,
  months: z.number(),
  rate: amount.optional(),
});
