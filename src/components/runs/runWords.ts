/** How a run is put in words. */
import type { RunDetail, RunRow } from '../../contracts/runs.ts';

export const isGoingOn = (run: Pick<RunRow, 'state'>): boolean =>
  run.state === 'queued' || run.state === 'running';

export const STATE_WORDS: Readonly<Record<RunRow['state'], string>> = {
  queued: 'Waits to begin',
  running: 'Running',
  interrupted: 'Interrupted',
  done: 'Done',
};

export interface RunCount {
  readonly label: string;
  readonly done: number;
  readonly of: number;
}

/** Where the run stands, as a count: failed borrowers are behind it too. */
export function progressOf(run: RunDetail): RunCount {
  const of = run.borrowersTotal;
  if (run.state === 'queued') return { label: 'Waits for the worker to begin', done: 0, of: 1 };
  const step = run.steps.find(({ phase }) => phase === run.phase);
  const done = step ? step.done + step.failed : of;
  switch (run.phase) {
    case 'tests':
      return { label: `Read the peer figures of ${done} of ${of} borrowers`, done, of };
    case 'cross-section':
      return { label: `Compares ${of} borrowers with one another`, done, of };
    case 'scores':
      return { label: `Tested ${done} of ${of} borrowers`, done, of };
    case 'mail':
      return { label: 'Queues the morning mail', done, of };
  }
}

/** '1 Dec 2026, 02:30' in the lender's zone. */
export const instantText = (iso: string, zone: string): string =>
  new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
  }).format(new Date(iso));

/** '4 s', '3 min 20 s'; nothing while it goes on. */
export function durationText(run: Pick<RunRow, 'startedAt' | 'finishedAt'>): string {
  if (run.finishedAt === null) return '';
  const seconds = Math.max(0, Math.round((Date.parse(run.finishedAt) - Date.parse(run.startedAt)) / 1_000));
  return seconds < 60 ? `${seconds} s` : `${Math.floor(seconds / 60)} min ${seconds % 60} s`;
}
