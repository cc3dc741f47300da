import { z } from 'zod';
import { capexLimit, minimumWithProfits } from '#core/covenants/agreedAmounts.ts';
import { amountAtLevel, earningsMayFall, type Sides } from '#core/covenants/headroom.ts';
import { holdAgainstLevel, type Held, type Shaped } from '#core/covenants/holdAgainstLevel.ts';
import { valuationAgeMonths, valuationTooOld } from '#core/covenants/valuation.ts';
import { cashForDebtService, debtService, fixedChargeSides } from '#core/measures/cashCover.ts';
import { currentLiabilitiesCounted, currentRatio, quickAssets } from '#core/measures/currentRatio.ts';
import { netDebt } from '#core/measures/debt.ts';
import { interestCover } from '#core/measures/interestCover.ts';
import { liquidity as liquidityOf, minimumLiquidity } from '#core/measures/minimumLiquidity.ts';
import { netLeverage } from '#core/measures/netLeverage.ts';
import { tangibleNetWorth } from '#core/measures/netWorth.ts';
import { ZERO, type Decimal } from '#core/money/decimal.ts';
import type { Topic } from '../topic.ts';
import { amount, atLeast, atMost, coverResultOf, day, resultOf, status } from './amounts.ts';

const leverageInputs = z.strictObject({
  net_debt: amount.optional(),
  debt: amount.optional(),
  cash: amount.optional(),
  restricted_cash: amount.optional(),
  cash_cap: amount.nullable().optional(),
  senior_debt: amount.optional(),
  total_debt: amount.optional(),
  ebitda: amount,
  max: amount,
  strict: z.boolean().optional(),
  round_dp: z.number().nullable().optional(),
});

const leverage: Topic = (inputs) => {
  const given = leverageInputs.parse(inputs);
  const burden = given.net_debt ?? given.senior_debt ?? debtLessCash(given);
  const sides: Sides = { numerator: burden, denominator: given.ebitda };
  const held = holdAgainstLevel(netLeverage, sides, {
    operator: given.strict ? '<' : '<=',
    level: given.max,
    roundingPlaces: given.round_dp ?? null,
  });
  const needed = amountAtLevel(netLeverage.shape, sides, given.max);
  return {
    ...resultOf(held),
    net_debt: burden,
    earnings_cushion: held.headroom.mayFall,
    debt_capacity: held.headroom.otherSideMayRise,
    debt_cushion: held.headroom.otherSideShare,
    debt_to_repay: held.headroom.otherSideMayRise?.negated() ?? null,
    earnings_needed: needed,
    earnings_shortfall: needed && needed.minus(given.ebitda),
    ratio_rounded: held.tested?.toDecimalPlaces(given.round_dp ?? held.tested.dp()) ?? null,
  };
};

function debtLessCash(given: z.infer<typeof leverageInputs>): Decimal {
  const debt = given.debt ?? given.total_debt;
  if (!debt) throw new Error('no debt');
  return netDebt({
    debt,
    cash: given.cash ?? ZERO,
    restrictedCash: given.restricted_cash ?? ZERO,
    cashCap: given.cash_cap ?? null,
  });
}

const coverInputs = z.union([
  z.strictObject({ ebitda: amount, interest: amount, min: amount }),
  z.strictObject({ cfads: amount, debt_service: amount, min: amount }),
  z.strictObject({
    ebitda: amount,
    cash_tax: amount,
    capex_unfunded: amount,
    nwc_increase: amount,
    principal: amount,
    cash_interest: amount,
    min: amount,
  }),
  z.strictObject({
    cfads: amount,
    scheduled_principal: amount,
    bullet: amount,
    include_bullet: z.boolean(),
    cash_interest: amount,
    min: amount,
  }),
  z.strictObject({
    ebitda: amount,
    rent: amount,
    capex_unfunded: amount,
    cash_tax: amount,
    interest: amount,
    principal: amount,
    min: amount,
  }),
]);

const cover: Topic = (inputs) => {
  const given = coverInputs.parse(inputs);
  const { numerator, denominator } = coverSides(given);
  const held = holdAgainstLevel(interestCover, { numerator, denominator }, atLeast(given.min));
  const { moneyLeft } = held.headroom;
  return {
    ...coverResultOf(held),
    cfads: numerator,
    numerator,
    debt_service: denominator,
    fixed_charges: denominator,
    ebitda_cushion:
      'ebitda' in given && moneyLeft ? earningsMayFall({ moneyLeft, ebitda: given.ebitda }) : null,
  };
};

function coverSides(given: z.infer<typeof coverInputs>): { numerator: Decimal; denominator: Decimal } {
  if ('rent' in given)
    return fixedChargeSides({
      ebitda: given.ebitda,
      rent: given.rent,
      unfundedCapex: given.capex_unfunded,
      cashTax: given.cash_tax,
      cashInterest: given.interest,
      scheduledPrincipal: given.principal,
    });
  if ('nwc_increase' in given)
    return {
      numerator: cashForDebtService({
        ebitda: given.ebitda,
        cashTax: given.cash_tax,
        unfundedCapex: given.capex_unfunded,
        workingCapitalIncrease: given.nwc_increase,
      }),
      denominator: debtService({
        cashInterest: given.cash_interest,
        scheduledPrincipal: given.principal,
        bullet: ZERO,
      }),
    };
  if ('bullet' in given)
    return {
      numerator: given.cfads,
      denominator: debtService({
        cashInterest: given.cash_interest,
        scheduledPrincipal: given.scheduled_principal,
        bullet: given.include_bullet ? given.bullet : ZERO,
      }),
    };
  return 'debt_service' in given
    ? { numerator: given.cfads, denominator: given.debt_service }
    : { numerator: given.ebitda, denominator: given.interest };
}

const loanToValue: Shaped = {
  shape: 'burden',
  earningsSide: null,
  words: { subject: 'Value', otherSide: 'loan', carrier: 'value', charge: 'loan' },
};
const debtYield: Shaped = {
  shape: 'cover',
  earningsSide: null,
  words: { subject: 'Net operating income', otherSide: 'loan', carrier: 'income', charge: 'loan' },
};
const gearing: Shaped = {
  shape: 'burden',
  earningsSide: null,
  words: { subject: 'Net worth', otherSide: 'debt', carrier: 'net worth', charge: 'debt' },
};

const asset: Topic = (inputs) => {
  const given = z
    .union([
      z.strictObject({ noi: amount, loan: amount, min: amount }),
      z.strictObject({
        loan: amount,
        value: amount,
        max: amount,
        valuation_date: day.optional(),
        test_date: day.optional(),
        max_age_months: z.number().optional(),
      }),
    ])
    .parse(inputs);
  if ('noi' in given) {
    const sides = { numerator: given.noi, denominator: given.loan };
    return coverResultOf(holdAgainstLevel(debtYield, sides, atLeast(given.min)));
  }
  const { valuation_date: valuationDate, test_date: testDate, max_age_months: mostMonths } = given;
  const isDated = valuationDate && testDate && mostMonths !== undefined;
  const reason = isDated ? valuationTooOld({ valuationDate, testDate, mostMonths }) : null;
  const age = isDated ? { age_months: valuationAgeMonths(valuationDate, testDate) } : {};
  if (reason !== null) return { status: status('cannot be tested'), reason, ...age };
  const sides = { numerator: given.loan, denominator: given.value };
  const held = holdAgainstLevel(loanToValue, sides, atMost(given.max));
  return {
    ...resultOf(held),
    ...age,
    ltv: held.tested,
    value_cushion: held.headroom.mayFall,
    loan_cushion: held.headroom.otherSideShare,
  };
};

const liquidityInputs = z.union([
  z.strictObject({
    current_assets: amount,
    current_liabilities: amount,
    min: amount,
    loan_reclassified: amount.optional(),
    exclude_facility: z.boolean().optional(),
  }),
  z.strictObject({ cash: amount, receivables: amount, current_liabilities: amount, min: amount }),
  z.strictObject({ cash: amount, undrawn: amount, draw_stop: z.boolean().optional(), min: amount }),
]);

const liquidity: Topic = (inputs) => {
  const given = liquidityInputs.parse(inputs);
  if ('undrawn' in given) {
    const { cash, undrawn, draw_stop: drawStop = false } = given;
    const available = liquidityOf({ cash, undrawn, drawStop });
    return { ...amountResult(available, given.min), liquidity: available };
  }
  if ('receivables' in given) {
    const numerator = quickAssets(given.cash, given.receivables);
    const sides = { numerator, denominator: given.current_liabilities };
    return {
      ...coverResultOf(holdAgainstLevel(currentRatio, sides, atLeast(given.min))),
      quick_assets: numerator,
    };
  }
  const counted = (leavesFacilityOut: boolean): Held =>
    holdAgainstLevel(
      currentRatio,
      {
        numerator: given.current_assets,
        denominator: currentLiabilitiesCounted({
          currentLiabilities: given.current_liabilities,
          loanTurnedCurrent: given.loan_reclassified ?? ZERO,
          leavesFacilityOut,
        }),
      },
      atLeast(given.min),
    );
  return {
    ...coverResultOf(counted(given.exclude_facility ?? true)),
    excluded: counted(true).tested,
    included: counted(false).tested,
  };
};

const amountResult = (tested: Decimal, min: Decimal): Record<string, unknown> => {
  const held = holdAgainstLevel(minimumLiquidity, { numerator: tested, denominator: null }, atLeast(min));
  return { ...resultOf(held), cushion: held.headroom.mayFall };
};

const net_worth: Topic = (inputs) => {
  const given = z
    .union([
      z.strictObject({
        equity: amount,
        goodwill: amount,
        other_intangibles: amount,
        subordinated_shareholder_loans: amount,
        min: amount,
      }),
      z.strictObject({ base: amount, share: amount, net_income: z.array(amount) }),
      z.strictObject({ debt: amount, tangible_net_worth: amount, max: amount }),
    ])
    .parse(inputs);
  if ('base' in given)
    return {
      minimum: minimumWithProfits({ base: given.base, share: given.share, netIncomes: given.net_income }),
    };
  if ('debt' in given) {
    const sides = { numerator: given.debt, denominator: given.tangible_net_worth };
    return resultOf(holdAgainstLevel(gearing, sides, atMost(given.max)));
  }
  const worth = tangibleNetWorth({
    equity: given.equity,
    goodwill: given.goodwill,
    otherIntangibles: given.other_intangibles,
    subordinatedShareholderLoans: given.subordinated_shareholder_loans,
  });
  return { ...amountResult(worth, given.min), tangible_net_worth: worth };
};

const capex: Topic = (inputs) => {
  const given = z
    .strictObject({ capex: amount, limit: amount, prior_unused: amount, carry_share: amount })
    .parse(inputs);
  const limit = capexLimit({
    ownYear: given.limit,
    unusedLastYear: given.prior_unused,
    carriedShare: given.carry_share,
  });
  const sides = { numerator: given.capex, denominator: null };
  return { ...resultOf(holdAgainstLevel(minimumLiquidity, sides, atMost(limit))), limit_total: limit };
};

export const ratioTopics: Readonly<Record<string, Topic>> = {
  leverage,
  cover,
  asset,
  liquidity,
  net_worth,
  capex,
};
