import type { PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { CureRights, Operator } from '../../src/core/covenants/covenant.ts';
import type { MeasureDefinition } from '../../src/core/measures/definition.ts';
import type { MeasureCode } from '../../src/core/measures/measure.ts';

/** A covenant as the demo desk agreed it. Levels are times or shares, or thousands for amounts of money. */
export interface DemoCovenant {
  readonly name: string;
  readonly clause: string;
  readonly measure: MeasureCode;
  readonly operator: Operator;
  readonly roundingPlaces: number | null;
  readonly firstTestOn: PlainDate;
  readonly addBackCap: string | null;
  /** What the agreement defines beyond the cap; left out where it says nothing. */
  readonly definition?: Partial<MeasureDefinition>;
  /** Which of the borrower's facilities, from 0; the first where left out. */
  readonly facilityNumber?: number;
  /** Quarterly where left out. */
  readonly everyMonths?: 3 | 6 | 12;
  /** The borrower's where left out. */
  readonly currency?: 'EUR';
  /** A trigger of the desk, not in the agreement. */
  readonly isOurs?: true;
  /** Tested only above this share of drawings, as decimal text. */
  readonly springingTrigger?: string;
  readonly cureRights?: DemoCureRights;
  readonly cures?: readonly DemoCure[];
  readonly levels: readonly DemoLevel[];
  readonly addBacks: readonly DemoAddBack[];
  readonly waiver: DemoWaiver | null;
}

export interface DemoLevel {
  readonly from: PlainDate;
  readonly until: PlainDate | null;
  readonly level: number | null;
  /** Agreed after signing. */
  readonly isReset?: true;
}

/** Of one quarter, in thousands. */
export interface DemoAddBack {
  readonly periodEnd: PlainDate;
  readonly label: string;
  readonly amount: number;
  readonly capped: boolean;
  readonly reason: string;
  readonly evidence: string;
}

export type DemoCureRights = CureRights;

/** Money of the owners, in thousands. */
interface DemoCure {
  readonly quarterEnd: PlainDate;
  readonly method: CureRights['method'];
  readonly amount: number;
  readonly receivedOn: PlainDate;
}

interface DemoWaiver {
  readonly testDate: PlainDate;
  readonly grantedOn: PlainDate;
  readonly until: PlainDate;
  readonly conditions: string;
}
