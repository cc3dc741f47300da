/** Answers to a reading's questions: those given on an import, and those remembered for a borrower's layout. */
import type { Transaction } from 'sequelize';
import type { Question } from '../../../core/statements/workbookReading.ts';
import { execute, select } from '../sql.ts';

export interface AnswerRecord {
  readonly questionKey: string;
  readonly answer: string;
  readonly by: string;
  readonly at: Date;
}

export interface GivenAnswerRecord extends AnswerRecord {
  /** As the question said when it was asked: one that is answered may be asked no more. */
  readonly holdsFor: Question['holdsFor'];
}

export async function listAnswers(tx: Transaction, importId: number): Promise<GivenAnswerRecord[]> {
  return select<GivenAnswerRecord>(
    tx,
    `select a.question_key as questionKey, a.answer, a.holds_for as holdsFor, p.name as \`by\`, a.answered_at as at
     from import_answers a join people p on p.id = a.answered_by
     where a.import_id = :importId and a.undone_at is null order by a.id`,
    { importId },
  );
}

export async function insertAnswer(
  tx: Transaction,
  given: {
    importId: number;
    questionKey: string;
    answer: string;
    holdsFor: Question['holdsFor'];
    personId: number;
    now: Date;
  },
): Promise<void> {
  await execute(
    tx,
    `insert into import_answers (import_id, question_key, answer, holds_for, answered_by, answered_at)
     values (:importId, :questionKey, :answer, :holdsFor, :personId, :now)`,
    given,
  );
}

/** Takes the answer back; it stays on record as undone. */
export async function undoAnswer(
  tx: Transaction,
  undone: { importId: number; questionKey: string; now: Date },
): Promise<void> {
  await execute(
    tx,
    `update import_answers set undone_at = :now
     where import_id = :importId and question_key = :questionKey and undone_at is null`,
    undone,
  );
}

export async function listRemembered(
  tx: Transaction,
  borrowerId: number,
  layoutKey: string,
): Promise<AnswerRecord[]> {
  return select<AnswerRecord>(
    tx,
    `select m.question_key as questionKey, m.answer, p.name as \`by\`, m.known_from as at
     from placements m join people p on p.id = m.decided_by
     where m.borrower_id = :borrowerId and m.layout_key = :layoutKey and m.known_to is null order by m.id`,
    { borrowerId, layoutKey },
  );
}

/** Remembers an answer for later files of the layout; an earlier, other answer ends here and stays on record. */
export async function rememberAnswer(
  tx: Transaction,
  answer: {
    borrowerId: number;
    layoutKey: string;
    questionKey: string;
    answer: string;
    personId: number;
    now: Date;
  },
): Promise<void> {
  const { affectedRows } = await execute(
    tx,
    `update placements set known_to = :now
     where borrower_id = :borrowerId and layout_key = :layoutKey and question_key = :questionKey and known_to is null and answer <> :answer`,
    answer,
  );
  const standing = affectedRows === 0 ? await listRemembered(tx, answer.borrowerId, answer.layoutKey) : [];
  if (standing.some((one) => one.questionKey === answer.questionKey)) return;
  await execute(
    tx,
    `insert into placements (borrower_id, layout_key, question_key, answer, decided_by, known_from)
     values (:borrowerId, :layoutKey, :questionKey, :answer, :personId, :now)`,
    answer,
  );
}
