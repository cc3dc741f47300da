/**
 * npm run read-sheet -- FILE [--json]: prints how a borrower's file is read, and stores nothing.
 * npm run read-sheet -- --score FOLDER: reads every file that FOLDER/expected.json names and counts what is right;
 * exit 1 unless no fact is wrong, 95 % are found and all refusals are right.
 */
import { existsSync, readFileSync } from 'node:fs';
import { basename, join, resolve } from 'node:path';
import { parseArgs } from 'node:util';
import { z } from 'zod';
import type { Reading, ReadingContext } from '../src/core/statements/workbookReading.ts';
import { readWorkbook } from '../src/server/sheets/read/readWorkbook.ts';
import { answersTo } from './readSheet/answers.ts';
import { expectedAnswers, expectedReading, printed, type AnswersOfFile } from './readSheet/expected.ts';
import { isGoodEnough, scoreFile, totalsLine, type FileScore } from './readSheet/score.ts';

const USAGE = 'npm run read-sheet -- FILE [--json], or npm run read-sheet -- --score FOLDER';
/** An answer may bring up a further question: it is asked and answered in turn. */
const MOST_ROUNDS = 4;
const NOTHING_KNOWN: ReadingContext = {
  fiscalYearEndMonth: null,
  reportingCurrency: null,
  answers: {},
  lastQuarterRevenue: null,
};

const { values, positionals } = parseArgs({
  allowPositionals: true,
  options: { json: { type: 'boolean', default: false }, score: { type: 'string' } },
});
const fromCaller = (path: string): string => resolve(process.env.CALLER_FOLDER ?? process.cwd(), path);

if (values.score !== undefined) await scoreFolder(fromCaller(values.score));
else if (positionals[0] !== undefined) await readOne(fromCaller(positionals[0]), values.json);
else {
  console.error(`Name a file. ${USAGE}`);
  process.exitCode = 2;
}

async function readOne(path: string, asJson: boolean): Promise<void> {
  if (!existsSync(path)) {
    console.error(`There is no file ${path}. Nothing was read. ${USAGE}`);
    process.exitCode = 2;
    return;
  }
  const reading = await readWorkbook(readFileSync(path), basename(path), NOTHING_KNOWN);
  console.log(asJson ? JSON.stringify(printed(basename(path), reading)) : inWords(reading));
}

function inWords(reading: Reading): string {
  if (reading.refusal) return `refused (${reading.refusal.code}): ${reading.refusal.message}`;
  const facts = reading.facts.map(
    ({ code, periodEnd, months, amount, sheet, cell, label, waitsFor }) =>
      `  ${code}  ${months === 0 ? 'at' : `${months} months to`} ${periodEnd}  ${amount}  ${sheet}!${cell}  '${label}'${waitsFor.length > 0 ? `  waits for ${waitsFor.join(', ')}` : ''}`,
  );
  return [
    `${reading.outcome}: ${reading.facts.length} facts, currency ${reading.currency ?? 'not known'}, unit ${reading.unit ?? 'not known'}`,
    ...reading.questions.map(
      ({ kind, text, options }) => `? ${kind}: ${text} [${options.map(({ label }) => label).join(' | ')}]`,
    ),
    ...reading.notes.map(({ code, text }) => `- ${code}: ${text}`),
    ...reading.checks.map(
      ({ code, text, outcome, difference, periodEnd, months }) =>
        `= ${code} ${months}m ${periodEnd}: ${outcome}, difference ${difference} (${text})`,
    ),
    ...facts,
  ].join('\n');
}

async function scoreFolder(folder: string): Promise<void> {
  const expected = z.array(expectedReading).parse(jsonIn(join(folder, 'expected.json')));
  const answersPath = join(folder, 'answers.json');
  const answers = existsSync(answersPath) ? expectedAnswers.parse(jsonIn(answersPath)) : {};
  const scores: FileScore[] = [];
  for (const one of expected) {
    const bytes = readFileSync(join(folder, one.file));
    const before = await readWorkbook(bytes, one.file, NOTHING_KNOWN);
    const after = await readAnswered(bytes, one.file, before, answers[one.file] ?? {});
    const score = scoreFile(one, before, after);
    scores.push(score);
    console.log(lineOf(score));
  }
  console.log(totalsLine(scores));
  if (!isGoodEnough(scores)) process.exitCode = 1;
}

function jsonIn(path: string): unknown {
  return JSON.parse(readFileSync(path, 'utf8'));
}

async function readAnswered(
  bytes: Buffer,
  file: string,
  before: Reading,
  given: AnswersOfFile,
): Promise<Reading> {
  let reading = before;
  let answers: Record<string, string> = {};
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const known = Object.keys(answers).length;
    answers = { ...answers, ...answersTo(reading, given) };
    if (Object.keys(answers).length === known) break;
    reading = await readWorkbook(bytes, file, { ...NOTHING_KNOWN, answers });
  }
  return reading;
}

function lineOf(score: FileScore): string {
  const lists = [
    ['missed', score.missed],
    ['wrong', score.wrong],
    ['question missed', score.questionsMissed],
    ['question too many', score.questionsTooMany],
    ['question beyond', score.questionsBeyond],
    ['remark', score.remarks],
    ['refusal', score.refusalRight ? [] : ['not as expected']],
  ] as const;
  const details = lists.flatMap(([name, texts]) => texts.map((text) => `    ${name}: ${text}`));
  return [`${score.file}: facts ${score.found} / ${score.expected}`, ...details].join('\n');
}
