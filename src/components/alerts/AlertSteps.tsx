import { useState } from 'react';
import type { AlertDetail } from '../../contracts/alerts.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { useSending } from '../ui/useSending.ts';
import { ProposeForWatchlist } from '../watchlist/ProposeForWatchlist.tsx';
import { StepDialog, type DialogStep } from './StepDialog.tsx';

interface AlertStepsProps {
  readonly alert: AlertDetail;
  readonly onChanged: () => void;
}

/** Only buttons that work: the server said which steps this person may take, and decides again on each. */
export function AlertSteps({ alert, onChanged }: AlertStepsProps) {
  const [step, setStep] = useState<DialogStep | null>(null);
  const [proposing, setProposing] = useState(false);
  const taking = useSending<unknown>();
  const { steps } = alert;
  const take = async () => {
    const done = await taking.submit('POST', `/alerts/${alert.id}/steps`, {
      body: { step: 'take' },
      version: alert.version,
    });
    if (done !== undefined) onChanged();
  };
  const offer = (name: DialogStep, label: string) => <Button onClick={() => setStep(name)}>{label}</Button>;
  return (
    <div className="my-4">
      <div className="button-grid">
        {steps.take && (
          <Button look="primary" busy={taking.busy} busyLabel="Taking…" onClick={() => void take()}>
            Take it
          </Button>
        )}
        {steps.work &&
          alert.state !== 'waiting for borrower' &&
          offer('wait for borrower', 'Waiting for borrower')}
        {steps.work &&
          alert.state !== 'waiting for analyst' &&
          offer('wait for analyst', 'Waiting for analyst')}
        {steps.work && alert.state !== 'assessed' && offer('assess', 'Assessed')}
        {steps.putOff && alert.state !== 'put off' && offer('put off', 'Put off')}
        {steps.handOver && offer('hand over', 'Hand over to the owner')}
        {steps.confirmClosing && offer('confirm closing', 'Confirm the closing')}
        {steps.propose && <Button onClick={() => setProposing(true)}>Propose for watchlist</Button>}
        {steps.close && offer('close', 'Close with reason')}
      </div>
      {alert.onWatchlist && <p className="type-second mt-2">On the watchlist.</p>}
      {alert.proposalWaiting && (
        <p className="type-second mt-2">A watchlist proposal waits for a decision.</p>
      )}
      {taking.problem && <ErrorState problem={taking.problem} onRetry={() => void take()} />}
      {step && (
        <StepDialog
          alert={alert}
          step={step}
          onClose={() => setStep(null)}
          onDone={() => {
            setStep(null);
            onChanged();
          }}
        />
      )}
      {proposing && (
        <ProposeForWatchlist
          borrowerId={alert.borrowerId}
          borrowerName={alert.borrowerName}
          alertId={alert.id}
          onClose={() => setProposing(false)}
          onDone={() => {
            setProposing(false);
            onChanged();
          }}
        />
      )}
    </div>
  );
}
