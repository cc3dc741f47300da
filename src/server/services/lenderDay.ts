import type { Transaction } from 'sequelize';
import { businessDate } from '../../core/calendar/businessDate.ts';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { findLender } from '../db/repositories/lender.ts';

/** The day that an instant falls on for the lender, by its zone: what "today" means wherever a day decides. */
export async function lenderDay(tx: Transaction, instant: Date): Promise<PlainDate> {
  const lender = await findLender(tx);
  if (!lender) throw new Error('there is no lender yet');
  return businessDate(instant, lender.zone);
}
