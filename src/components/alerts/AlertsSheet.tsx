import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { AlertQuery, AlertRow } from '../../contracts/alerts.ts';
import type { Page } from '../../contracts/paging.ts';
import { Refusal, getOrThrow } from '../ui/api.ts';
import { ErrorState } from '../ui/ErrorState.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { Panel } from '../ui/Panel.tsx';
import { LiveRegion } from '../ui/States.tsx';
import { AlertEvidence } from './AlertEvidence.tsx';
import { AlertFilters, type SectorChoice } from './AlertFilters.tsx';
import { AlertsTable } from './AlertsTable.tsx';
import { alertSearch, readAlertView } from './alertView.ts';

interface AlertsSheetProps {
  readonly query: AlertQuery;
  readonly first: Page<AlertRow>;
  readonly today: string;
  readonly sectors: readonly SectorChoice[];
  /** The signed-in person works own borrowers: the view "My borrowers" stands first. */
  readonly ownsBorrowers: boolean;
}

/** The alerts table with its filters, and the evidence of the alert that is selected. */
export function AlertsSheet(props: AlertsSheetProps) {
  return (
    <IslandQueries>
      <Alerts {...props} />
    </IslandQueries>
  );
}

function Alerts({ query: firstQuery, first, today, sectors, ownsBorrowers }: AlertsSheetProps) {
  const [query, setQuery] = useState(firstQuery);
  const [selected, setSelected] = useState<number | null>(null);
  const search = alertSearch(query);
  const alerts = useQuery({
    queryKey: ['alerts', search],
    queryFn: ({ signal }) => getOrThrow<Page<AlertRow>>(`/alerts${search}`, signal),
    placeholderData: keepPreviousData,
    ...(query === firstQuery && { initialData: first }),
  });

  useEffect(() => {
    const back = () => setQuery(readAlertView(new URLSearchParams(location.search)).query);
    addEventListener('popstate', back);
    return () => removeEventListener('popstate', back);
  }, []);

  const show = (next: AlertQuery) => {
    history.pushState(null, '', `/alerts${alertSearch(next)}`);
    setQuery(next);
    setSelected(null);
  };

  const page = alerts.data;
  return (
    <>
      <AlertFilters query={query} sectors={sectors} ownsBorrowers={ownsBorrowers} onChange={show} />
      <LiveRegion message={page ? `${page.total} alerts in this view` : ''} />
      {alerts.error instanceof Refusal && (
        <ErrorState problem={alerts.error.problem} onRetry={() => void alerts.refetch()} />
      )}
      <div className={selected === null ? undefined : 'with-evidence'}>
        {page && (
          <Panel flush label="Alerts">
            <AlertsTable
              page={page}
              query={query}
              today={today}
              selected={selected}
              onSelect={setSelected}
              onView={show}
            />
          </Panel>
        )}
        {selected !== null && (
          <AlertEvidence
            key={selected}
            id={selected}
            onChanged={() => void alerts.refetch()}
            onClose={() => setSelected(null)}
          />
        )}
      </div>
    </>
  );
}
