/** A borrower for tests of the review sheet, assessed by the core itself: net leverage a hair over its level, on an add-back. */
import type { BorrowerView } from '../../../contracts/borrowers.ts';
import { buildInputs } from '../../../core/alerts/rule.fixture.ts';
import { assess } from '../../../core/assess.ts';
import type { Covenant } from '../../../core/covenants/covenant.ts';
import {
  buildAddBack,
  buildCovenant,
  buildLevel,
  buildYear,
} from '../../../core/covenants/covenant.fixture.ts';
import { PLAIN_DEFINITION } from '../../../core/measures/definition.ts';
import { decimal } from '../../../core/money/decimal.ts';
import { POLICY_VERSION_1 } from '../../../core/policy.ts';
import { NO_BOOK } from '../../../core/bookCrossSection.ts';
import type { Statement } from '../../../core/statements/statement.ts';
import type { CheckRecord } from '../../db/repositories/covenantTests.ts';
import type { FigureSourceRecord, SignalRecord } from '../../db/repositories/reviewSheets.ts';
import { toCovenantViews } from '../covenantViews.ts';
import type { SheetMaterial } from './material.ts';

const AS_OF = '2026-03-15';
const MADE_AT = new Date('2026-03-16T08:00:00Z');

const yearly = { firstTestOn: '2024-12-31', everyMonths: 12 } as const;

/** 36.754 / 10.5 = 3.50038…: not met at 3.50, and 3.50 to two places. */
const STATEMENTS: readonly Statement[] = [
  ...buildYear('2024-12-31', { ebitda: 12, debt: 36, cash: 0 }),
  ...buildYear('2025-12-31', { ebitda: 10, debt: 36.754, cash: 0 }),
];

export const COVENANTS: readonly Covenant[] = [
  buildCovenant({
    ...yearly,
    id: 1,
    levels: [buildLevel('2024-01-01', '2026-05-31', '3.5'), buildLevel('2026-06-01', null, '3.25')],
    definition: { ...PLAIN_DEFINITION, addBackCap: decimal('0.25') },
    addBacks: [buildAddBack('2025-12-31', 0.5, { capped: true })],
  }),
  buildCovenant({
    ...yearly,
    id: 2,
    name: 'Current ratio',
    clause: '20.2(b)',
    measure: 'current-ratio',
    operator: '>=',
    levels: [buildLevel('2024-01-01', null, '1.2')],
  }),
];

export interface MaterialGiven {
  readonly view?: Partial<BorrowerView>;
  readonly covenants?: readonly Covenant[];
  readonly statements?: readonly Statement[];
  readonly checks?: readonly CheckRecord[];
  readonly signals?: readonly SignalRecord[];
  readonly fileName?: string;
}

export function buildMaterial(given: MaterialGiven = {}): SheetMaterial {
  const { covenants = COVENANTS, statements = STATEMENTS, fileName = 'Figures 2025.xlsx' } = given;
  const assessment = assess(buildInputs({ statements, covenants }), NO_BOOK, POLICY_VERSION_1, AS_OF);
  const facilities = [{ id: 1, name: 'Term loan A' }];
  return {
    view: {
      ...VIEW,
      covenants: toCovenantViews(covenants, assessment, {
        facilities,
        checks: given.checks ?? [],
        band: POLICY_VERSION_1.justPassingBand,
      }),
      quality: assessment.quality,
      ...given.view,
    },
    sectorScheme: 'NACE 2.1',
    covenants,
    policy: POLICY_VERSION_1,
    signals: given.signals ?? [],
    figureSources: statements.flatMap((statement, place) => sourcesOf(statement, place, fileName)),
    madeAt: MADE_AT,
  };
}

const sourcesOf = (statement: Statement, place: number, fileName: string): FigureSourceRecord[] =>
  Object.keys(statement.amounts).map((line, row) => ({
    statementId: statement.id,
    line,
    basis: statement.basis,
    version: statement.version,
    currency: statement.currency,
    receivedOn: statement.receivedOn,
    fileName,
    sha256: 'a'.repeat(64),
    sheet: "P&L '25",
    cell: `${String.fromCharCode(66 + place)}${row + 2}`,
    rawText: '1',
  }));

export const buildSignal = (given: Partial<SignalRecord> = {}): SignalRecord => ({
  kind: 'test not met',
  severity: 'urgent',
  state: 'raised',
  isOpen: 1,
  sentence: 'Net leverage 3.5004x, at most 3.50x: not met on our figures.',
  factDate: '2025-12-31',
  raisedAt: new Date('2026-03-15T01:30:00Z'),
  dueOn: '2026-03-20',
  ownerName: 'Maren Holtqvane',
  closedAt: null,
  closedBy: null,
  closingReason: null,
  closingText: null,
  ...given,
});

const VIEW: BorrowerView = {
  id: 7,
  name: 'Fathom Works Ltd',
  legalForm: 'company',
  lei: 'ZZ0000UKEEL000000A65',
  isListed: false,
  sectorCode: '25',
  sectorLabel: 'Metal products',
  country: 'FR',
  currency: 'EUR',
  fiscalYearEndMonth: 12,
  deskId: 1,
  deskName: 'Northern desk',
  managerId: 2,
  managerName: 'Maren Holtqvane',
  analystName: 'Ilka Brandsoe',
  facilities: [
    {
      id: 1,
      name: 'Term loan A',
      kind: 'term loan',
      currency: 'EUR',
      limit: '40',
      drawn: '36.754',
      marginBps: 250,
      maturesOn: '2029-12-31',
      security: 'unsecured',
    },
  ],
  computed: {
    asOf: AS_OF,
    dataCutOff: '2026-03-16T01:30:00.000Z',
    peersAsOf: AS_OF,
    peersAreLastNights: false,
    methodVersion: '1.0',
    policyVersion: 1,
    inputVersion: 3,
  },
  covenants: [],
  quality: null,
  outlook: null,
  movements: null,
  today: AS_OF,
  alerts: [],
  watchlist: null,
  proposals: [],
  mayImport: false,
  mayPropose: false,
  deskMembers: [],
};
