import type { Transaction } from 'sequelize';
import type { ImportAnswer } from '../../contracts/imports.ts';
import type { Reading } from '../../contracts/reading.ts';
import { storedFiles } from '../files/storedFiles.ts';
import { lastQuarterRevenue, readingFacts } from '../db/repositories/readingContext.ts';
import { listAnswers, listRemembered } from '../db/repositories/importAnswers.ts';
import type { StagedReading } from '../db/repositories/imports.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { readWorkbook } from '../sheets/read/readWorkbook.ts';

interface FileToRead {
  readonly borrowerId: number;
  readonly bytes: Buffer;
  readonly fileName: string;
  /** The draft whose given answers count; null for a file that is not staged yet. */
  readonly importId: number | null;
  /** An answer that is about to be given, or taken back. */
  readonly answering?: ImportAnswer;
}

/**
 * Reads a file anew with every answer that holds: those given on this import, and those remembered for the
 * borrower's layout. The layout is known only once the file is read, so that remembered answers cost a second look.
 */
export async function readFile(file: FileToRead): Promise<Reading> {
  const { borrowerId, bytes, fileName, importId, answering } = file;
  const { context, given } = await inTransaction(async (tx) => ({
    context: await contextOf(tx, borrowerId),
    given: importId === null ? [] : await listAnswers(tx, importId),
  }));
  const own = new Map(given.map((answer) => [answer.questionKey, answer.answer]));
  if (answering?.answer) own.set(answering.questionKey, answering.answer);
  else if (answering) own.delete(answering.questionKey);
  const first = await readWorkbook(bytes, fileName, { ...context, answers: Object.fromEntries(own) });
  if (first.outcome === 'refused') return first;

  const remembered = (await inTransaction((tx) => listRemembered(tx, borrowerId, first.layoutKey))).filter(
    (answer) => !own.has(answer.questionKey),
  );
  if (remembered.length === 0) return first;
  const answers = [...remembered.map(({ questionKey, answer }) => [questionKey, answer] as const), ...own];
  return readWorkbook(bytes, fileName, { ...context, answers: Object.fromEntries(answers) });
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
