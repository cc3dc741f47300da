import { useState } from 'react';
import { policyDecision, type PolicyProposalRow } from '../../contracts/policy.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { HUMAN_DECISION_REQUIRED } from '../../core/cautions.ts';
import { Button } from '../ui/Button.tsx';
import { Dialog, DialogActions } from '../ui/Dialog.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { TextArea } from '../ui/Field.tsx';
import { Caution } from '../ui/States.tsx';
import { useSending } from '../ui/useSending.ts';
import { ChangesTable } from './ChangesTable.tsx';

interface DecidePolicyProps {
  readonly proposal: PolicyProposalRow;
  readonly onClose: () => void;
  readonly onDone: (what: string) => void;
}

/** The second person's decision, with its reason. The server refuses whoever proposed. */
export function DecidePolicy({ proposal, onClose, onDone }: DecidePolicyProps) {
  const [text, setText] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const sending = useSending<unknown>();
  const decide = async (decision: 'confirm' | 'decline') => {
    const checked = policyDecision.safeParse({ decision, text });
    setFault(checked.success ? null : (checked.error.issues[0]?.message ?? null));
    if (!checked.success) return;
    const path = `/policy/proposals/${proposal.id}/decision`;
    const sent = await sending.submit('POST', path, { body: checked.data, version: proposal.version });
    if (sent !== undefined) onDone(decision === 'confirm' ? 'Change confirmed' : 'Change declined');
  };
  return (
    <Dialog open title="Decide on the change of the policy" onClose={onClose}>
      <div className="grid gap-4">
        <p>
          {proposal.proposedBy} proposes, from {dayText(proposal.validFrom)} on: {proposal.reason}
        </p>
        <ChangesTable caption="Values that change" changes={proposal.changes} />
        <p>
          Confirmed, it is the next version. Nights and assessments of that day and later use it; what was
          computed before stays as it is.
        </p>
        <TextArea
          label="Reason for the decision"
          rows={3}
          value={text}
          error={fault}
          onChange={(event) => setText(event.target.value)}
        />
        {sending.problem && <ErrorState problem={sending.problem} />}
        <Caution>{HUMAN_DECISION_REQUIRED}</Caution>
        <DialogActions>
          <Button onClick={onClose}>Leave it</Button>
          <Button busy={sending.busy} onClick={() => void decide('decline')}>
            Decline
          </Button>
          <Button
            look="primary"
            busy={sending.busy}
            busyLabel="Sending…"
            onClick={() => void decide('confirm')}
          >
            Confirm
          </Button>
        </DialogActions>
      </div>
    </Dialog>
  );
}
