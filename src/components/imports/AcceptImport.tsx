import { useState } from 'react';
import { importAcceptance, type AcceptedImport, type ImportView } from '../../contracts/imports.ts';
import { STATEMENT_BASES, STATEMENT_SCOPES } from '../../core/statements/statement.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Panel } from '../ui/Panel.tsx';
import { RadioGroup } from '../ui/RadioGroup.tsx';
import { useSending } from '../ui/useSending.ts';

interface AcceptImportProps {
  readonly view: ImportView;
  readonly onChanged: () => void;
}

const SCOPE_WORDS = { group: 'the group', 'stand-alone': 'the company alone' } as const;

/** Accepting makes the figures count. It waits for every answer, and for what only a person knows of the file. */
export function AcceptImport({ view, onChanged }: AcceptImportProps) {
  const [basis, setBasis] = useState<string | null>(null);
  const [scope, setScope] = useState<string | null>(null);
  const [faults, setFaults] = useState<Readonly<Record<string, string>>>({});
  const sending = useSending<AcceptedImport>();
  const waits = view.openQuestions > 0;
  const accept = async () => {
    const command = importAcceptance.safeParse({ basis: basis ?? undefined, scope: scope ?? undefined });
    setFaults(
      command.success
        ? {}
        : Object.fromEntries(command.error.issues.map((issue) => [issue.path.join('.'), issue.message])),
    );
    if (!command.success || waits) return;
    const accepted = await sending.submit('POST', `/imports/${view.id}/acceptance`, {
      body: command.data,
      version: view.version,
    });
    if (accepted !== undefined) location.assign(`/borrowers/${view.borrowerId}`);
  };
  return (
    <Panel title="Accept">
      <div className="grid gap-4">
        <RadioGroup
          legend="These accounts are"
          name="basis"
          value={basis}
          onChange={setBasis}
          error={faults['basis']}
          options={STATEMENT_BASES.filter((each) => each !== 'forecast').map((each) => ({
            value: each,
            label: each,
          }))}
        />
        <RadioGroup
          legend="They are of"
          name="scope"
          value={scope}
          onChange={setScope}
          error={faults['scope']}
          options={STATEMENT_SCOPES.map((each) => ({ value: each, label: SCOPE_WORDS[each] }))}
        />
        {sending.problem && (
          <ErrorState problem={sending.problem} onRetry={onChanged} retryLabel="Look again" />
        )}
        <Button
          look="primary"
          aria-disabled={waits || undefined}
          busy={sending.busy}
          busyLabel="Accepting…"
          onClick={() => void accept()}
        >
          {view.periods === 1 ? 'Accept 1 period' : `Accept ${view.periods} periods`}
        </Button>
        {waits && (
          <p className="type-second">
            {view.openQuestions === 1 ? 'One question is open.' : `${view.openQuestions} questions are open.`}{' '}
            Answer first; the draft is kept.
          </p>
        )}
      </div>
    </Panel>
  );
}

/** Takes the import back: what was on file before it counts again. */
export function WithdrawImport({ view, onChanged }: AcceptImportProps) {
  const sending = useSending<unknown>();
  const [sure, setSure] = useState(false);
  if (view.state === 'withdrawn') return null;
  const withdraw = async () => {
    if (
      (await sending.submit('POST', `/imports/${view.id}/withdrawal`, { version: view.version })) !==
      undefined
    )
      onChanged();
  };
  return (
    <Panel label="Withdraw">
      {sending.problem && (
        <ErrorState problem={sending.problem} onRetry={onChanged} retryLabel="Look again" />
      )}
      {sure ? (
        <>
          <p>
            {view.state === 'accepted'
              ? 'Its figures stop counting and what was on file before them counts again.'
              : 'The draft and its answers are put aside.'}{' '}
            The file and all of this stay on record.
          </p>
          <div className="mt-3 flex gap-3">
            <Button onClick={() => setSure(false)}>Leave it</Button>
            <Button look="primary" busy={sending.busy} onClick={() => void withdraw()}>
              Withdraw this import
            </Button>
          </div>
        </>
      ) : (
        <Button look="quiet" onClick={() => setSure(true)}>
          Withdraw this import…
        </Button>
      )}
    </Panel>
  );
}
