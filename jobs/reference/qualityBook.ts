/** Scores a whole book of borrowers together, as the file of the reference book writes them. */
import { z } from 'zod';
import { plainDate } from '#core/calendar/plainDate.ts';
import { buildCrossSection, type CrossSection, type PeerInputs } from '#core/quality/crossSection.ts';
import { bandOf } from '#core/quality/headline.ts';
import { scoreQuarter } from '#core/quality/quarterScore.ts';
import type { QualityBlockName } from '#core/quality/score.ts';

const QUARTER_END = plainDate('2025-12-31');

const firmInputs = z
  .object({
    assets: z.number(),
    assets_prior: z.number(),
    net_income: z.number(),
    impairment_after_tax: z.number(),
    cfo: z.number(),
    capex: z.number(),
    capitalised_costs: z.number(),
    capitalised_costs_prior: z.number(),
    revenue: z.number(),
    revenue_prior: z.number(),
    ppe_gross: z.number(),
    ebitda: z.number(),
    interest_paid: z.number(),
    tax_paid: z.number(),
    receivables: z.number(),
    receivables_prior: z.number(),
    inventory: z.number(),
    inventory_prior: z.number(),
    revenue_quarter: z.number(),
    revenue_quarter_prior: z.number(),
    cogs_two_quarters: z.number(),
    cogs_two_quarters_prior: z.number(),
    nwc_prior: z.number(),
    m_score: z.number(),
    f_score: z.number(),
    accrual_noise: z.number(),
    acquisition_in_ltm: z.boolean(),
    acquisition_closed_this_quarter: z.boolean(),
  })
  .partial({ m_score: true, f_score: true, accrual_noise: true });

const book = z.object({
  firms: z.array(z.object({ firm: z.number(), sector: z.string(), inputs: firmInputs })),
});

type Firm = z.infer<typeof book>['firms'][number];

/** What the core says of every firm, by firm number, in the words of the file. */
export function qualityBook(content: unknown): ReadonlyMap<number, Record<string, unknown>> {
  const peers = book.parse(content).firms.map(peerOf);
  const crossSection = JSON.parse(JSON.stringify(buildCrossSection(peers, 1))) as CrossSection;
  return new Map(peers.map((peer) => [peer.borrowerId, resultOf(peer, crossSection)]));
}

function resultOf(peer: PeerInputs, crossSection: CrossSection): Record<string, unknown> {
  const { score, coverage, blocks } = scoreQuarter(peer, crossSection);
  const risk = (name: QualityBlockName) => blocks.find((block) => block.name === name)?.risk ?? null;
  const figure = (name: QualityBlockName, key: string) =>
    blocks.find((block) => block.name === name)?.figures[key] ?? null;
  return {
    unexplained_residual: figure('unexplained accruals', 'unexplainedShare'),
    receivable_days_change: figure('sharpest stretch', 'receivableDaysChange'),
    inventory_days_change: figure('sharpest stretch', 'inventoryDaysChange'),
    capitalised_change: figure('sharpest stretch', 'capitalisedShareChange'),
    conversion: figure('cash conversion', 'conversion'),
    r_unexplained: risk('unexplained accruals'),
    r_receivables: figure('sharpest stretch', 'receivablesRisk'),
    r_inventory: figure('sharpest stretch', 'inventoryRisk'),
    r_capitalised: figure('sharpest stretch', 'capitalisedRisk'),
    r_stretch: risk('sharpest stretch'),
    r_conversion: risk('cash conversion'),
    r_screens: risk('published screens'),
    r_noise: risk('accrual noise'),
    coverage: coverage / 100,
    score,
    band: score === null ? null : bandOf(score),
  };
}

const peerOf = ({ firm, sector, inputs }: Firm): PeerInputs => ({
  borrowerId: firm,
  sector,
  quarterEnd: QUARTER_END,
  ties: true,
  tie: 'ties',
  basis: 'audited',
  derivedCashFlow: false,
  cashFlowPresentationChanged: false,
  daysOnYear: false,
  acquisitionInYear: inputs.acquisition_in_ltm,
  acquisitionThisQuarter: inputs.acquisition_closed_this_quarter,
  figures: {
    assets: inputs.assets,
    assetsPrior: inputs.assets_prior,
    netIncome: inputs.net_income,
    impairmentAfterTax: inputs.impairment_after_tax,
    cfo: inputs.cfo,
    capex: inputs.capex,
    capitalisedCosts: inputs.capitalised_costs,
    capitalisedCostsPrior: inputs.capitalised_costs_prior,
    revenue: inputs.revenue,
    revenuePrior: inputs.revenue_prior,
    ppeGross: inputs.ppe_gross,
    ebitda: inputs.ebitda,
    interestPaid: inputs.interest_paid,
    taxPaid: inputs.tax_paid,
    receivables: inputs.receivables,
    receivablesPrior: inputs.receivables_prior,
    inventory: inputs.inventory,
    inventoryPrior: inputs.inventory_prior,
    revenueQuarter: inputs.revenue_quarter,
    revenueQuarterPrior: inputs.revenue_quarter_prior,
    cogsTwoQuarters: inputs.cogs_two_quarters,
    cogsTwoQuartersPrior: inputs.cogs_two_quarters_prior,
    nwcPrior: inputs.nwc_prior,
    ...(inputs.m_score !== undefined && { mScore: inputs.m_score }),
    ...(inputs.f_score !== undefined && { fScore: inputs.f_score }),
    ...(inputs.accrual_noise !== undefined && { accrualNoise: inputs.accrual_noise }),
  },
});
