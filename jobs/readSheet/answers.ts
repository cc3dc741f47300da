/** Answers by kind of question, turned into answers to the questions that a reading asks. */
import type { Question, Reading } from '../../src/core/statements/workbookReading.ts';
import type { AnswersOfFile } from './expected.ts';

/** Null where nothing is given for the question. */
export function answersTo(reading: Reading, given: AnswersOfFile): Record<string, string> {
  const answers = reading.questions.flatMap((question) => {
    const answer = answerTo(question, given[question.kind]);
    return answer === null ? [] : [[question.key, answer] as const];
  });
  return Object.fromEntries(answers);
}

function answerTo(question: Question, given: AnswersOfFile[string] | undefined): string | null {
  if (given === undefined) return null;
  if (typeof given === 'string' || typeof given === 'number') return String(given);
  if (Array.isArray(given)) return question.options.find(({ value }) => given.includes(value))?.value ?? null;
  switch (question.kind) {
    case 'period-length':
      return Object.entries(given)
        .map(([column, months]) => `${column}=${months}`)
        .join(';');
    case 'sign':
      return String(Object.values(given)[0]);
    case 'placement':
      return placementOf(question.key, given);
    case 'scale-jump':
      return String(given[question.key.split(':').at(-1) ?? ''] ?? '') || null;
    case 'year-end':
      return yearEndOf(given);
    default:
      return null;
  }
}

/** By the account number that the label begins with, or the whole label. */
function placementOf(key: string, given: Readonly<Record<string, string | number>>): string | null {
  const label = key.split(':').slice(2).join(':');
  const found = Object.entries(given).find(([name]) => label === name || label.startsWith(`${name} `));
  return found ? String(found[1]) : null;
}

/** 'MM-DD', and whether 'FY26' is the year that begins in 2026. */
function yearEndOf(given: Readonly<Record<string, string | number>>): string | null {
  const day = given['month-day'];
  if (day === undefined) return null;
  const begins = Object.entries(given).some(([label, date]) => {
    const named = /(\d{2})\D*$/.exec(label)?.[1];
    return (
      named !== undefined && label !== 'month-day' && Number(String(date).slice(2, 4)) === Number(named) + 1
    );
  });
  return begins ? `${day}:starts` : String(day);
}
