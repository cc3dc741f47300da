import type { ProblemBody } from '../../contracts/problem.ts';
import { HUMAN_DECISION_REQUIRED } from '../../core/cautions.ts';
import { Button } from './Button.tsx';
import { DialogActions } from './Dialog.tsx';
import { ErrorState } from './ErrorState.tsx';
import { TextArea } from './Field.tsx';
import { Caution } from './States.tsx';

interface DecisionFormProps {
  readonly reason: string;
  readonly fault: string | null;
  readonly onReason: (reason: string) => void;
  readonly problem: ProblemBody | null;
  readonly busy: boolean;
  /** "Approve", "Confirm" */
  readonly agreeLabel: string;
  readonly onAgree: () => void;
  readonly onDecline: () => void;
  readonly onClose: () => void;
}

/** The foot of a decision: its reason, the caution, and both ways to decide. */
export function DecisionForm(form: DecisionFormProps) {
  return (
    <>
      <TextArea
        label="Reason for the decision"
        rows={3}
        value={form.reason}
        error={form.fault}
        onChange={(event) => form.onReason(event.target.value)}
      />
      {form.problem && <ErrorState problem={form.problem} />}
      <Caution>{HUMAN_DECISION_REQUIRED}</Caution>
      <DialogActions>
        <Button onClick={form.onClose}>Leave it</Button>
        <Button busy={form.busy} onClick={form.onDecline}>
          Decline
        </Button>
        <Button look="primary" busy={form.busy} busyLabel="Sending…" onClick={form.onAgree}>
          {form.agreeLabel}
        </Button>
      </DialogActions>
    </>
  );
}
