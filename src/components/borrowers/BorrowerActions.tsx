import { useState } from 'react';
import type { WatchlistChange } from '../../contracts/watchlist.ts';
import { Button, LinkButton } from '../ui/Button.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { ProposeForWatchlist } from '../watchlist/ProposeForWatchlist.tsx';

interface BorrowerActionsProps {
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly mayImport: boolean;
  readonly mayPropose: boolean;
  readonly onWatchlist: boolean;
  readonly proposalWaiting: boolean;
}

/** What the person may begin from a borrower's page. */
export function BorrowerActions({
  borrowerId,
  borrowerName,
  mayImport,
  mayPropose,
  onWatchlist,
  proposalWaiting,
}: BorrowerActionsProps) {
  const [change, setChange] = useState<WatchlistChange | null>(null);
  if (proposalWaiting)
    return (
      <>
        <a href="/watchlist">A watchlist proposal waits for a decision</a>
        {mayImport && <LinkButton href={`/imports?borrower=${borrowerId}`}>Import figures</LinkButton>}
      </>
    );
  return (
    <IslandQueries>
      {mayImport && <LinkButton href={`/imports?borrower=${borrowerId}`}>Import figures</LinkButton>}
      {mayPropose && !onWatchlist && (
        <Button onClick={() => setChange('entry')}>Propose for watchlist</Button>
      )}
      {mayPropose && onWatchlist && (
        <Button onClick={() => setChange('grade')}>Propose a change of grade</Button>
      )}
      {mayPropose && onWatchlist && (
        <Button onClick={() => setChange('exit')}>Propose to leave the watchlist</Button>
      )}
      {change && (
        <ProposeForWatchlist
          borrowerId={borrowerId}
          borrowerName={borrowerName}
          alertId={null}
          change={change}
          onClose={() => setChange(null)}
          onDone={() => location.reload()}
        />
      )}
    </IslandQueries>
  );
}
