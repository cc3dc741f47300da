/** From a borrower's statements to what it brings to the comparison at one quarter end. */
import { accrualNoise, type NoiseSeries } from '../accruals/accrualNoise.ts';
import { NEVER_SCORED, type BorrowerInputs } from '../borrowerInputs.ts';
import { fiscalPosition } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import type { Statement, Tie } from '../statements/statement.ts';
import { openBooks, type Books, type StatementBook } from '../statements/statementBook.ts';
import { accountsAt, type AccountsAt } from './accountsAt.ts';
import { acquisitionsOf } from './acquisitions.ts';
import { isDerivedCashFlow } from './cashFlowOf.ts';
import { mixesPresentations } from './cashFlowPresentation.ts';
import { hasDaysOnYear } from './dayFlows.ts';
import { noiseSeriesOf } from './noiseSeries.ts';
import type { PeerFigure, PeerInputs } from './peerFigures.ts';
import { figuresBeside, LINE_FIGURES, readFigure, UNDER_ONE_PRESENTATION } from './lineFigures.ts';
import { noNoise } from './publishedSeries.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import { fScreen, mScreen } from './screenScores.ts';

/**
 * One borrower at one quarter end, amounts in its own currency units, paid items positive. Null for legal forms that
 * are never scored and where no balance sheet of that day is known by `asOf`.
 *
 * A figure that cannot be read is left out; nothing is filled in but a cash flow derived from the balance sheet,
 * which is marked. Source: methods.md B2 and B6.
 *
 * @example peerInputs(inputs, '2026-09-30', '2026-11-30')?.basis // => 'management'
 * @example peerInputs({ ...inputs, legalForm: 'bank' }, '2026-09-30', '2026-11-30') // => null
 */
export function peerInputs(
  inputs: BorrowerInputs,
  quarterEnd: PlainDate,
  asOf: PlainDate,
): PeerInputs | null {
  if (NEVER_SCORED.includes(inputs.legalForm)) return null;
  const book = scoredBook(openBooks(inputs, asOf));
  return atQuarterEnd(inputs, book, noiseSeriesOf(book), quarterEnd);
}

/**
 * The last quarter ends that have a balance sheet, oldest first: eight at most.
 *
 * @example peerInputsOfQuarters(inputs, '2026-11-30').length // => 8
 */
export const peerInputsOfQuarters = (inputs: BorrowerInputs, asOf: PlainDate): readonly PeerInputs[] =>
  peerInputsFrom(inputs, openBooks(inputs, asOf));

/**
 * The same out of books that are open already.
 *
 * @example peerInputsFrom(inputs, openBooks(inputs, '2026-11-30')).length // => 8
 */
export function peerInputsFrom(inputs: BorrowerInputs, books: Books): readonly PeerInputs[] {
  if (NEVER_SCORED.includes(inputs.legalForm)) return [];
  const book = scoredBook(books);
  const noiseSeries = noiseSeriesOf(book);
  return quarterEndsOf(book)
    .slice(-QUALITY_TABLE.historyQuarters)
    .flatMap((quarterEnd) => atQuarterEnd(inputs, book, noiseSeries, quarterEnd) ?? []);
}

/** Fiscal quarter ends with a balance sheet, oldest first. Months between quarter ends are left out. */
const quarterEndsOf = (book: StatementBook): readonly PlainDate[] =>
  book.current
    .filter(
      ({ months, periodEnd }) =>
        months === 0 && fiscalPosition(periodEnd, book.fiscalYearEndMonth).monthsIntoYear % 3 === 0,
    )
    .map(({ periodEnd }) => periodEnd);

/**
 * The book that is scored: group accounts where the borrower gives any.
 *
 * @example scoredBook(openBooks(inputs, '2026-11-30')).fiscalYearEndMonth // => 12
 */
export const scoredBook = (books: Books): StatementBook =>
  books.group.statements.length > 0 ? books.group : books['stand-alone'];

function atQuarterEnd(
  inputs: BorrowerInputs,
  book: StatementBook,
  noiseSeries: ReturnType<typeof noiseSeriesOf>,
  quarterEnd: PlainDate,
): PeerInputs | null {
  const balanceSheet = book.statementOf(quarterEnd, 0);
  if (!balanceSheet) return null;
  const accounts = accountsAt(book, quarterEnd);
  const acquisition = acquisitionsOf(accounts);
  const derivedCashFlow = isDerivedCashFlow(accounts);
  const lines = LINE_FIGURES.map((figure) => [figure, readFigure(figure, accounts)] as const);
  const used = accounts.used();
  const tie = worstTie(used);
  const cashFlowPresentationChanged = mixesPresentations(used);
  const hasCashFlow = !derivedCashFlow && !cashFlowPresentationChanged;
  const { screens, whyMissing, mScoreForm } = manyLineFigures(accountsAt(book, quarterEnd), hasCashFlow);
  const noise = noiseOf(noiseSeries(quarterEnd));
  const given = lines.filter(
    ([figure, value]) =>
      value !== undefined && !(cashFlowPresentationChanged && UNDER_ONE_PRESENTATION.includes(figure)),
  );
  return {
    borrowerId: inputs.borrowerId,
    sector: inputs.sector,
    quarterEnd,
    ties: tie !== 'does-not-tie',
    tie,
    basis: balanceSheet.basis,
    derivedCashFlow,
    cashFlowPresentationChanged,
    daysOnYear: hasDaysOnYear(accounts),
    figures: {
      ...Object.fromEntries(given),
      ...figuresBeside(accountsAt(book, quarterEnd)),
      ...screens,
      ...noise.figures,
    },
    whyMissing: { ...whyMissing, ...noise.whyMissing },
    ...(mScoreForm && { mScoreForm }),
    acquisitionInYear: acquisition.inYear,
    acquisitionThisQuarter: acquisition.thisQuarter,
  };
}

type Some<Value> = Readonly<Partial<Record<PeerFigure, Value>>>;

/** They read their own accounts: a line that only they need and that does not tie costs them alone. */
function manyLineFigures(
  accounts: AccountsAt,
  hasCashFlow: boolean,
): {
  readonly screens: Some<number>;
  readonly whyMissing: Some<string>;
  readonly mScoreForm?: 'M8' | 'M5';
} {
  const m = mScreen(accounts, hasCashFlow);
  const f = fScreen(accounts);
  return {
    screens: { ...('score' in m && { mScore: m.score }), ...('f' in f && { fScore: f.f }) },
    whyMissing: {
      ...('missing' in m && { mScore: m.missing }),
      ...('missing' in f && { fScore: f.missing }),
    },
    ...('form' in m && { mScoreForm: m.form }),
  };
}

/** As Dechow and Dichev fit it; the controls of McNichols stand beside the score. */
function noiseOf({ cashFlow, workingCapitalChange }: NoiseSeries): {
  readonly figures: Some<number>;
  readonly whyMissing: Some<string>;
} {
  const noise = accrualNoise({ cashFlow, workingCapitalChange });
  if (noise.ok) return { figures: { accrualNoise: noise.value.residualStandardDeviation }, whyMissing: {} };
  return { figures: {}, whyMissing: { accrualNoise: noNoise(noise.error) } };
}

/** From best to worst as a comparison sees it: what was not checked is taken as it is. */
const TIE_ORDER: readonly Tie[] = ['ties', 'not-checked', 'warning', 'does-not-tie'];

const worstTie = (statements: readonly Statement[]): Tie =>
  statements.reduce<Tie>(
    (worst, { tie }) => (TIE_ORDER.indexOf(tie) > TIE_ORDER.indexOf(worst) ? tie : worst),
    'ties',
  );
