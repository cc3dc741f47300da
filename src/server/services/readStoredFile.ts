import type { Transaction } from 'sequelize';
import type { Reading } from '../../contracts/reading.ts';
import { storedFiles } from '../files/storedFiles.ts';
import { lastQuarterRevenue, readingFacts } from '../db/repositories/readingContext.ts';
import { listAnswers, listRemembered, type AnswerRecord } from '../db/repositories/importAnswers.ts';
import type { StagedReading } from '../db/repositories/imports.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { readWorkbook } from '../sheets/read/readWorkbook.ts';

/** What a file was read as, with the answers that the reading rests on. */
export interface AnsweredReading {
  readonly reading: Reading;
  readonly answers: readonly (AnswerRecord & { readonly remembered: boolean })[];
}

interface File {
  readonly borrowerId: number;
  readonly bytes: Buffer;
  readonly fileName: string;
  /** The draft whose given answers count; null for a file that is not staged yet. */
  readonly importId: number | null;
}

/**
 * Reads a file anew with every answer that holds: those given on this import, and those remembered for the
 * borrower's layout. The layout is known only once the file is read, so that remembered answers cost a second look.
 */
export async function readFile(file: File): Promise<AnsweredReading> {
  const { context, given } = await inTransaction(async (tx) => ({
    context: await contextOf(tx, file.borrowerId),
    given: file.importId === null ? [] : await listAnswers(tx, file.importId),
  }));
  const own = given.map((answer) => ({ ...answer, remembered: false }));
  const first = await readWorkbook(file.bytes, file.fileName, { ...context, answers: byKey(own) });
  if (first.outcome === 'refused') return { reading: first, answers: own };

  const remembered = (await inTransaction((tx) => listRemembered(tx, file.borrowerId, first.layoutKey)))
    .filter((answer) => !own.some((one) => one.questionKey === answer.questionKey))
    .map((answer) => ({ ...answer, remembered: true }));
  if (remembered.length === 0) return { reading: first, answers: own };
  const answers = [...remembered, ...own];
  return {
    reading: await readWorkbook(file.bytes, file.fileName, { ...context, answers: byKey(answers) }),
    answers,
  };
}

/** The bytes as they were sent; a stored file that is gone is a fault of ours, never an empty reading. */
export async function storedBytes(sha256: string): Promise<Buffer> {
  const bytes = await storedFiles().get(sha256);
  if (!bytes) throw new Error(`stored file ${sha256} is missing`);
  return Buffer.from(bytes);
}

export const toStaged = (reading: Reading): StagedReading => ({
  reading: JSON.stringify(reading),
  layoutKey: reading.layoutKey,
  openQuestions: reading.questions.filter((question) => question.answer === null).length,
  periods: new Set(reading.facts.map((fact) => `${fact.periodEnd} ${fact.months}`)).size,
});

async function contextOf(tx: Transaction, borrowerId: number) {
  const borrower = await readingFacts(tx, borrowerId);
  if (!borrower) throw new Error(`no borrower ${borrowerId}`);
  return {
    fiscalYearEndMonth: borrower.fiscalYearEndMonth,
    reportingCurrency: borrower.currency,
    lastQuarterRevenue: await lastQuarterRevenue(tx, borrowerId),
    borrowerName: borrower.name,
  };
}

const byKey = (answers: readonly { questionKey: string; answer: string }[]): Record<string, string> =>
  Object.fromEntries(answers.map((answer) => [answer.questionKey, answer.answer]));
