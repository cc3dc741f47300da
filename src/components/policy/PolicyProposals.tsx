import { useState } from 'react';
import type { PolicyProposalRow, PolicyView } from '../../contracts/policy.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { instantText } from '../runs/runWords.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Panel } from '../ui/Panel.tsx';
import { EmptyState } from '../ui/States.tsx';
import { useSending } from '../ui/useSending.ts';
import { ChangesTable } from './ChangesTable.tsx';
import { DecidePolicy } from './DecidePolicy.tsx';

interface PolicyProposalsProps {
  readonly view: PolicyView;
  readonly personId: number;
  readonly onChanged: (what: string) => void;
}

const STATES = {
  proposed: 'Proposed',
  approved: 'Confirmed',
  declined: 'Declined',
  withdrawn: 'Withdrawn',
} as const;

/** The change that waits for a second person, then those that were decided. */
export function PolicyProposals({ view, personId, onChanged }: PolicyProposalsProps) {
  const waiting = view.proposals.find(({ state }) => state === 'proposed');
  const decided = view.proposals.filter(({ state }) => state !== 'proposed');
  return (
    <>
      {waiting ? (
        <WaitingProposal
          key={waiting.id}
          proposal={waiting}
          view={view}
          personId={personId}
          onChanged={onChanged}
        />
      ) : (
        <Panel flush label="Proposed change">
          <EmptyState title="No change waits for a decision">
            An administrator proposes a change; a committee member who is somebody else confirms it.
          </EmptyState>
        </Panel>
      )}
      {decided.length > 0 && (
        <details>
          <summary className="cursor-pointer">Decided changes ({decided.length})</summary>
          <ul className="sentences mt-3">
            {decided.map((proposal) => (
              <li key={proposal.id}>
                <span className="type-name">{STATES[proposal.state]}</span>
                {proposal.decidedBy &&
                  ` by ${proposal.decidedBy}${proposal.decidedAt ? `, ${instantText(proposal.decidedAt, view.zone)}` : ''}`}
                : {changesText(proposal)}. Proposed by {proposal.proposedBy}, to hold from{' '}
                {dayText(proposal.validFrom)}: {proposal.reason}
                {proposal.decisionText && (
                  <span className="type-second type-small block">{proposal.decisionText}</span>
                )}
              </li>
            ))}
          </ul>
        </details>
      )}
    </>
  );
}

const changesText = ({ changes }: PolicyProposalRow): string =>
  changes.map(({ label, before, after }) => `${label} ${before} → ${after}`).join('; ');

interface WaitingProposalProps extends PolicyProposalsProps {
  readonly proposal: PolicyProposalRow;
}

function WaitingProposal({ proposal, view, personId, onChanged }: WaitingProposalProps) {
  const [deciding, setDeciding] = useState(false);
  const withdrawing = useSending<unknown>();
  const isOwn = proposal.proposedById === personId;
  const withdraw = async () => {
    const path = `/policy/proposals/${proposal.id}/withdrawal`;
    if ((await withdrawing.submit('POST', path, { version: proposal.version })) !== undefined)
      onChanged('Change withdrawn');
  };
  return (
    <Panel title="Proposed change" aside={<span className="type-second">waits for a second person</span>}>
      <div className="grid gap-4">
        <p>
          {proposal.proposedBy} proposes, {instantText(proposal.proposedAt, view.zone)}, from{' '}
          <span className="type-name">{dayText(proposal.validFrom)}</span> on: {proposal.reason}
        </p>
        <ChangesTable
          caption={`Values that change, against version ${proposal.from}`}
          changes={proposal.changes}
        />
        {withdrawing.problem && <ErrorState problem={withdrawing.problem} />}
        <div className="flex flex-wrap items-center gap-3">
          {isOwn && (
            <>
              <span className="type-second">
                You proposed this; a committee member who is somebody else decides it.
              </span>
              <Button look="quiet" busy={withdrawing.busy} onClick={() => void withdraw()}>
                Withdraw
              </Button>
            </>
          )}
          {!isOwn && view.mayConfirm && (
            <Button look="primary" onClick={() => setDeciding(true)}>
              Decide
            </Button>
          )}
          {!isOwn && !view.mayConfirm && <span className="type-second">A committee member decides.</span>}
        </div>
      </div>
      {deciding && (
        <DecidePolicy
          proposal={proposal}
          onClose={() => setDeciding(false)}
          onDone={(what) => {
            setDeciding(false);
            onChanged(what);
          }}
        />
      )}
    </Panel>
  );
}
