/** Reads the vectors of published distress scores into the core's own functions. */
import { z } from 'zod';
import {
  ALTMAN_FORMS,
  altmanZ,
  ohlsonO,
  zmijewskiX,
  type AltmanRatios,
} from '#core/accruals/distressScores.ts';
import type { Topic } from './topic.ts';

/** A sheet that was published with this weight on sales. */
const SALES_WEIGHT_AS_PUBLISHED = 1.1;

const altman_z: Topic = (inputs) => {
  const ratios = listedRatios(inputs);
  const { z: score, zone } = altmanZ('listed', ratios);
  const extra = SALES_WEIGHT_AS_PUBLISHED - ALTMAN_FORMS.listed.weights[4];
  return {
    x1: ratios.workingCapitalOverAssets,
    z: score,
    zone,
    z_as_published: score + extra * ratios.salesOverAssets,
  };
};

function listedRatios(inputs: unknown): AltmanRatios {
  const ratios = z
    .object({ x1: z.number(), x2: z.number(), x3: z.number(), x4: z.number(), x5: z.number() })
    .safeParse(inputs);
  if (ratios.success) {
    const { x1, x2, x3, x4, x5 } = ratios.data;
    return {
      workingCapitalOverAssets: x1,
      retainedEarningsOverAssets: x2,
      ebitOverAssets: x3,
      equityOverLiabilities: x4,
      salesOverAssets: x5,
    };
  }
  const given = z
    .object({
      total_assets: z.number(),
      retained_earnings: z.number(),
      ebit: z.number(),
      sales: z.number(),
    })
    .parse(inputs);
  return {
    workingCapitalOverAssets: workingCapitalOf(inputs) / given.total_assets,
    retainedEarningsOverAssets: given.retained_earnings / given.total_assets,
    ebitOverAssets: given.ebit / given.total_assets,
    equityOverLiabilities: equityOverLiabilities(inputs),
    salesOverAssets: given.sales / given.total_assets,
  };
}

function workingCapitalOf(inputs: unknown): number {
  const given = z
    .union([
      z.object({ working_capital: z.number() }),
      z.object({ current_assets: z.number(), current_liabilities: z.number() }),
    ])
    .parse(inputs);
  return 'working_capital' in given
    ? given.working_capital
    : given.current_assets - given.current_liabilities;
}

function equityOverLiabilities(inputs: unknown): number {
  const given = z
    .union([
      z.object({ mve: z.number(), debt: z.number() }),
      z.object({ price: z.number(), shares: z.number(), debt: z.number() }),
      z.object({ equity: z.number(), total_liabilities: z.number() }),
    ])
    .parse(inputs);
  if ('mve' in given) return given.mve / given.debt;
  return 'price' in given
    ? (given.price * given.shares) / given.debt
    : given.equity / given.total_liabilities;
}

const altman_z_private: Topic = (inputs) => {
  const privately = altmanZ('private', listedRatios(inputs));
  const anyTrade = altmanZ('anyTrade', listedRatios(inputs));
  const result = {
    z_private: privately.z,
    zone_private: privately.zone,
    z_double: anyTrade.z,
    zone_double: anyTrade.zone,
    z_em: altmanZ('anyTradeShifted', listedRatios(inputs)).z,
  };
  const flows = z
    .object({
      ebit_quarter: z.number(),
      sales_quarter: z.number(),
      ebit_ltm: z.number(),
      sales_ltm: z.number(),
    })
    .safeParse(inputs);
  if (!flows.success) return result;
  const { ebit_ltm, sales_ltm, ebit_quarter, sales_quarter } = flows.data;
  const withFlows = (ebit: number, sales: number): number =>
    altmanZ('private', listedRatios({ ...z.looseObject({}).parse(inputs), ebit, sales })).z;
  return {
    z_private_ltm: withFlows(ebit_ltm, sales_ltm),
    z_private_wrong_quarter: withFlows(ebit_quarter, sales_quarter),
  };
};

const sheetTotals = {
  total_assets: z.number(),
  total_liabilities: z.number(),
  current_assets: z.number(),
  current_liabilities: z.number(),
  net_income: z.number(),
};

const ohlson: Topic = (inputs) => {
  const given = z
    .object({
      ...sheetTotals,
      unit: z.number(),
      price_index: z.number(),
      net_income_prior: z.number(),
      ffo: z.number(),
      intwo: z.number(),
    })
    .parse(inputs);
  const { score, probability } = ohlsonO({
    realAssets: (given.total_assets * given.unit) / given.price_index,
    totalAssets: given.total_assets,
    totalLiabilities: given.total_liabilities,
    currentAssets: given.current_assets,
    currentLiabilities: given.current_liabilities,
    netIncome: given.net_income,
    netIncomePrior: given.net_income_prior,
    fundsFromOperations: given.ffo,
    hasTwoLosses: given.intwo === 1,
  });
  return { o: score, probability };
};

const zmijewski: Topic = (inputs) => {
  const given = z.object(sheetTotals).parse(inputs);
  const sums = {
    netIncome: given.net_income,
    totalAssets: given.total_assets,
    totalLiabilities: given.total_liabilities,
    currentAssets: given.current_assets,
    currentLiabilities: given.current_liabilities,
  };
  const { score, probability } = zmijewskiX(sums);
  return { x: score, probability, x_other_sign: zmijewskiX(sums, -1).score };
};

/** By the names of the vector file. */
export const topics: Record<string, Topic> = { altman_z, altman_z_private, ohlson, zmijewski };
