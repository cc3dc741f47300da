import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { Page } from '../../contracts/paging.ts';
import type { RunDetail, RunRow } from '../../contracts/runs.ts';
import { getOrThrow, Refusal } from '../ui/api.ts';
import { ErrorState } from '../ui/ErrorState.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { Panel } from '../ui/Panel.tsx';
import { LiveRegion } from '../ui/States.tsx';
import { RunsTable } from './RunsTable.tsx';
import { RunState } from './RunState.tsx';
import { isGoingOn, progressOf, STATE_WORDS } from './runWords.ts';
import { StartRun } from './StartRun.tsx';

interface RunsSheetProps {
  readonly first: Page<RunRow>;
  readonly latest: RunDetail | null;
  readonly today: string;
  readonly zone: string;
}

/** While a run goes on its counts are asked for this often. */
const WATCH_MS = 1_000;

/** Starts the nightly run by hand, shows how far it is, and lists the runs there were. */
export function RunsSheet(props: RunsSheetProps) {
  return (
    <IslandQueries>
      <Runs {...props} />
    </IslandQueries>
  );
}

function Runs({ first, latest, today, zone }: RunsSheetProps) {
  const queries = useQueryClient();
  const [shownId, setShownId] = useState(latest?.id ?? null);
  const runs = useQuery({
    queryKey: ['runs', first.page],
    queryFn: ({ signal }) =>
      getOrThrow<Page<RunRow>>(`/runs?page=${first.page}&perPage=${first.perPage}`, signal),
    initialData: first,
    refetchInterval: (query) => (query.state.data?.rows.some(isGoingOn) ? WATCH_MS : false),
  });
  const shown = useQuery({
    queryKey: ['run', shownId],
    queryFn: ({ signal }) => getOrThrow<RunDetail>(`/runs/${shownId ?? 0}`, signal),
    enabled: shownId !== null,
    ...(latest?.id === shownId && latest !== null && { initialData: latest }),
    refetchInterval: (query) => (query.state.data && isGoingOn(query.state.data) ? WATCH_MS : false),
  });
  const run = shown.data;
  const watch = (id: number) => {
    setShownId(id);
    void queries.invalidateQueries({ queryKey: ['runs'] });
    void queries.invalidateQueries({ queryKey: ['run', id] });
  };
  const fault = runs.error ?? shown.error;
  return (
    <div className="with-evidence">
      <div className="stack min-[1100px]:order-2">
        <Panel title="Start by hand">
          <StartRun today={today} isOccupied={runs.data.rows.some(isGoingOn)} onStarted={watch} />
        </Panel>
        {fault instanceof Refusal && (
          <ErrorState problem={fault.problem} onRetry={() => void queries.invalidateQueries()} />
        )}
        {run && <RunState run={run} zone={zone} />}
      </div>
      <RunsTable page={runs.data} zone={zone} shownId={shownId} onShow={setShownId} />
      <LiveRegion
        message={
          run ? (isGoingOn(run) ? progressOf(run).label : `Run ${STATE_WORDS[run.state].toLowerCase()}`) : ''
        }
      />
    </div>
  );
}
