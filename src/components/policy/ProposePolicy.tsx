import { useState } from 'react';
import { newPolicyProposal, type PolicyView } from '../../contracts/policy.ts';
import { policySetting, type PolicyKey } from '../../core/policySettings.ts';
import type { FieldError } from '../../contracts/problem.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Field, TextArea } from '../ui/Field.tsx';
import { Panel } from '../ui/Panel.tsx';
import { useSending } from '../ui/useSending.ts';
import { inputText, inputUnit, inputValue } from './settingInput.ts';

interface ProposePolicyProps {
  readonly view: PolicyView;
  readonly onClose: () => void;
  readonly onDone: () => void;
}

type Texts = Readonly<Partial<Record<PolicyKey, string>>>;
type Faults = Readonly<Record<string, string>>;

/** Every value of the version confirmed last, to be changed from a day on, with a reason. */
export function ProposePolicy({ view, onClose, onDone }: ProposePolicyProps) {
  const [texts, setTexts] = useState<Texts>({});
  const [validFrom, setValidFrom] = useState(view.earliest);
  const [reason, setReason] = useState('');
  const [faults, setFaults] = useState<Faults>({});
  const sending = useSending<unknown>();
  const answered = { ...faults, ...faultsFromServer(sending.problem?.errors) };
  const propose = async () => {
    const read = readForm(view, { texts, validFrom, reason });
    setFaults(read.faults);
    sending.clear();
    if (!read.body) return;
    if ((await sending.submit('POST', '/policy/proposals', { body: read.body })) !== undefined) onDone();
  };
  return (
    <Panel title={`Propose a change of version ${view.latest}`}>
      <form
        className="grid gap-5"
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          void propose();
        }}
      >
        <p className="type-second">
          Change what is to change. A committee member who is somebody else confirms it; until then nothing
          changes.
        </p>
        <div className="policy-form">
          {view.values.map(({ key, latest, latestPrinted }) => (
            <Field
              key={key}
              label={policySetting(key).label}
              hint={`${latestPrinted} in version ${view.latest}; in ${inputUnit(key)}`}
              inputMode="decimal"
              autoComplete="off"
              value={texts[key] ?? inputText(key, latest)}
              error={answered[key]}
              onChange={(event) => setTexts({ ...texts, [key]: event.target.value })}
            />
          ))}
        </div>
        <Field
          label="Holds from"
          fieldClassName="max-w-[250px]"
          type="date"
          min={view.earliest}
          value={validFrom}
          error={answered['validFrom']}
          onChange={(event) => setValidFrom(event.target.value)}
        />
        <TextArea
          label="Reason"
          rows={3}
          value={reason}
          error={answered['reason']}
          onChange={(event) => setReason(event.target.value)}
        />
        {answered['values'] && (
          <p className="field-error" role="alert">
            <span aria-hidden="true">↑ </span>
            {answered['values']}
          </p>
        )}
        {sending.problem && <ErrorState problem={sending.problem} />}
        <div className="flex flex-wrap gap-3">
          <Button onClick={onClose}>Leave it</Button>
          <Button look="primary" type="submit" busy={sending.busy} busyLabel="Sending…">
            Propose the change
          </Button>
        </div>
      </form>
    </Panel>
  );
}

interface Form {
  readonly texts: Texts;
  readonly validFrom: string;
  readonly reason: string;
}

/** What is sent, or what is wrong with which field. Only values that differ are sent. */
function readForm(view: PolicyView, { texts, validFrom, reason }: Form) {
  const faults: Record<string, string> = {};
  const values: Partial<Record<PolicyKey, string>> = {};
  for (const { key, latest } of view.values) {
    const text = texts[key];
    if (text === undefined || text === inputText(key, latest)) continue;
    const read = inputValue(key, text);
    if (!read.ok) faults[key] = read.fault;
    else if (read.value !== latest) values[key] = read.value;
  }
  const body = { from: view.latest, validFrom, reason, values };
  const checked = newPolicyProposal.safeParse(body);
  for (const issue of checked.error?.issues ?? []) faults[String(issue.path[0])] ??= issue.message;
  if (Object.keys(faults).length === 0 && Object.keys(values).length === 0)
    faults['values'] = `Nothing differs from version ${view.latest}. Change a value first.`;
  return { faults, body: Object.keys(faults).length === 0 ? body : null };
}

const faultsFromServer = (errors: readonly FieldError[] | undefined): Faults =>
  Object.fromEntries(
    (errors ?? []).flatMap(({ field, message }) =>
      field ? [[field.replace(/^values\./, ''), message]] : [],
    ),
  );
