import { dayText } from '../../core/calendar/printDay.ts';
import { useState } from 'react';
import type { ImportView } from '../../contracts/imports.ts';
import type { CellRef, Question } from '../../contracts/reading.ts';
import { isPlainDate } from '../../core/calendar/plainDate.ts';
import { LINE_ITEMS } from '../../core/statements/lineItems.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Field, Select } from '../ui/Field.tsx';
import { Panel } from '../ui/Panel.tsx';
import { useSending } from '../ui/useSending.ts';

interface QuestionsProps {
  readonly view: ImportView;
  readonly onShow: (at: CellRef) => void;
  readonly onChanged: () => void;
}

/** The few things that the file cannot say itself, answered by a click; nothing is preselected. */
export function Questions({ view, onShow, onChanged }: QuestionsProps) {
  const answering = useSending<{ id: number; version: number }>();
  const { questions } = view.reading;
  const open = questions.filter((question) => question.answer === null);
  const editable = view.mayEdit && view.state === 'draft';
  const answer = async (question: Question, value: string | null) => {
    const sent = await answering.submit('POST', `/imports/${view.id}/answers`, {
      body: { questionKey: question.key, answer: value },
      version: view.version,
    });
    if (sent !== undefined) onChanged();
  };
  if (questions.length === 0)
    return (
      <Panel title="Questions">
        <p className="type-second">None: the file says everything itself.</p>
      </Panel>
    );
  return (
    <Panel
      title={
        open.length === 0
          ? 'All questions answered'
          : open.length === 1
            ? 'One question'
            : `${open.length} questions`
      }
    >
      {answering.problem && (
        <ErrorState problem={answering.problem} onRetry={onChanged} retryLabel="Look again" />
      )}
      <ul className="questions">
        {questions.map((question) => (
          <li key={question.key} className={question.answer === null ? 'question question-open' : 'question'}>
            <p>{question.text}</p>
            {question.where[0] && (
              <p className="type-small">
                {question.where.slice(0, 3).map((at) => (
                  <button
                    key={`${at.sheet}!${at.cell}`}
                    type="button"
                    className="link-button"
                    onClick={() => onShow(at)}
                  >
                    {at.sheet}!{at.cell}
                  </button>
                ))}
              </p>
            )}
            {question.answer === null ? (
              editable && (
                <Answers
                  question={question}
                  busy={answering.busy}
                  onAnswer={(value) => void answer(question, value)}
                />
              )
            ) : (
              <Given
                view={view}
                question={question}
                editable={editable}
                onUndo={() => void answer(question, null)}
              />
            )}
          </li>
        ))}
      </ul>
    </Panel>
  );
}

interface AnswersProps {
  readonly question: Question;
  readonly busy: boolean;
  readonly onAnswer: (value: string) => void;
}

function Answers({ question, busy, onAnswer }: AnswersProps) {
  return (
    <div className="answers">
      {question.options.map((option) => (
        <Button key={option.value} small busy={busy} onClick={() => onAnswer(option.value)}>
          {option.label}
        </Button>
      ))}
      {question.options.length === 0 && <PeriodAnswer busy={busy} onAnswer={onAnswer} />}
      {question.kind === 'placement' && (
        <select
          className="input"
          aria-label="Another line"
          value=""
          onChange={(event) => event.target.value !== '' && onAnswer(event.target.value)}
        >
          <option value="">Another line…</option>
          {LINE_ITEMS.map((item) => (
            <option key={item.code} value={item.code}>
              {item.label}
            </option>
          ))}
        </select>
      )}
    </div>
  );
}

/** A table that names no period: its last day and its length, said by whoever knows the file. */
function PeriodAnswer({ busy, onAnswer }: Omit<AnswersProps, 'question'>) {
  const [end, setEnd] = useState('');
  const [months, setMonths] = useState('');
  const isWhole = isPlainDate(end) && months !== '';
  return (
    <>
      <Field
        label="Period ends on"
        type="date"
        value={end}
        onChange={(event) => setEnd(event.target.value)}
      />
      <Select
        label="and covers"
        placeholder="Choose a length"
        value={months}
        options={[
          { value: '0', label: 'that day (a balance sheet)' },
          { value: '3', label: '3 months' },
          { value: '6', label: '6 months' },
          { value: '9', label: '9 months' },
          { value: '12', label: '12 months' },
        ]}
        onChange={(event) => setMonths(event.target.value)}
      />
      <Button
        small
        busy={busy}
        aria-disabled={!isWhole || undefined}
        onClick={() => isWhole && onAnswer(`${end}/${months}`)}
      >
        Answer
      </Button>
    </>
  );
}

function Given({
  view,
  question,
  editable,
  onUndo,
}: {
  readonly view: ImportView;
  readonly question: Question;
  readonly editable: boolean;
  readonly onUndo: () => void;
}) {
  const given = view.answers.find((answer) => answer.questionKey === question.key);
  const label = question.options.find((option) => option.value === question.answer)?.label ?? question.answer;
  return (
    <p>
      <span className="type-name">{label}</span>
      {given && (
        <span className="type-second">
          , {given.by}, {dayText(given.at.slice(0, 10))}
        </span>
      )}
      {editable && (
        <>
          {' '}
          <button type="button" className="link-button" onClick={onUndo}>
            Take back
          </button>
        </>
      )}
    </p>
  );
}
