/** What a rule looks at, for tests: one covenant tested on statements, quality as told. */
import type { BorrowerInputs } from '../borrowerInputs.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { buildCovenant } from '../covenants/covenant.fixture.ts';
import { testDates } from '../covenants/levels.ts';
import { withRights } from '../covenants/rights.ts';
import { testCovenant } from '../covenants/testCovenant.ts';
import { justPassingOf } from '../patterns/justPassing.ts';
import { POLICY_VERSION_1 as policy } from '../policy.ts';
import type { QuarterScore, ReportingQuality } from '../quality/score.ts';
import { openBooks } from '../statements/statementBook.ts';
import type { AlertContext } from './rule.ts';

export const buildInputs = (given: Partial<BorrowerInputs> = {}): BorrowerInputs => ({
  borrowerId: 1,
  name: 'Tarnmoor Joinery',
  legalForm: 'company',
  sector: 'C16',
  currency: 'EUR',
  fiscalYearEndMonth: 12,
  inputVersion: 1,
  statements: [],
  covenants: [buildCovenant()],
  undertakings: [],
  rates: [],
  previous: null,
  ...given,
});

export const buildQuarterScore = (quarterEnd: PlainDate, score: number | null): QuarterScore => ({
  quarterEnd,
  score,
  noScoreReason: score === null ? 'coverage below 60' : null,
  coverage: 85,
  blocks: [],
  sectorPeers: 12,
  bookPeers: 60,
  sectorWeight: 1,
  derivedCashFlow: false,
  earningsAtRisk: null,
});

export const buildQuality = (given: Partial<ReportingQuality> = {}): ReportingQuality => ({
  headline: null,
  band: null,
  provisional: false,
  noScoreReason: null,
  latest: null,
  history: [],
  explanations: [],
  whatWouldChangeIt: null,
  remarks: [],
  published: [],
  beside: [],
  sources: [],
  ...given,
});

/** Every covenant of the inputs tested on its dates up to the day, as the walk does it. */
export function buildContext(
  inputs: BorrowerInputs,
  asOf: PlainDate,
  quality: ReportingQuality = buildQuality(),
): AlertContext {
  const books = openBooks(inputs, asOf);
  const tests = inputs.covenants.flatMap((covenant) =>
    withRights(
      covenant,
      testDates(covenant, asOf).map((date) =>
        testCovenant(covenant, books[covenant.scope], date, policy, asOf, inputs.rates),
      ),
      { undertakings: inputs.undertakings, asOf },
    ),
  );
  const patterns = inputs.covenants.map(({ id }) => justPassingOf(tests, id, policy.repeated.ofLast));
  return { inputs, tests, quality, patterns, nearLine: [], projections: [], policy, asOf };
}
