/** An invented book whose statements tie, for tests of the comparison. Seeded: the same seed, the same book. */
import type { BorrowerInputs } from '../borrowerInputs.ts';
import { addMonthsToMonthEnd, plainDate, type PlainDate } from '../calendar/plainDate.ts';
import type { Statement } from '../statements/statement.ts';
import { buildStatement } from '../statements/statement.fixture.ts';

export const LAST_QUARTER_END = plainDate('2026-09-30');
export const AS_OF = plainDate('2026-11-30');

/** What one borrower's figures are bent by; nought leaves them as the sector's are. */
export interface Bent {
  readonly borrowerId?: number;
  readonly sector?: string;
  /** Receivables over what they would be, from the last four quarters on. */
  readonly receivablesUp?: number;
  /** Costs put on the balance sheet in the last four quarters, share of revenue. */
  readonly capitalised?: number;
  readonly quarters?: number;
  readonly everyMonths?: 3 | 6 | 12;
  /** Growth of revenue a quarter. */
  readonly growth?: number;
  readonly leaveOut?: readonly ('cfo' | 'capex' | 'interest_paid' | 'tax_paid')[];
  readonly given?: Partial<Statement>;
}

export function buildBorrower(seed: number, bent: Bent = {}): BorrowerInputs {
  const borrowerId = bent.borrowerId ?? seed;
  return {
    borrowerId,
    name: `Borrower ${borrowerId}`,
    legalForm: 'company',
    sector: bent.sector ?? 'metal goods',
    currency: 'EUR',
    fiscalYearEndMonth: 12,
    inputVersion: 1,
    statements: statementsOf(seed, bent),
    covenants: [],
    undertakings: [],
    rates: [],
    previous: null,
  };
}

export const buildBook = (firms: number, sector: string, firstSeed: number): BorrowerInputs[] =>
  Array.from({ length: firms }, (_, k) => buildBorrower(firstSeed + k, { sector }));

const FLOW_LINES = [
  'revenue',
  'cogs',
  'depreciation',
  'interest_expense',
  'income_tax',
  'net_income',
] as const;
type Quarter = Readonly<
  Record<(typeof FLOW_LINES)[number] | 'cfo' | 'capex' | 'capitalised_costs_paid', number>
> & {
  readonly balance: Readonly<Record<string, number>>;
};

function statementsOf(seed: number, bent: Bent): Statement[] {
  const everyMonths = bent.everyMonths ?? 3;
  const quarters = quartersOf(seed, bent);
  const step = everyMonths / 3;
  return quarters.flatMap((quarter, k) => {
    const periodEnd = addMonthsToMonthEnd(LAST_QUARTER_END, -3 * (quarters.length - 1 - k));
    if (Number(periodEnd.slice(5, 7)) % everyMonths !== 0 || k + 1 < step) return [];
    return twoStatements(periodEnd, everyMonths, quarters.slice(k + 1 - step, k + 1), quarter, bent);
  });
}

function twoStatements(
  periodEnd: PlainDate,
  months: number,
  quarters: readonly Quarter[],
  closing: Quarter,
  bent: Bent,
): Statement[] {
  const sum = (read: (quarter: Quarter) => number): number =>
    quarters.reduce((total, quarter) => total + read(quarter), 0);
  const flows: Record<string, number> = {
    ...Object.fromEntries(FLOW_LINES.map((line) => [line, sum((quarter) => quarter[line])])),
    profit_before_tax: sum((quarter) => quarter.net_income + quarter.income_tax),
    cfo: sum((quarter) => quarter.cfo),
    capex: sum((quarter) => quarter.capex),
    capitalised_costs_paid: sum((quarter) => quarter.capitalised_costs_paid),
    interest_paid: -sum((quarter) => quarter.interest_expense),
    tax_paid: -sum((quarter) => quarter.income_tax),
  };
  for (const line of bent.leaveOut ?? []) delete flows[line];
  return [
    buildStatement(periodEnd, months, flows, bent.given),
    buildStatement(periodEnd, 0, closing.balance, bent.given),
  ];
}

function quartersOf(seed: number, bent: Bent): Quarter[] {
  const random = generator(seed);
  const count = bent.quarters ?? 16;
  const scale = Math.round(4_000_000 * (0.5 + 3 * random()));
  const noise = (spread: number): number => 1 + spread * (random() - 0.5);
  let [receivables, inventory, payables] = [scale * 0.6, scale * 0.5, scale * 0.4];
  let [ppe, intangibles, cash] = [scale * 1.5, scale * 0.2, scale * 0.8];
  let grossPpe = ppe * 2;
  return Array.from({ length: count }, (_, k) => {
    const isBent = k >= count - 4;
    const season = [0.95, 1, 1.02, 1.03][k % 4]!;
    const revenue = whole(scale * season * (1 + (bent.growth ?? 0.005)) ** k * noise(0.06));
    const capitalised = isBent ? whole(revenue * (bent.capitalised ?? 0)) : 0;
    const cogs = whole(revenue * 0.62 * noise(0.02)) - capitalised;
    const depreciation = whole(ppe * 0.03);
    const interest = whole(scale * 0.01);
    const profit = revenue - cogs - whole(revenue * 0.22) - depreciation - interest;
    const tax = whole(Math.max(0, profit) * 0.25);
    const before = receivables + inventory - payables;
    receivables = whole(revenue * 0.6 * noise(0.08) * (isBent ? 1 + (bent.receivablesUp ?? 0) : 1));
    inventory = whole(revenue * 0.5 * noise(0.08));
    payables = whole(revenue * 0.4 * noise(0.08));
    const cfo = profit - tax + depreciation - (receivables + inventory - payables - before);
    const capex = whole(depreciation * noise(0.4));
    ppe += capex - depreciation;
    grossPpe += capex;
    intangibles += capitalised;
    cash += cfo - capex - capitalised;
    const currentAssets = cash + receivables + inventory;
    const assets = currentAssets + ppe + intangibles;
    return {
      revenue,
      cogs,
      depreciation,
      interest_expense: interest,
      income_tax: tax,
      net_income: profit - tax,
      // What was capitalised is cash that left by investing instead.
      cfo,
      capex: -capex,
      capitalised_costs_paid: -capitalised,
      balance: {
        cash,
        receivables,
        inventory,
        current_assets: currentAssets,
        ppe_net: ppe,
        ppe_gross: grossPpe,
        intangibles,
        total_assets: assets,
        payables,
        current_liabilities: payables,
        senior_debt: scale,
        total_liabilities: payables + scale,
        equity: assets - payables - scale,
      },
    };
  });
}

const whole = Math.round;

/** The 32-bit generator mulberry32 (public domain). */
export function generator(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}
