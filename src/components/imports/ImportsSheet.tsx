import { dayText } from '../../core/calendar/printDay.ts';
import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { ImportQuery, ImportRow } from '../../contracts/imports.ts';
import type { Page } from '../../contracts/paging.ts';
import { Refusal, getOrThrow } from '../ui/api.ts';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Segments } from '../ui/Filters.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { Pager } from '../ui/Pager.tsx';
import { Panel } from '../ui/Panel.tsx';
import { EmptyState } from '../ui/States.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { UploadPanel, type BorrowerChoice } from './UploadPanel.tsx';

interface ImportsSheetProps {
  readonly query: ImportQuery;
  readonly first: Page<ImportRow>;
  /** Borrowers that the person may import for; empty for whoever only reads. */
  readonly borrowers: readonly BorrowerChoice[];
  readonly borrowerId: number | null;
}

/** Files received: drafts that wait for answers first in mind, then what was accepted. */
export function ImportsSheet(props: ImportsSheetProps) {
  return (
    <IslandQueries>
      <Imports {...props} />
    </IslandQueries>
  );
}

const STATES = [
  { value: '', label: 'All' },
  { value: 'draft', label: 'Drafts' },
  { value: 'accepted', label: 'Accepted' },
  { value: 'withdrawn', label: 'Withdrawn' },
] as const;

function Imports({ query: firstQuery, first, borrowers, borrowerId }: ImportsSheetProps) {
  const [query, setQuery] = useState(firstQuery);
  const search = new URLSearchParams({
    page: String(query.page),
    perPage: String(query.perPage),
    ...(query.state && { state: query.state }),
  }).toString();
  const imports = useQuery({
    queryKey: ['imports', search],
    queryFn: ({ signal }) => getOrThrow<Page<ImportRow>>(`/imports?${search}`, signal),
    placeholderData: keepPreviousData,
    ...(query === firstQuery && { initialData: first }),
  });
  const page = imports.data;
  return (
    <div className={borrowers.length > 0 ? 'with-evidence' : undefined}>
      <div className="stack">
        <div>
          <Segments
            label="State"
            value={query.state ?? ''}
            segments={STATES}
            onChange={(state) =>
              setQuery({
                ...query,
                page: 1,
                state: state === '' ? undefined : (state as ImportQuery['state']),
              })
            }
          />
        </div>
        {imports.error instanceof Refusal && (
          <ErrorState problem={imports.error.problem} onRetry={() => void imports.refetch()} />
        )}
        {page && (
          <Panel flush label="Imports">
            <ImportsTable rows={page.rows} mayImport={borrowers.length > 0} />
            {page.total > 0 && (
              <Pager
                page={page.page}
                perPage={page.perPage}
                total={page.total}
                what="imports"
                hrefOf={(to) => `/imports?page=${to}`}
                onPage={(to) => setQuery({ ...query, page: to })}
              />
            )}
          </Panel>
        )}
      </div>
      {borrowers.length > 0 && <UploadPanel borrowers={borrowers} borrowerId={borrowerId} />}
    </div>
  );
}

function ImportsTable({
  rows,
  mayImport,
}: {
  readonly rows: readonly ImportRow[];
  readonly mayImport: boolean;
}) {
  if (rows.length === 0)
    return (
      <EmptyState title="No import in this view">
        {mayImport
          ? 'Drop a borrower’s workbook at the right: it is read at once, and no figure counts until you accept.'
          : 'An analyst of the desk imports borrowers’ workbooks.'}
      </EmptyState>
    );
  return (
    <Table caption="Imports, newest first" entries>
      <TableHead>
        <tr role="row">
          <HeadCell>Borrower and file</HeadCell>
          <HeadCell>State</HeadCell>
          <HeadCell numeric>Periods</HeadCell>
          <HeadCell numeric>Open questions</HeadCell>
          <HeadCell>Received</HeadCell>
          <HeadCell>Accepted</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {rows.map((row) => (
          <Row key={row.id} onOpen={() => location.assign(`/imports/${row.id}`)}>
            <NameCell name={row.borrowerName} href={`/imports/${row.id}`} second={row.fileName} keepSecond />
            <Cell entry="figure">{row.state}</Cell>
            <Cell numeric>{row.periods}</Cell>
            <Cell numeric entry="extra">
              {row.state === 'draft' ? row.openQuestions : '–'}
            </Cell>
            <Cell nowrap>
              {dayText(row.uploadedAt.slice(0, 10))}
              <span className="type-second type-small block">{row.uploadedBy}</span>
            </Cell>
            <Cell nowrap>
              {row.acceptedAt ? dayText(row.acceptedAt.slice(0, 10)) : '–'}
              {row.acceptedBy && <span className="type-second type-small block">{row.acceptedBy}</span>}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
