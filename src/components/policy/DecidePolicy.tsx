import { useState } from 'react';
import { policyDecision, type PolicyProposalRow } from '../../contracts/policy.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { DecisionForm } from '../ui/DecisionForm.tsx';
import { Dialog } from '../ui/Dialog.tsx';
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
        <DecisionForm
          reason={text}
          fault={fault}
          onReason={setText}
          problem={sending.problem}
          busy={sending.busy}
          agreeLabel="Confirm"
          onAgree={() => void decide('confirm')}
          onDecline={() => void decide('decline')}
          onClose={onClose}
        />
      </div>
    </Dialog>
  );
}
