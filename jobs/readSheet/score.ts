/** Holds readings against what is expected: what was missed, wrongly taken, wrongly asked, wrongly refused. */
import { decimal } from '../../src/core/money/decimal.ts';
import type { Reading, ReadFact } from '../../src/core/statements/workbookReading.ts';
import { printed, type ExpectedFact, type ExpectedReading } from './expected.ts';

export interface FileScore {
  readonly file: string;
  readonly found: number;
  readonly expected: number;
  readonly missed: readonly string[];
  readonly wrong: readonly string[];
  readonly questionsMissed: readonly string[];
  /** Asked though the file answers them. */
  readonly questionsTooMany: readonly string[];
  /** Asked beyond what is expected, which is allowed. */
  readonly questionsBeyond: readonly string[];
  readonly refusalExpected: boolean;
  readonly refusalRight: boolean;
  /** Other differences: outcome, currency, unit, periods, notes, checks. */
  readonly remarks: readonly string[];
}

/** `before` was read without an answer, `after` with all that are given. */
export function scoreFile(expected: ExpectedReading, before: Reading, after: Reading): FileScore {
  const first = printed(expected.file, before);
  const early = expected.facts.filter((fact) => fact.after === undefined);
  const taken = before.facts.filter(({ waitsFor }) => waitsFor.length === 0);
  const results = expected.facts.map((fact) =>
    resultOf(
      fact,
      fact.after === undefined ? taken : after.facts.filter(({ waitsFor }) => waitsFor.length === 0),
    ),
  );
  const wrongEarly = expected.facts
    .filter((fact) => !early.includes(fact))
    .map((fact) => resultOf(fact, taken))
    .filter(({ kind }) => kind === 'wrong');
  const refusalRight = sameRefusal(expected, first);
  return {
    file: expected.file,
    found: results.filter(({ kind }) => kind === 'found').length,
    expected: expected.facts.length,
    missed: results.filter(({ kind }) => kind === 'missed').map(({ text }) => text),
    wrong: [...results.filter(({ kind }) => kind === 'wrong'), ...wrongEarly].map(({ text }) => text),
    questionsMissed: expected.questions.filter((kind) => !first.questions.includes(kind)),
    questionsTooMany: first.questions.filter((kind) => expected.not_questions.includes(kind)),
    questionsBeyond: first.questions.filter(
      (kind) => !expected.questions.includes(kind) && !expected.not_questions.includes(kind),
    ),
    refusalExpected: expected.refusal !== null,
    refusalRight,
    remarks: remarksOf(expected, first),
  };
}

type Result = { readonly kind: 'found' | 'missed' | 'wrong'; readonly text: string };

/** Facts of one line and period are added; a cell read as another line or period is wrong as well. */
function resultOf(expected: ExpectedFact, facts: readonly ReadFact[]): Result {
  const cellOf = (fact: ReadFact) => `${fact.sheet}!${fact.cell}`;
  const inCell = facts.find((fact) => cellOf(fact) === expected.cell);
  const name = `${expected.code} ${expected.end} ${expected.months}m ${expected.cell}`;
  const same = facts.filter(
    (fact) =>
      fact.code === expected.code &&
      fact.periodEnd === expected.end &&
      fact.months === expected.months &&
      (inCell ? fact.borrower === inCell.borrower : fact.borrower === null),
  );
  if (same.length === 0) {
    if (!inCell) return { kind: 'missed', text: name };
    return { kind: 'wrong', text: `${name}: read as ${inCell.code} ${inCell.periodEnd} ${inCell.months}m` };
  }
  const total = same.reduce((sum, { amount }) => sum.plus(amount), decimal(0));
  if (total.eq(expected.amount)) return { kind: 'found', text: name };
  return {
    kind: 'wrong',
    text: `${name}: expected ${expected.amount}, read ${total.toFixed()} (${same.map(cellOf).join(' + ')})`,
  };
}

function sameRefusal(expected: ExpectedReading, got: { refusal: ExpectedReading['refusal'] }): boolean {
  if (expected.refusal === null || got.refusal === null) return expected.refusal === got.refusal;
  return (
    expected.refusal.code === got.refusal.code &&
    (expected.refusal.where ?? got.refusal.where) === got.refusal.where
  );
}

function remarksOf(expected: ExpectedReading, got: Omit<ExpectedReading, 'not_questions'>): string[] {
  const remarks: string[] = [];
  const differ = (what: string, wanted: unknown, found: unknown) => {
    if (wanted !== found) remarks.push(`${what}: expected ${String(wanted)}, read ${String(found)}`);
  };
  differ('outcome', expected.outcome, got.outcome);
  if (expected.outcome !== 'refused') differ('currency', expected.currency, got.currency);
  if (expected.outcome !== 'refused') differ('unit', expected.unit, got.unit);
  const period = ({ end, months, scenario }: ExpectedReading['periods'][number]) =>
    `${end} ${months}m ${scenario}`;
  const found = new Set(got.periods.map(period));
  for (const wanted of expected.periods)
    if (!found.has(period(wanted))) remarks.push(`period missed: ${period(wanted)}`);
  for (const note of expected.notes) if (!got.notes.includes(note)) remarks.push(`note missed: ${note}`);
  for (const { code, outcome } of expected.checks) {
    const own = got.checks.find((check) => check.code === code)?.outcome ?? 'absent';
    if (own !== outcome) remarks.push(`check ${code}: expected ${outcome}, read ${own}`);
  }
  return remarks;
}

export function totalsLine(scores: readonly FileScore[]): string {
  const sum = (of: (score: FileScore) => number) => scores.reduce((total, score) => total + of(score), 0);
  const refusals = scores.filter(({ refusalExpected }) => refusalExpected);
  return [
    `facts found ${sum(({ found }) => found)} / ${sum(({ expected }) => expected)}`,
    `wrong facts ${sum(({ wrong }) => wrong.length)}`,
    `questions missed ${sum(({ questionsMissed }) => questionsMissed.length)}`,
    `questions too many ${sum(({ questionsTooMany }) => questionsTooMany.length)}`,
    `refusals right ${refusals.filter(({ refusalRight }) => refusalRight).length} / ${refusals.length}`,
  ].join(', ');
}

/** No wrong fact, 95 % of facts found, every refusal right and none beyond them. */
export function isGoodEnough(scores: readonly FileScore[]): boolean {
  const found = scores.reduce((total, score) => total + score.found, 0);
  const expected = scores.reduce((total, score) => total + score.expected, 0);
  return (
    scores.every(({ wrong, refusalRight }) => wrong.length === 0 && refusalRight) && found >= expected * 0.95
  );
}
