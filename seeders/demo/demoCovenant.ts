import type { PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { Operator } from '../../src/core/covenants/covenant.ts';
import type { MeasureCode } from '../../src/core/measures/measure.ts';

/** A covenant as the demo desk agreed it. Levels are times, or thousands for minimum liquidity. */
export interface DemoCovenant {
  readonly name: string;
  readonly clause: string;
  readonly measure: MeasureCode;
  readonly operator: Operator;
  readonly roundingPlaces: number | null;
  readonly firstTestOn: PlainDate;
  readonly addBackCap: string | null;
  readonly levels: readonly DemoLevel[];
  readonly addBacks: readonly DemoAddBack[];
  readonly waiver: DemoWaiver | null;
}

export interface DemoLevel {
  readonly from: PlainDate;
  readonly until: PlainDate | null;
  readonly level: number | null;
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

interface DemoWaiver {
  readonly testDate: PlainDate;
  readonly grantedOn: PlainDate;
  readonly until: PlainDate;
  readonly conditions: string;
}
