import { dayText } from '../../core/calendar/printDay.ts';
import { useState, type ReactNode } from 'react';
import { WATCHLIST_GRADES, type ProposalRow } from '../../contracts/watchlist.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Panel } from '../ui/Panel.tsx';
import { EmptyState } from '../ui/States.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { useSending } from '../ui/useSending.ts';
import { DecideProposal } from './DecideProposal.tsx';

interface ProposalsProps {
  readonly proposals: readonly ProposalRow[];
  readonly personId: number;
  readonly decides: boolean;
  readonly onChanged: () => void;
}

const CHANGES = {
  entry: 'enter the watchlist',
  grade: 'change grade',
  exit: 'leave the watchlist, first on probation',
} as const;

/** Proposals that wait, then the latest decided ones. Whoever proposed sees that another person decides. */
export function Proposals({ proposals, personId, decides, onChanged }: ProposalsProps) {
  const [deciding, setDeciding] = useState<ProposalRow | null>(null);
  const withdrawing = useSending<unknown>();
  const waiting = proposals.filter((proposal) => proposal.state === 'proposed');
  const decided = proposals.filter((proposal) => proposal.state !== 'proposed');
  const withdraw = async (proposal: ProposalRow) => {
    if (
      (await withdrawing.submit('POST', `/proposals/${proposal.id}/withdrawal`, {
        version: proposal.version,
      })) !== undefined
    )
      onChanged();
  };
  const act = (proposal: ProposalRow) => {
    if (proposal.proposedById === personId)
      return (
        <>
          <span className="type-second type-small block">
            {decides ? 'You proposed this; another member decides.' : 'A committee member decides.'}
          </span>
          <Button small look="quiet" busy={withdrawing.busy} onClick={() => void withdraw(proposal)}>
            Withdraw
          </Button>
        </>
      );
    return decides ? (
      <Button small look="primary" onClick={() => setDeciding(proposal)}>
        Decide
      </Button>
    ) : (
      <span className="type-second">waits for a decision</span>
    );
  };
  return (
    <>
      <Panel flush title="Proposed" aside={<span className="type-second">{waiting.length} to decide</span>}>
        {withdrawing.problem && <ErrorState problem={withdrawing.problem} />}
        {waiting.length === 0 ? (
          <EmptyState title="No proposal waits for a decision" />
        ) : (
          <ProposalTable proposals={waiting} last="Decision" cell={act} />
        )}
      </Panel>
      {decided.length > 0 && (
        <details>
          <summary className="cursor-pointer">Decided proposals ({decided.length})</summary>
          <Panel flush label="Decided proposals" className="mt-3">
            <ProposalTable
              proposals={decided}
              last="Decided"
              cell={(proposal) => (
                <>
                  {proposal.state}
                  {proposal.decidedBy &&
                    ` by ${proposal.decidedBy}, ${proposal.decidedAt ? dayText(proposal.decidedAt.slice(0, 10)) : ''}`}
                  {proposal.decisionText && (
                    <span className="type-second type-small block">{proposal.decisionText}</span>
                  )}
                </>
              )}
            />
          </Panel>
        </details>
      )}
      {deciding && (
        <DecideProposal
          proposal={deciding}
          onClose={() => setDeciding(null)}
          onDone={() => {
            setDeciding(null);
            onChanged();
          }}
        />
      )}
    </>
  );
}

interface ProposalTableProps {
  readonly proposals: readonly ProposalRow[];
  readonly last: string;
  readonly cell: (proposal: ProposalRow) => ReactNode;
}

function ProposalTable({ proposals, last, cell }: ProposalTableProps) {
  return (
    <Table caption={`Watchlist proposals, ${last.toLowerCase()}`} entries>
      <TableHead>
        <tr role="row">
          <HeadCell>Borrower</HeadCell>
          <HeadCell>Proposal</HeadCell>
          <HeadCell>Plan</HeadCell>
          <HeadCell>Proposed by</HeadCell>
          <HeadCell>{last}</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {proposals.map((proposal) => (
          <Row key={proposal.id}>
            <NameCell
              name={proposal.borrowerName}
              href={`/borrowers/${proposal.borrowerId}`}
              beside={proposal.deskName}
              second={proposal.reason}
              keepSecond
            />
            <Cell>
              {CHANGES[proposal.change]} at <span className="type-name">{proposal.grade}</span> (
              {WATCHLIST_GRADES.find((grade) => grade.code === proposal.grade)?.meaning}), next review{' '}
              {proposal.nextReviewOn}
              {proposal.alertId !== null && (
                <span className="type-small block">
                  <a href={`/alerts/${proposal.alertId}`}>The alert it came from</a>
                </span>
              )}
            </Cell>
            <Cell>
              {proposal.plan}
              <span className="type-second type-small block">owner {proposal.ownerName}</span>
            </Cell>
            <Cell nowrap>
              {proposal.proposedBy}
              <span className="type-second type-small block">
                {dayText(proposal.proposedAt.slice(0, 10))}
              </span>
            </Cell>
            <Cell entry="extra">{cell(proposal)}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
