import { z } from 'zod';
import { ZERO, type Decimal } from '#core/money/decimal.ts';
import {
  balanceIdentity,
  cashIdentity,
  identity as identityOf,
  retainedEarningsIdentity,
  type IdentityResult,
} from '#core/statements/identities.ts';
import { scaleSlip } from '#core/statements/scaleSlip.ts';
import type { Topic } from '../topic.ts';
import { amount } from './amounts.ts';

const importTopic: Topic = (inputs) => {
  const given = z.strictObject({ revenue: z.array(amount) }).parse(inputs);
  const slip = scaleSlip(given.revenue);
  return {
    flag: slip ? 'scale' : null,
    factor: slip?.factor ?? null,
    corrected: slip?.corrected ?? null,
  };
};

const identityInputs = z.union([
  z.strictObject({
    total_assets: amount,
    total_liabilities: amount,
    equity: amount,
    rounding_unit: amount,
    items: z.literal(3),
  }),
  z.strictObject({
    opening: amount,
    cfo: amount,
    cfi: amount,
    cff: amount,
    fx: amount,
    closing: amount,
  }),
  z.strictObject({
    opening: amount,
    net_income: amount,
    dividends: amount,
    other: amount,
    closing: amount,
  }),
  z.strictObject({ revenue: amount, cogs: amount, gross_profit: amount }),
]);

const identity: Topic = (inputs) => {
  const given = identityInputs.parse(inputs);
  if ('total_assets' in given)
    return checked(
      balanceIdentity({
        totalAssets: given.total_assets,
        totalLiabilities: given.total_liabilities,
        equity: given.equity,
        roundingUnit: given.rounding_unit,
      }),
    );
  if ('cfo' in given)
    return checked(
      cashIdentity({
        opening: given.opening,
        flows: [given.cfo, given.cfi, given.cff, given.fx],
        closing: given.closing,
        totalAssets: largest(given.opening, given.closing),
        roundingUnit: ZERO,
      }),
    );
  if ('dividends' in given) {
    const result = retainedEarningsIdentity({
      opening: given.opening,
      netIncome: given.net_income,
      dividends: given.dividends,
      namedEntries: given.other,
      closing: given.closing,
      totalAssets: largest(given.opening, given.closing),
      roundingUnit: ZERO,
    });
    return { ...checked(result), share_of_net_income: result.shareOfNetIncome };
  }
  return checked(
    identityOf({
      given: given.gross_profit,
      parts: [given.revenue, given.cogs.negated()],
      reference: given.revenue,
      roundingUnit: ZERO,
    }),
  );
};

// These vectors name no total assets and no rounding unit: the figures are exact, the larger balance stands in.
const largest = (one: Decimal, other: Decimal): Decimal => (one.abs().gt(other.abs()) ? one : other);

const checked = ({
  expected,
  difference,
  tolerance,
  share,
  outcome,
}: IdentityResult): Record<string, unknown> => ({
  expected,
  difference,
  tolerance,
  share,
  result: outcome.replaceAll('-', ' '),
});

export const accountTopics: Readonly<Record<string, Topic>> = { import: importTopic, identity };
