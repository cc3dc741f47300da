/** Collects what is asked and what is remarked while a file is read. An answer counts only where it is one offered. */
import type { CellRef, Question, QuestionKind, ReadNote } from '#core/statements/workbookReading.ts';

export interface Asked {
  readonly key: string;
  readonly kind: QuestionKind;
  readonly holdsFor: Question['holdsFor'];
  readonly text: string;
  readonly where: readonly CellRef[];
  readonly options: Question['options'];
  /** Answers beyond the options, such as a line for each column. */
  readonly accepts?: (answer: string) => boolean;
}

export class Asking {
  private readonly answers: ReadonlyMap<string, string>;
  private readonly asked = new Map<string, Question>();
  private readonly remarks = new Map<string, ReadNote>();

  constructor(answers: Readonly<Record<string, string>>) {
    this.answers = new Map(Object.entries(answers));
  }

  /** The answer, or null while the question is open. Asking twice under one key is one question. */
  ask({ accepts, ...question }: Asked): string | null {
    const before = this.asked.get(question.key);
    if (before) return before.answer;
    const given = this.answers.get(question.key) ?? null;
    const counts =
      given !== null && (question.options.some(({ value }) => value === given) || accepts?.(given) === true);
    const answer = counts ? given : null;
    this.asked.set(question.key, { ...question, answer });
    return answer;
  }

  /** An answer given earlier to a question that is not asked again, such as the line of a label. */
  answerTo(key: string): string | null {
    return this.answers.get(key) ?? null;
  }

  /** One remark of a kind and place is enough. */
  note(code: string, text: string, where: CellRef | null = null): void {
    const key = `${code}:${where?.sheet ?? ''}`;
    if (!this.remarks.has(key)) this.remarks.set(key, { code, text, where });
  }

  isOpen(key: string): boolean {
    return this.asked.get(key)?.answer === null;
  }

  get questions(): readonly Question[] {
    return [...this.asked.values()];
  }

  get notes(): readonly ReadNote[] {
    return [...this.remarks.values()];
  }
}
