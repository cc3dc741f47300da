import { useState } from 'react';
import type { AlertDetail } from '../../contracts/alerts.ts';
import { CLOSING_REASONS } from '../../core/alerts/alert.ts';
import { Button } from '../ui/Button.tsx';
import { Dialog, DialogActions } from '../ui/Dialog.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Field, Select, TextArea } from '../ui/Field.tsx';
import { useSending } from '../ui/useSending.ts';

/** Steps that ask for a text, with what their dialog says and which route takes them. */
const STEPS = {
  'wait for borrower': {
    title: 'Waiting for borrower',
    label: 'What was asked, of whom',
    action: 'Set to waiting',
  },
  'wait for analyst': {
    title: 'Waiting for analyst',
    label: 'What the analyst should find out',
    action: 'Set to waiting',
  },
  assess: { title: 'Assessed', label: 'Your assessment', action: 'Record the assessment' },
  'put off': { title: 'Put off', label: 'Why it can wait', action: 'Put off' },
  'hand over': { title: 'Hand over to the owner', label: 'What you found', action: 'Hand over' },
  'confirm closing': { title: 'Confirm the closing', label: 'What you looked at', action: 'Confirm' },
  close: { title: 'Close with reason', label: 'What was seen', action: 'Close' },
} as const;
export type DialogStep = keyof typeof STEPS;

interface StepDialogProps {
  readonly alert: AlertDetail;
  readonly step: DialogStep;
  readonly onClose: () => void;
  readonly onDone: () => void;
}

export function StepDialog({ alert, step, onClose, onDone }: StepDialogProps) {
  const { title, label, action } = STEPS[step];
  const [text, setText] = useState('');
  const [until, setUntil] = useState('');
  const [reason, setReason] = useState('');
  const sending = useSending<unknown>();
  const errorOf = (field: string) => sending.problem?.errors?.find((error) => error.field === field)?.message;
  const submit = async (confirm = true) => {
    const { path, body } = requestOf(alert.id, step, { text, until, reason, confirm });
    if ((await sending.submit('POST', path, { body, version: alert.version })) !== undefined) onDone();
  };
  return (
    <Dialog open title={`${title}: ${alert.borrowerName}`} onClose={onClose}>
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          void submit();
        }}
      >
        {step === 'close' && (
          <Select
            label="Reason"
            placeholder="Choose a reason"
            required
            value={reason}
            error={errorOf('reason')}
            hint={alert.severity === 'urgent' ? 'Urgent: a second person confirms the closing.' : undefined}
            options={CLOSING_REASONS.map((listed) => ({
              value: String(listed.code),
              label: `${listed.code}. ${listed.label}${listed.secondPerson ? ' (a second person confirms)' : ''}`,
            }))}
            onChange={(event) => setReason(event.target.value)}
          />
        )}
        {step === 'put off' && (
          <Field
            label="Until"
            type="date"
            required
            value={until}
            error={errorOf('until')}
            onChange={(event) => setUntil(event.target.value)}
          />
        )}
        {step === 'confirm closing' && alert.closing && (
          <p>
            {alert.closing.by} asked to close this: {alert.closing.reason}. {alert.closing.text}
          </p>
        )}
        <TextArea
          label={label}
          required
          rows={4}
          value={text}
          error={errorOf('text')}
          onChange={(event) => setText(event.target.value)}
        />
        {sending.problem && <ErrorState problem={sending.problem} />}
        <DialogActions>
          <Button onClick={onClose}>Leave it</Button>
          {step === 'confirm closing' && <Button onClick={() => void submit(false)}>Do not close</Button>}
          <Button type="submit" look="primary" busy={sending.busy} busyLabel="Sending…">
            {action}
          </Button>
        </DialogActions>
      </form>
    </Dialog>
  );
}

interface Filled {
  readonly text: string;
  readonly until: string;
  readonly reason: string;
  readonly confirm: boolean;
}

function requestOf(
  id: number,
  step: DialogStep,
  { text, until, reason, confirm }: Filled,
): { path: string; body: unknown } {
  const steps = `/alerts/${id}/steps`;
  switch (step) {
    case 'wait for borrower':
      return { path: steps, body: { step: 'wait', waitFor: 'borrower', text } };
    case 'wait for analyst':
      return { path: steps, body: { step: 'wait', waitFor: 'analyst', text } };
    case 'assess':
      return { path: steps, body: { step: 'assess', text } };
    case 'put off':
      return { path: steps, body: { step: 'put off', until, text } };
    case 'close':
      return { path: steps, body: { step: 'close', reason: Number(reason), text } };
    case 'hand over':
      return { path: `/alerts/${id}/handing-over`, body: { text } };
    case 'confirm closing':
      return { path: `/alerts/${id}/closing`, body: { confirm, text } };
  }
}
