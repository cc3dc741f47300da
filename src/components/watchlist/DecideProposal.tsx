import { dayText } from '../../core/calendar/printDay.ts';
import { useState } from 'react';
import { proposalDecision, type ProposalRow } from '../../contracts/watchlist.ts';
import { DecisionForm } from '../ui/DecisionForm.tsx';
import { Dialog } from '../ui/Dialog.tsx';
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
        <DecisionForm
          reason={text}
          fault={fault}
          onReason={setText}
          problem={sending.problem}
          busy={sending.busy}
          agreeLabel="Approve"
          onAgree={() => void decide('approve')}
          onDecline={() => void decide('decline')}
          onClose={onClose}
        />
      </div>
    </Dialog>
  );
}
