import type { Transaction } from 'sequelize';
import type { MovementRow, MovementsView } from '../../contracts/movements.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import type { Covenant } from '../../core/covenants/covenant.ts';
import { levelInWords, testedInWords } from '../../core/covenants/wording.ts';
import { formatScore } from '../../core/money/print.ts';
import type { StoredAssessment } from '../db/repositories/assessments.ts';
import { loadCovenants } from '../db/repositories/covenantInputs.ts';
import { findMovements } from '../db/repositories/movements.ts';
import type { Movement, Standing, Subject } from '../../core/whyItMoved.ts';

/** What moved a borrower's result since the last night; of one alert alone where it is named. */
export async function movementsOf(
  tx: Transaction,
  borrowerId: number,
  result: Pick<StoredAssessment, 'id' | 'knownAt'>,
  isAsked: (subject: Subject) => boolean = () => true,
): Promise<MovementsView | null> {
  const kept = await findMovements(tx, result.id);
  if (!kept) return null;
  const covenants = (await loadCovenants(tx, [borrowerId], result.knownAt)).get(borrowerId) ?? [];
  const asked = kept.movements.filter(({ subject }) => isAsked(subject));
  return { since: kept.since, rows: toMovementRows(asked, covenants) };
}

/** Movements in words, tests first; every figure printed as the page prints it elsewhere. */
const toMovementRows = (
  movements: readonly Movement[],
  covenants: readonly Covenant[],
): readonly MovementRow[] =>
  movements.map(({ subject, before, after, steps }) => {
    const print = printing(subject, covenants);
    return {
      key: JSON.stringify(subject),
      what: nameOf(subject, covenants),
      before: print(before),
      after: print(after),
      steps: steps.map(({ cause, from, to }) => ({ cause, from: print(from), to: print(to) })),
    };
  });

function nameOf(subject: Subject, covenants: readonly Covenant[]): string {
  const covenantName = (id: number) =>
    covenants.find((covenant) => covenant.id === id)?.name ?? `covenant ${id}`;
  switch (subject.kind) {
    case 'test':
      return covenantName(subject.covenantId);
    case 'score':
      return 'Reporting quality';
    case 'alert':
      return `Alert: ${subject.alert}${subject.covenantId === null ? '' : `, ${covenantName(subject.covenantId)}`}`;
  }
}

function printing(subject: Subject, covenants: readonly Covenant[]): (standing: Standing) => string {
  if (subject.kind === 'score')
    return ({ word, figure, on }) =>
      joined([figure && formatScore(figure), word, on && `at ${formatDay(on)}`]);
  if (subject.kind === 'alert') return ({ word, on }) => joined([word, on && `facts of ${formatDay(on)}`]);
  const measure = covenants.find(({ id }) => id === subject.covenantId)?.measure;
  if (!measure) return ({ word }) => word;
  return ({ word, figure, level, on }) =>
    joined([
      figure && testedInWords(measure, figure, level),
      level && `against ${levelInWords(measure, level)}`,
      word,
      on && `at ${formatDay(on)}`,
    ]);
}

const joined = (parts: readonly (string | null)[]): string =>
  parts.filter((part) => part !== null).join(', ');
