import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { StatementBook } from '../statements/statementBook.ts';

/** How the agreement defines EBITDA and debt for one covenant. */
export interface MeasureDefinition {
  /** Share of EBITDA that capped add-backs may reach; null is no cap. */
  readonly addBackCap: Decimal | null;
  /** 'before': share of EBITDA before the capped add-backs; 'after': of EBITDA including them. */
  readonly addBackCapBasis: 'before' | 'after';
  readonly leasesInDebt: boolean;
  /** The most cash that may be netted; null is no limit. */
  readonly cashNettingCap: Decimal | null;
  /** Counts undrawn commitments towards minimum liquidity. */
  readonly undrawnCountsAsLiquidity: boolean;
}

export interface AddBack {
  readonly id: number;
  readonly periodEnd: PlainDate;
  readonly months: number;
  readonly label: string;
  readonly amount: Decimal;
  readonly capped: boolean;
  readonly reason: string;
}

/** What a measure is computed from. */
export interface MeasureRequest {
  readonly book: StatementBook;
  readonly date: PlainDate;
  readonly definition: MeasureDefinition;
  readonly addBacks: readonly AddBack[];
}
