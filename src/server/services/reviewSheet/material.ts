/** What the review sheet is made from: the borrower as its page shows it, and what stands beside it. */
import type { BorrowerView, CovenantView, TestView } from '../../../contracts/borrowers.ts';
import type { Covenant } from '../../../core/covenants/covenant.ts';
import { spokenTest } from '../../../core/covenants/spokenTest.ts';
import { OURS } from '../../../core/covenants/wording.ts';
import type { Policy } from '../../../core/policy.ts';
import type { FigureSourceRecord, SignalRecord } from '../../db/repositories/reviewSheets.ts';

export interface SheetMaterial {
  readonly view: BorrowerView;
  readonly sectorScheme: string;
  /** With terms, add-backs and waivers as known at the data cut-off. */
  readonly covenants: readonly Covenant[];
  /** The version that the result was computed under. */
  readonly policy: Policy;
  readonly signals: readonly SignalRecord[];
  readonly figureSources: readonly FigureSourceRecord[];
  readonly madeAt: Date;
}

export const NOT_ASSESSED = 'Not assessed yet: there is no result to show.';

/** The test that headroom, bridge and later levels of the view are of. */
export const shownTest = ({ tests }: CovenantView): TestView | null => spokenTest(tests) ?? null;

export const termsOf = ({ covenants }: SheetMaterial, { id }: CovenantView): Covenant | null =>
  covenants.find((covenant) => covenant.id === id) ?? null;

/** The desk's own trigger says so by its name: a committee reads no second column first. */
export const covenantName = ({ name, isOurs }: CovenantView): string => (isOurs ? `${name}, ${OURS}` : name);
