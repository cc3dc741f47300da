import { z } from 'zod';
import {
  accrualHaircut,
  breakEvenShare,
  verdictWithoutEarnings,
  restsOn,
} from '#core/covenants/counterfactual.ts';
import { amountAtLevel, type Sides } from '#core/covenants/headroom.ts';
import { holdAgainstLevel, type Verdict } from '#core/covenants/holdAgainstLevel.ts';
import { allowAddBacks, proFormaEbitda } from '#core/measures/addBacks.ts';
import { ebitdaFromNetIncome, ebitdaFromRevenue, routeDifference } from '#core/measures/ebitda.ts';
import { netLeverage } from '#core/measures/netLeverage.ts';
import { decimal, type Decimal } from '#core/money/decimal.ts';
import { withCostsTurned, writesCostsNegative } from '#core/statements/costSigns.ts';
import type { Topic } from '../topic.ts';
import { amount, atMost, status } from './amounts.ts';
import { earning, owing, registered } from './registered.ts';

const ebitda: Topic = (inputs) => {
  const given = z
    .union([
      z.strictObject({
        net_income: amount,
        income_tax: amount,
        net_finance_costs: amount,
        depreciation: amount,
        amortisation: amount,
      }),
      z.strictObject({
        revenue: amount,
        cogs: amount,
        opex_excl_da: amount,
        ebitda_from_net_income: amount.optional(),
      }),
    ])
    .parse(inputs);
  if ('net_income' in given)
    return {
      ebitda: ebitdaFromNetIncome({
        netIncome: given.net_income,
        incomeTax: given.income_tax,
        netFinanceCosts: given.net_finance_costs,
        depreciationAndAmortisation: given.depreciation.plus(given.amortisation),
      }),
    };
  const asGiven = { cogs: given.cogs, sga: given.opex_excl_da };
  const costs = writesCostsNegative([asGiven]) ? withCostsTurned(asGiven) : asGiven;
  const fromRevenue = ebitdaFromRevenue({
    revenue: given.revenue,
    costOfSales: costs.cogs ?? given.cogs,
    operatingCosts: costs.sga ?? given.opex_excl_da,
  });
  const normalised = { cogs: costs.cogs, opex_excl_da: costs.sga };
  if (!given.ebitda_from_net_income) return { ebitda: fromRevenue, normalised };
  const { difference, name } = routeDifference({ fromRevenue, fromNetIncome: given.ebitda_from_net_income });
  return { ebitda_top_down: fromRevenue, difference, flag: name };
};

const addbacks: Topic = (inputs) => {
  const given = z
    .union([
      z.strictObject({
        ebitda: amount,
        uncapped: amount,
        capped: amount,
        cap: amount.nullable(),
        mode: z.enum(['before', 'after']),
      }),
      z.strictObject({ ltm_ebitda: amount, target_pre_acquisition_ltm: amount }),
    ])
    .parse(inputs);
  if ('ltm_ebitda' in given)
    return { pro_forma: proFormaEbitda(given.ltm_ebitda, given.target_pre_acquisition_ltm) };
  return {
    ...allowAddBacks({
      ebitda: given.ebitda,
      uncapped: given.uncapped,
      capped: given.capped,
      terms: { cap: given.cap, basis: given.mode },
    }),
  };
};

const gaap: Topic = (inputs) => {
  const given = z
    .strictObject({
      ebitda_reported: amount,
      lease_addback: amount,
      debt: amount,
      lease_liability: amount,
      max: amount,
    })
    .parse(inputs);
  const { held: frozen, otherHeld: current } = registered(
    'net-leverage',
    {
      flows: { ...earning(given.ebitda_reported), rent_paid: given.lease_addback.negated() },
      balances: { ...owing(given.debt), lease_liabilities: given.lease_liability },
      definition: { accounting: 'frozen' },
    },
    atMost(given.max),
  );
  if (!current) throw new Error('frozen rules without those of today beside them');
  return {
    frozen: frozen.tested,
    current: current.tested,
    status_frozen: status(frozen.outcome),
    status_current: status(current.outcome),
  };
};

const counterfactual: Topic = (inputs) => {
  const given = z
    .strictObject({
      net_debt: amount,
      ebitda: amount,
      addbacks: amount,
      unexplained_accruals: amount.optional(),
      max: amount,
    })
    .parse(inputs);
  const terms = atMost(given.max);
  const reportedEarnings = given.ebitda.plus(given.addbacks);
  const sides: Sides = { numerator: given.net_debt, denominator: reportedEarnings };
  const haircut = accrualHaircut(given.unexplained_accruals ?? decimal(0));
  const reported = holdAgainstLevel(netLeverage, sides, terms);
  const without = (takenOut: Decimal) => verdictWithoutEarnings(netLeverage, sides, terms, takenOut);
  const legs = { addbacks: without(given.addbacks), unexplained_accruals: without(haircut) };
  const needed = amountAtLevel(netLeverage.shape, sides, given.max);
  const share =
    needed &&
    breakEvenShare({ earningsNeeded: needed, earningsBefore: given.ebitda, addBacks: given.addbacks });
  return {
    reported: asTest(reported),
    without_addbacks: asTest(legs.addbacks),
    without_unexplained_accruals: asTest(legs.unexplained_accruals),
    without_either: asTest(without(given.addbacks.plus(haircut))),
    depends_on: Object.entries(legs).flatMap(([name, held]) => (restsOn(reported, held) ? [name] : [])),
    haircut,
    ...asTest(legs.unexplained_accruals),
    ebitda_needed: needed,
    addbacks_needed: needed && needed.minus(given.ebitda),
    share,
  };
};

const asTest = ({ tested, outcome }: Verdict) => ({ ratio: tested, status: status(outcome) });

export const earningsTopics: Readonly<Record<string, Topic>> = { ebitda, addbacks, gaap, counterfactual };
