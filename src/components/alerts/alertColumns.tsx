import { createColumnHelper } from '@tanstack/react-table';
import type { AlertRow } from '../../contracts/alerts.ts';
import { AlertMark, alertKindText } from '../marks/AlertMark.tsx';
import { HeadroomText } from '../marks/OutcomeText.tsx';
import { QualityBar } from '../marks/QualityBar.tsx';
import { SoundingStrip } from '../marks/SoundingStrip.tsx';
import type { GridFeatures } from '../ui/dataGrid.ts';
import { NameCell } from '../ui/Table.tsx';
import { dueText, stateText } from './alertWords.ts';

const column = createColumnHelper<GridFeatures, AlertRow>();

/** The columns of the alerts table; ids are the sort keys of the request. */
export const alertColumns = (today: string) =>
  column.columns([
    column.display({
      id: 'mark',
      cell: ({ row }) => <AlertMark kind={row.original.kind} />,
      meta: { entry: 'mark', name: 'Kind', fixed: true },
    }),
    column.accessor('borrowerName', {
      id: 'borrower',
      header: 'Borrower',
      enableSorting: true,
      cell: ({ row: { original } }) => (
        <NameCell
          name={original.borrowerName}
          href={`/alerts/${original.id}`}
          beside={
            <>
              {alertKindText(original.kind)}
              {original.severity === 'urgent' && ', urgent'}
              {original.newSinceYesterday && ', new'}
              {stateText(original) && `, ${stateText(original)}`}
            </>
          }
          second={original.sentence}
          keepSecond
        />
      ),
      meta: { namesRow: true, fixed: true, name: 'Borrower', method: 'alerts' },
    }),
    column.display({
      id: 'strip',
      header: 'Last 12 tests',
      cell: ({ row: { original } }) =>
        original.strip.length > 0 ? (
          <SoundingStrip
            tests={original.strip}
            size="row"
            label={`${original.covenantName ?? 'Tests'} of ${original.borrowerName}`}
          />
        ) : (
          <span className="type-second">No test yet</span>
        ),
      meta: { entry: 'strip', name: 'Last 12 tests', method: 'sounding-strip' },
    }),
    column.accessor('mayFall', {
      id: 'may-fall',
      header: 'Earnings may fall',
      enableSorting: true,
      cell: ({ row: { original } }) => {
        const last = original.strip.at(-1);
        return original.latestOutcome ? (
          <HeadroomText
            mayFall={original.mayFall}
            outcome={original.latestOutcome}
            justPassing={last?.justPassing ?? false}
          />
        ) : (
          <span className="type-second">–</span>
        );
      },
      meta: { numeric: true, entry: 'figure', name: 'Earnings may fall', method: 'headroom' },
    }),
    column.accessor('qualityHeadline', {
      id: 'quality',
      header: 'Reporting quality',
      enableSorting: true,
      cell: ({ row: { original } }) => (
        <QualityBar score={original.qualityHeadline} band={original.qualityBand} stacked />
      ),
      meta: { name: 'Reporting quality', method: 'reporting-quality' },
    }),
    column.accessor('ownerName', {
      id: 'owner',
      header: 'Owner',
      enableSorting: false,
      cell: ({ row: { original } }) => (
        <>
          {original.ownerName}
          {original.state === 'raised' && <span className="type-second type-small block">not taken yet</span>}
        </>
      ),
      meta: { nowrap: true, name: 'Owner' },
    }),
    column.accessor('dueOn', {
      id: 'due',
      header: 'Due',
      enableSorting: true,
      cell: ({ row: { original } }) => (
        <time dateTime={original.dueOn}>{dueText(original.dueOn, today)}</time>
      ),
      meta: { nowrap: true, name: 'Due', entry: 'extra', method: 'alert-due-dates' },
    }),
  ]);
