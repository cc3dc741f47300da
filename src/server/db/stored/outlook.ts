import { z } from 'zod';
import { PROJECTION_WORDS } from '../../../core/outlook/projectionWord.ts';
import { amount, amountOrNull, day, outcome } from './parts.ts';

const coming = {
  testDate: day,
  quarters: z.union([z.literal(1), z.literal(2), z.literal(3), z.literal(4)]),
};

/** Results stored before coming tests were projected have none. */
export const projections = z
  .array(
    z.object({
      covenantId: z.number(),
      fromTestDate: day.nullable(),
      reason: z.string().nullable(),
      tests: z.array(
        z.discriminatedUnion('kind', [
          z.object({
            ...coming,
            kind: z.literal('projected'),
            level: amount,
            word: z.enum(PROJECTION_WORDS),
            notMet: z.number(),
            share: z.number(),
            n: z.number(),
            borrowers: z.number(),
            peers: z.enum(['sector and third of leverage', 'book']),
            check: z.number().nullable(),
            openAt: z.number().nullable(),
          }),
          z.object({ ...coming, kind: z.literal('too few peers'), level: amount }),
          z.object({ ...coming, kind: z.literal('nothing to project'), reason: z.string() }),
        ]),
      ),
    }),
  )
  .default([]);

const breakEven = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('at'), share: amount, amount: amountOrNull }),
  z.object({ kind: z.literal('not met already') }),
  z.object({ kind: z.literal('not reached') }),
  z.object({ kind: z.literal('never') }),
  z.object({ kind: z.literal('unknown'), reason: z.string() }),
]);

const scenario = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('computed'), tested: amountOrNull, outcome }),
  z.object({ kind: z.literal('unknown'), reason: z.string() }),
]);

const sizes = z.object({ salesFall: amount, workingCapitalLoss: amount, rateRise: amount });

/** Null in results stored before there was any. */
export const sensitivity = z
  .object({
    policy: z.object({
      variableCostShare: amount,
      floatingDebtShare: amount,
      slowerSales: sizes,
      dearerMoney: sizes,
    }),
    tests: z.array(
      z.object({
        covenantId: z.number(),
        testDate: day,
        breakEvens: z.object({
          earnings: breakEven,
          sales: breakEven,
          'working capital': breakEven,
          rates: breakEven,
          together: breakEven,
        }),
        scenarios: z.object({ 'slower sales': scenario, 'dearer money': scenario }),
      }),
    ),
  })
  .nullable()
  .default(null);
