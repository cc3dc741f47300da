import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { StatementBook } from '../statements/statementBook.ts';

/** How the agreement defines the measure of one covenant. What it leaves open stands as in PLAIN_DEFINITION. */
export interface MeasureDefinition {
  /** Share of EBITDA that capped add-backs may reach; null is no cap. */
  readonly addBackCap: Decimal | null;
  /** 'before': share of EBITDA before the capped add-backs; 'after': of EBITDA including them. */
  readonly addBackCapBasis: 'before' | 'after';
  /** Non-cash write-downs are added back. */
  readonly impairmentAddedBack: boolean;
  readonly leasesInDebt: boolean;
  /** 'frozen': by the accounting rules at signing, leases kept out of debt and their rent taken from EBITDA. */
  readonly accounting: 'current' | 'frozen';
  /** The most cash that may be netted; null is no limit. */
  readonly cashNettingCap: Decimal | null;
  /** Counts undrawn commitments towards minimum liquidity. */
  readonly undrawnCountsAsLiquidity: boolean;
  /** That many tests from the first one on take the months since closing, annualised. */
  readonly annualisedFirstTests: number;
  /** The rate at which debt in another currency is translated: of the balance sheet date or the year's average. */
  readonly debtRate: 'closing' | 'average';
  readonly gearing: 'debt to net worth' | 'debt to capital';
  readonly deferredTaxInNetWorth: boolean;
  /** Subordinated loans of shareholders count as net worth. */
  readonly shareholderLoansInNetWorth: boolean;
  /** Opening excess cash counts towards debt service. */
  readonly openingCashInDebtService: boolean;
  readonly dividendsInFixedCharges: boolean;
  /** A valuation older than this cannot be used; null is no limit. */
  readonly valuationMaxAgeMonths: number | null;
  /** Share of last year's unused capital expenditure that may be carried over. */
  readonly capexCarriedShare: Decimal | null;
  /** Share of every year's profit by which a minimum net worth rises. */
  readonly profitShareInNetWorth: Decimal | null;
}

/** What holds where an agreement says nothing of it. */
export const PLAIN_DEFINITION: MeasureDefinition = {
  addBackCap: null,
  addBackCapBasis: 'before',
  impairmentAddedBack: false,
  leasesInDebt: false,
  accounting: 'current',
  cashNettingCap: null,
  undrawnCountsAsLiquidity: false,
  annualisedFirstTests: 0,
  debtRate: 'closing',
  gearing: 'debt to net worth',
  deferredTaxInNetWorth: true,
  shareholderLoansInNetWorth: false,
  openingCashInDebtService: false,
  dividendsInFixedCharges: false,
  valuationMaxAgeMonths: null,
  capexCarriedShare: null,
  profitShareInNetWorth: null,
};

export interface AddBack {
  readonly id: number;
  readonly periodEnd: PlainDate;
  readonly months: number;
  readonly label: string;
  readonly amount: Decimal;
  readonly capped: boolean;
  readonly reason: string;
  /** Where it is shown: a page of a report, an invoice. */
  readonly evidence: string;
  /** The second person; null while nobody has checked it. */
  readonly approvedBy: string | null;
}

/** One currency in another: how many units of `to` one unit of `from` is worth. */
export interface CurrencyRate {
  readonly from: string;
  readonly to: string;
  /** 'average' over the period, 'closing' on its last day. */
  readonly kind: 'average' | 'closing';
  readonly periodStart: PlainDate;
  readonly periodEnd: PlainDate;
  readonly rate: Decimal;
  readonly source: string;
}

/** The way into the currency of a covenant, with a record of the rates that were taken. */
export interface Translation {
  /** The covenant's. */
  readonly currency: string;
  /** The rate of a currency: 'closing' of a day (months 0), 'average' of the months up to it; null where none is recorded. */
  readonly rateOf: (
    kind: CurrencyRate['kind'],
    from: string,
    periodEnd: PlainDate,
    months: number,
  ) => Decimal | null;
  /** Each rate that was asked for and found, once, in the order of asking. */
  readonly used: () => readonly CurrencyRate[];
}

/** What a measure is computed from. */
export interface MeasureRequest {
  readonly book: StatementBook;
  readonly date: PlainDate;
  readonly definition: MeasureDefinition;
  /** In the currency of the covenant. */
  readonly addBacks: readonly AddBack[];
  /** Months that flows are taken over: twelve, fewer where the agreement annualises its first tests. */
  readonly months: number;
  /** Into the currency of the covenant. */
  readonly translation: Translation;
}
