import { z } from 'zod';
import { addMonthsToMonthEnd } from '#core/calendar/plainDate.ts';
import { amountAtLevel, earningsMayFall } from '#core/covenants/headroom.ts';
import { holdAgainstLevel, type Held } from '#core/covenants/holdAgainstLevel.ts';
import { debtService } from '#core/measures/cashCover.ts';
import { currentLiabilitiesCounted } from '#core/measures/currentRatio.ts';
import { MEASURES } from '#core/measures/index.ts';
import type { MeasureCode } from '#core/measures/measure.ts';
import { valuationAgeMonths } from '#core/measures/valuation.ts';
import { ZERO, type Decimal } from '#core/money/decimal.ts';
import type { Amounts } from '#core/statements/statement.ts';
import type { Topic } from '../topic.ts';
import { amount, atLeast, atMost, coverResultOf, day, resultOf } from './amounts.ts';
import { earning, owing, registered, type Accounts } from './registered.ts';
import { statementOf } from './statements.ts';

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
  const measure = given.senior_debt ? 'senior-leverage' : 'net-leverage';
  const burden = given.net_debt ?? given.senior_debt;
  const { held, sides } = registered(
    measure,
    {
      flows: earning(given.ebitda),
      balances: burden ? owing(burden) : debtAndCash(given),
      definition: { cashNettingCap: given.cash_cap ?? null },
    },
    {
      operator: given.strict ? '<' : '<=',
      level: given.max,
      roundingPlaces: given.round_dp ?? null,
    },
  );
  if (!sides) throw new Error('leverage without its two sides');
  const needed = amountAtLevel(MEASURES[measure].shape, sides, given.max);
  return {
    ...resultOf(held),
    net_debt: sides.numerator,
    earnings_cushion: held.headroom.mayFall,
    debt_capacity: held.headroom.otherSideMayRise,
    debt_cushion: held.headroom.otherSideShare,
    debt_to_repay: held.headroom.otherSideMayRise?.negated() ?? null,
    earnings_needed: needed,
    earnings_shortfall: needed && needed.minus(given.ebitda),
    ratio_rounded: held.tested?.toDecimalPlaces(given.round_dp ?? held.tested.dp()) ?? null,
  };
};

/** Cash on our line is what may be used: what of it is pledged stands apart. */
function debtAndCash(given: z.infer<typeof leverageInputs>): Amounts {
  const debt = given.debt ?? given.total_debt;
  if (!debt) throw new Error('no debt');
  return { senior_debt: debt, cash: (given.cash ?? ZERO).minus(given.restricted_cash ?? ZERO) };
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
  const { measure, accounts } = coverAccounts(given);
  const { sides } = registered(measure, accounts, atLeast(given.min));
  if (!sides?.denominator) throw new Error('a cover without its two sides');
  // The vectors tell what may fall of the numerator; what may fall of EBITDA inside it stands beside.
  const { numerator, denominator } = sides;
  const held = holdAgainstLevel(MEASURES[measure], { numerator, denominator }, atLeast(given.min));
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

interface CoverAccounts {
  readonly measure: MeasureCode;
  readonly accounts: Accounts;
}

function coverAccounts(given: z.infer<typeof coverInputs>): CoverAccounts {
  if ('rent' in given)
    return {
      measure: 'fixed-charge-cover',
      accounts: {
        flows: {
          ...earning(given.ebitda),
          rent_expense: given.rent,
          capex: given.capex_unfunded.negated(),
          tax_paid: given.cash_tax.negated(),
          interest_paid: given.interest.negated(),
          scheduled_principal: given.principal,
        },
      },
    };
  if ('nwc_increase' in given)
    return debtServiceOf({
      ebitda: given.ebitda,
      cashTax: given.cash_tax,
      capex: given.capex_unfunded,
      increase: given.nwc_increase,
      interest: given.cash_interest,
      principal: given.principal,
    });
  if ('bullet' in given)
    return debtServiceOf({
      ebitda: given.cfads,
      interest: given.cash_interest,
      principal: debtService({
        cashInterest: ZERO,
        scheduledPrincipal: given.scheduled_principal,
        bullet: given.include_bullet ? given.bullet : ZERO,
      }),
    });
  if ('debt_service' in given) return debtServiceOf({ ebitda: given.cfads, principal: given.debt_service });
  return {
    measure: 'interest-cover',
    accounts: { flows: { ...earning(given.ebitda), interest_paid: given.interest.negated() } },
  };
}

interface DebtServiceItems {
  readonly ebitda: Decimal;
  readonly cashTax?: Decimal;
  readonly capex?: Decimal;
  readonly increase?: Decimal;
  readonly interest?: Decimal;
  readonly principal: Decimal;
}

const debtServiceOf = ({
  ebitda,
  cashTax = ZERO,
  capex = ZERO,
  increase = ZERO,
  interest = ZERO,
  principal,
}: DebtServiceItems): CoverAccounts => {
  const workingCapital = (amount: Decimal): Amounts => ({
    current_assets: amount,
    cash: ZERO,
    current_liabilities: ZERO,
  });
  return {
    measure: 'debt-service-cover',
    accounts: {
      flows: {
        ...earning(ebitda),
        tax_paid: cashTax.negated(),
        capex: capex.negated(),
        interest_paid: interest.negated(),
        scheduled_principal: principal,
      },
      balances: workingCapital(increase),
      before: workingCapital(ZERO),
    },
  };
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
  if ('noi' in given)
    return coverResultOf(
      registered(
        'debt-yield',
        { flows: { noi: given.noi }, balances: { senior_debt: given.loan } },
        atLeast(given.min),
      ).held,
    );
  const { valuation_date: valuationDate, test_date: testDate, max_age_months: mostMonths } = given;
  const { held } = registered(
    'loan-to-value',
    {
      balances: { senior_debt: given.loan, ...(valuationDate ? {} : { collateral_value: given.value }) },
      definition: { valuationMaxAgeMonths: mostMonths ?? null },
      ...(testDate ? { testDate } : {}),
      ...(valuationDate
        ? { further: [statementOf(4, valuationDate, 0, { collateral_value: given.value })] }
        : {}),
    },
    atMost(given.max),
  );
  return {
    ...resultOf(held),
    ...(valuationDate && testDate ? { age_months: valuationAgeMonths(valuationDate, testDate) } : {}),
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
    const { held } = registered(
      'minimum-liquidity',
      {
        balances: { cash, revolver_commitment: undrawn, revolver_drawn: ZERO },
        definition: { undrawnCountsAsLiquidity: !drawStop },
      },
      atLeast(given.min),
    );
    return { ...amountResultOf(held), liquidity: held.tested };
  }
  if ('receivables' in given) {
    const { cash, receivables, current_liabilities } = given;
    const { held, sides } = registered(
      'quick-ratio',
      { balances: { cash, receivables, current_liabilities } },
      atLeast(given.min),
    );
    return { ...coverResultOf(held), quick_assets: sides?.numerator ?? null };
  }
  const counted = (leavesFacilityOut: boolean): Held =>
    registered(
      'current-ratio',
      {
        balances: {
          current_assets: given.current_assets,
          current_liabilities: currentLiabilitiesCounted({
            currentLiabilities: given.current_liabilities,
            loanTurnedCurrent: given.loan_reclassified ?? ZERO,
            leavesFacilityOut,
          }),
        },
      },
      atLeast(given.min),
    ).held;
  return {
    ...coverResultOf(counted(given.exclude_facility ?? true)),
    excluded: counted(true).tested,
    included: counted(false).tested,
  };
};

const amountResultOf = (held: Held): Record<string, unknown> => ({
  ...resultOf(held),
  cushion: held.headroom.mayFall,
});

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
  if ('base' in given) return { minimum: minimumAfter(given.net_income, given.base, given.share) };
  if ('debt' in given)
    return resultOf(
      registered(
        'gearing',
        { balances: { senior_debt: given.debt, equity: given.tangible_net_worth } },
        atMost(given.max),
      ).held,
    );
  const { held } = registered(
    'tangible-net-worth',
    {
      balances: {
        equity: given.equity,
        goodwill: given.goodwill,
        intangibles: given.other_intangibles,
        shareholder_loans: given.subordinated_shareholder_loans,
      },
      definition: { shareholderLoansInNetWorth: true },
    },
    atLeast(given.min),
  );
  return { ...amountResultOf(held), tangible_net_worth: held.tested };
};

/** Years of profit one after the other since the agreement began, the last one the year of the test. */
function minimumAfter(netIncomes: readonly Decimal[], base: Decimal, share: Decimal): Decimal | null {
  const ends = netIncomes.map((_, at) => addMonthsToMonthEnd('2020-12-31', 12 * (at + 1)));
  const testDate = ends.at(-1);
  if (!testDate) return base;
  const { level } = registered(
    'tangible-net-worth',
    {
      flows: { net_income: netIncomes.at(-1)! },
      balances: { equity: ZERO },
      further: ends
        .slice(0, -1)
        .map((end, at) => statementOf(4 + at, end, 12, { net_income: netIncomes[at]! })),
      definition: { profitShareInNetWorth: share },
      testDate,
      levels: [{ from: '2021-01-01', until: null, level: base, isReset: false }],
    },
    atLeast(base),
  );
  return level;
}

const capex: Topic = (inputs) => {
  const given = z
    .strictObject({ capex: amount, limit: amount, prior_unused: amount, carry_share: amount })
    .parse(inputs);
  // Last year spent nothing under a limit of what it left unused.
  const { held, level } = registered(
    'capital-expenditure',
    {
      flows: { capex: given.capex.negated() },
      further: [statementOf(4, '2024-12-31', 12, { capex: ZERO })],
      definition: { capexCarriedShare: given.carry_share },
      levels: [
        { from: '2024-01-01', until: '2024-12-31', level: given.prior_unused, isReset: false },
        { from: '2025-01-01', until: null, level: given.limit, isReset: false },
      ],
    },
    atMost(given.limit),
  );
  return { ...resultOf(held), limit_total: level };
};

export const ratioTopics: Readonly<Record<string, Topic>> = {
  leverage,
  cover,
  asset,
  liquidity,
  net_worth,
  capex,
};
