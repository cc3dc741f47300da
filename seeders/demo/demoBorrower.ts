import type { LegalForm } from '../../src/core/borrowerInputs.ts';
import type { PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { DeskName, Scenario } from './borrowerTable.ts';
import type { DemoCovenant } from './demoCovenant.ts';
import type { DemoQuarter } from './demoLines.ts';
import type { SectorProfile } from './sectorProfiles.ts';

/** A workbook as the borrower sent it. */
export interface DemoDelivery {
  readonly fileName: string;
  readonly quarters: readonly DemoQuarter[];
  readonly receivedOn: PlainDate;
}

export interface DemoFacility {
  readonly name: string;
  readonly kind: string;
  /** Thousands. */
  readonly limit: number;
  readonly drawn: number;
  readonly marginBps: number;
  readonly startsOn: PlainDate;
  readonly maturesOn: PlainDate;
  readonly security: string;
}

export interface DemoBorrower {
  readonly name: string;
  readonly scenario: Scenario;
  readonly legalForm: LegalForm;
  readonly lei: string;
  readonly isListed: boolean;
  readonly sector: SectorProfile;
  readonly country: string;
  readonly currency: 'EUR' | 'GBP';
  readonly fiscalYearEndMonth: number;
  readonly framework: string;
  readonly desk: DeskName;
  /** Which of the desk's relationship managers, from 0. */
  readonly managerNumber: number;
  /** As they stand after the last delivery, oldest first. */
  readonly quarters: readonly DemoQuarter[];
  /** Oldest first. */
  readonly deliveries: readonly DemoDelivery[];
  /** The quarter that should have been delivered and was not. */
  readonly owed: DemoQuarter | null;
  /** Days after a quarter's end on which its figures arrive. */
  readonly usualDelayDays: number;
  readonly facilities: readonly DemoFacility[];
  /** The first hangs on the first facility. */
  readonly covenants: readonly DemoCovenant[];
  /** Of measures and definitions that only a few agreed to. */
  readonly furtherCovenants: readonly DemoCovenant[];
  readonly dueDays: number;
  readonly graceDays: number;
}
