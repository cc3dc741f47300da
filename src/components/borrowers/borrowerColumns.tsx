import { dayText } from '../../core/calendar/printDay.ts';
import { createColumnHelper } from '@tanstack/react-table';
import type { BorrowerRow } from '../../contracts/borrowers.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatMoney, formatShare } from '../../core/money/print.ts';
import { HeadroomText } from '../marks/OutcomeText.tsx';
import { QualityBar } from '../marks/QualityBar.tsx';
import { SoundingStrip } from '../marks/SoundingStrip.tsx';
import type { GridFeatures } from '../ui/dataGrid.ts';
import { NameCell } from '../ui/Table.tsx';

const column = createColumnHelper<GridFeatures, BorrowerRow>();

/** A step that leaves as much as today is no news. */
const isTighter = ({ mayFall, mayFallAhead }: BorrowerRow): boolean =>
  mayFallAhead !== null && (mayFall === null || decimal(mayFallAhead.mayFall).lt(decimal(mayFall)));

/** The columns of the borrowers table; ids are the sort keys of the request. */
export const borrowerColumns = column.columns([
  column.accessor('name', {
    header: 'Borrower',
    cell: ({ row: { original } }) => (
      <NameCell
        name={original.name}
        href={`/borrowers/${original.id}`}
        beside={original.watchGrade && `on watchlist, ${original.watchGrade}`}
        second={`${original.sectorLabel}, ${original.deskName}, ${original.managerName}`}
      />
    ),
    meta: { namesRow: true, fixed: true, name: 'Borrower' },
  }),
  column.display({
    id: 'strip',
    header: 'Smallest headroom, last 12 tests',
    cell: ({ row: { original } }) =>
      original.strip.length > 0 ? (
        <span>
          <SoundingStrip
            tests={original.strip}
            size="row"
            label={`${original.covenantName ?? 'Tests'} of ${original.name}`}
          />
          <span className="type-second type-small block">{original.covenantName}</span>
        </span>
      ) : (
        <span className="type-second">No test yet</span>
      ),
    meta: { entry: 'strip', name: 'Last 12 tests', method: 'sounding-strip' },
  }),
  column.accessor('mayFall', {
    id: 'may-fall',
    header: 'Earnings may fall',
    cell: ({ row: { original } }) =>
      original.latestOutcome ? (
        <>
          <HeadroomText
            mayFall={original.mayFall}
            outcome={original.latestOutcome}
            justPassing={original.strip.at(-1)?.justPassing ?? false}
          />
          {original.mayFallAhead && isTighter(original) && (
            <span className="type-second type-small block">
              {formatShare(decimal(original.mayFallAhead.mayFall))} from {dayText(original.mayFallAhead.from)}
            </span>
          )}
        </>
      ) : (
        <span className="type-second">–</span>
      ),
    meta: { numeric: true, entry: 'figure', name: 'Earnings may fall', method: 'smallest-headroom' },
  }),
  column.accessor('qualityHeadline', {
    id: 'quality',
    header: 'Reporting quality',
    cell: ({ row: { original } }) => (
      <QualityBar score={original.qualityHeadline} band={original.qualityBand} stacked />
    ),
    meta: { name: 'Reporting quality', method: 'reporting-quality' },
  }),
  column.accessor('drawn', {
    header: 'Drawn of limit',
    cell: ({ row: { original } }) => (
      <>
        {original.currency} {formatMoney(decimal(original.drawn))}
        <span className="type-second type-small block">of {formatMoney(decimal(original.limit))}</span>
      </>
    ),
    meta: { numeric: true, nowrap: true, name: 'Drawn of limit', method: 'exposure' },
  }),
  column.accessor('openAlerts', {
    id: 'alerts',
    header: 'Alerts',
    cell: ({ row: { original } }) => (
      <>
        {original.openAlerts}
        {original.urgentAlerts > 0 && (
          <span className="type-second type-small block">{original.urgentAlerts} urgent</span>
        )}
      </>
    ),
    meta: { numeric: true, nowrap: true, name: 'Alerts', method: 'alerts' },
  }),
  column.accessor('latestFigures', {
    id: 'figures',
    header: 'Figures to',
    enableSorting: false,
    cell: ({ row: { original } }) =>
      original.latestFigures ? dayText(original.latestFigures) : <span className="type-second">none</span>,
    meta: { nowrap: true, name: 'Figures to', entry: 'extra', method: 'data-cut-off' },
  }),
]);
