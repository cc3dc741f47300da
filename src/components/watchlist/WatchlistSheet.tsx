import { dayText } from '../../core/calendar/printDay.ts';
import { useQuery } from '@tanstack/react-query';
import { WATCHLIST_GRADES, type WatchlistRow, type WatchlistView } from '../../contracts/watchlist.ts';
import { FoldedMethodLinks } from '../marks/MethodLink.tsx';
import { Refusal, getOrThrow } from '../ui/api.ts';
import { ErrorState } from '../ui/ErrorState.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { Panel } from '../ui/Panel.tsx';
import { EmptyState } from '../ui/States.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { Proposals } from './Proposals.tsx';

interface WatchlistSheetProps {
  readonly first: WatchlistView;
  readonly personId: number;
  /** The person's role decides proposals. */
  readonly decides: boolean;
}

/** What waits for a decision, then what stands on the watchlist. */
export function WatchlistSheet(props: WatchlistSheetProps) {
  return (
    <IslandQueries>
      <Watchlist {...props} />
    </IslandQueries>
  );
}

function Watchlist({ first, personId, decides }: WatchlistSheetProps) {
  const watchlist = useQuery({
    queryKey: ['watchlist'],
    queryFn: ({ signal }) => getOrThrow<WatchlistView>('/watchlist', signal),
    initialData: first,
  });
  return (
    <div className="stack">
      {watchlist.error instanceof Refusal && (
        <ErrorState problem={watchlist.error.problem} onRetry={() => void watchlist.refetch()} />
      )}
      <Proposals
        proposals={watchlist.data.proposals}
        personId={personId}
        decides={decides}
        onChanged={() => void watchlist.refetch()}
      />
      <Panel
        flush
        title="On the watchlist"
        aside={<span className="type-second">{counted(watchlist.data.entries.length, 'borrower')}</span>}
      >
        <Entries entries={watchlist.data.entries} />
      </Panel>
    </div>
  );
}

const counted = (count: number, what: string): string => `${count} ${what}${count === 1 ? '' : 's'}`;

const meaningOf = (code: string): string =>
  WATCHLIST_GRADES.find((grade) => grade.code === code)?.meaning ?? '';

function Entries({ entries }: { readonly entries: readonly WatchlistRow[] }) {
  if (entries.length === 0)
    return (
      <EmptyState title="Nobody is on the watchlist">
        A borrower comes here when a proposal is approved. Propose one from its page or from an alert.
      </EmptyState>
    );
  return (
    <>
      <Table caption="Borrowers on the watchlist, gravest grade first" entries>
        <TableHead>
          <tr role="row">
            <HeadCell>Borrower</HeadCell>
            <HeadCell method="watchlist">Grade</HeadCell>
            <HeadCell>Plan</HeadCell>
            <HeadCell>Owner</HeadCell>
            <HeadCell>Next review</HeadCell>
            <HeadCell>Since</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {entries.map((entry) => (
            <Row key={entry.id}>
              <NameCell
                name={entry.borrowerName}
                href={`/borrowers/${entry.borrowerId}`}
                beside={entry.deskName}
                second={entry.reason}
                keepSecond
              />
              <Cell entry="figure" nowrap>
                <span className="type-name">{entry.grade}</span> {meaningOf(entry.grade)}
                {entry.state === 'probation' && (
                  <span className="type-second type-small block">on probation</span>
                )}
              </Cell>
              <Cell>{entry.plan}</Cell>
              <Cell nowrap>{entry.ownerName}</Cell>
              <Cell nowrap entry="extra">
                {dayText(entry.nextReviewOn)}
                {entry.reviewOverdue && <span className="type-name block">overdue</span>}
              </Cell>
              <Cell nowrap>
                {dayText(entry.enteredOn)}
                <span className="type-second type-small block">
                  proposed by {entry.proposedBy}, decided by {entry.decidedBy}
                </span>
              </Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      <FoldedMethodLinks topics={['watchlist']} />
    </>
  );
}
