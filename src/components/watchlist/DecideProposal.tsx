import { dayText } from '../../core/calendar/printDay.ts';
import { useState } from 'react';
import { proposalDecision, type ProposalRow } from '../../contracts/watchlist.ts';
import { HUMAN_DECISION_REQUIRED } from '../../core/cautions.ts';
import { Button } from '../ui/Button.tsx';
import { Dialog, DialogActions } from '../ui/Dialog.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { TextArea } from '../ui/Field.tsx';
import { Caution } from '../ui/States.tsx';
import { useSending } from '../ui/useSending.ts';

interface DecideProposalProps {
  readonly proposal: ProposalRow;
  readonly onClose: () => void;
  readonly onDone: () => void;
}

/** The committee member's decision, with its reason. The server refuses whoever proposed. */
export function DecideProposal({ proposal, onClose, onDone }: DecideProposalProps) {
  const [text, setText] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const sending = useSending<unknown>();
  const decide = async (decision: 'approve' | 'decline') => {
    const checked = proposalDecision.safeParse({ decision, text });
    setFault(checked.success ? null : (checked.error.issues[0]?.message ?? null));
    if (!checked.success) return;
    if (
      (await sending.submit('POST', `/proposals/${proposal.id}/decision`, {
        body: checked.data,
        version: proposal.version,
      })) !== undefined
    )
      onDone();
  };
  return (
    <Dialog open title={`Decide: ${proposal.borrowerName}`} onClose={onClose}>
      <div className="grid gap-4">
        <p>
          {proposal.proposedBy} proposes {proposal.grade}. {proposal.reason}
        </p>
        <p>
          <span className="type-name">Plan: </span>
          {proposal.plan} (owner {proposal.ownerName}, next review {dayText(proposal.nextReviewOn)})
        </p>
        <p>
          <a href={`/borrowers/${proposal.borrowerId}/review-sheet`}>
            Review sheet of {proposal.borrowerName}
          </a>
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
            onClick={() => void decide('approve')}
          >
            Approve
          </Button>
        </DialogActions>
      </div>
    </Dialog>
  );
}
