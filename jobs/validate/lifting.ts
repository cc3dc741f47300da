/** How earnings are lifted: through receivables, inventory, costs moved onto the balance sheet, or a bit of each. */
import type { Channel, FirmPlan } from './firmPlan.ts';

/** One quarter's lift by where it shows. Revenue and receivables rise together, the others are costs not charged. */
export interface Lift {
  readonly receivables: number;
  readonly inventory: number;
  readonly intangibles: number;
  readonly ppe: number;
}

/** What has been put on the balance sheet so far and stays there: what was never earned is never paid. */
export interface Lifted {
  readonly receivables: number;
  readonly inventory: number;
}

const NO_LIFT: Lift = { receivables: 0, inventory: 0, intangibles: 0, ppe: 0 };
export const NOTHING_LIFTED: Lifted = { receivables: 0, inventory: 0 };

/** Shares of the lift; half of the costs that are moved stands in intangibles, half is hidden in plant. */
const SHARES: Readonly<Record<Channel, (hasStock: boolean) => Lift>> = {
  receivables: () => ({ ...NO_LIFT, receivables: 1 }),
  inventory: () => ({ ...NO_LIFT, inventory: 1 }),
  'capitalised costs': () => ({ ...NO_LIFT, intangibles: 0.5, ppe: 0.5 }),
  mixed: (hasStock) =>
    hasStock
      ? { receivables: 1 / 3, inventory: 1 / 3, intangibles: 1 / 6, ppe: 1 / 6 }
      : { receivables: 1 / 2, inventory: 0, intangibles: 1 / 4, ppe: 1 / 4 },
};

/** Whole currency units; nothing before the lifting begins. */
export function quarterlyLift({ lifting, sector }: FirmPlan, quarter: number, ordinaryEbitda: number): Lift {
  if (!lifting || quarter < lifting.from) return NO_LIFT;
  const amount = lifting.uplift * ordinaryEbitda;
  const shares = SHARES[lifting.channel](sector.inventoryDays > 0);
  return {
    receivables: Math.round(amount * shares.receivables),
    inventory: Math.round(amount * shares.inventory),
    intangibles: Math.round(amount * shares.intangibles),
    ppe: Math.round(amount * shares.ppe),
  };
}

export const addedTo = (lifted: Lifted, lift: Lift): Lifted => ({
  receivables: lifted.receivables + lift.receivables,
  inventory: lifted.inventory + lift.inventory,
});
