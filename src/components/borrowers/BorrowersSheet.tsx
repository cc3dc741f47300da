import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useTable } from '@tanstack/react-table';
import { useEffect, useState } from 'react';
import { BORROWER_SORTS, type BorrowerQuery, type BorrowerRow } from '../../contracts/borrowers.ts';
import type { Page } from '../../contracts/paging.ts';
import { Refusal, getOrThrow } from '../ui/api.ts';
import { DataGrid } from '../ui/DataGrid.tsx';
import { gridFeatures } from '../ui/dataGrid.ts';
import { ErrorState } from '../ui/ErrorState.tsx';
import { FilterSelect } from '../ui/Filters.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { useRowKeys } from '../ui/keys.ts';
import { GridFoot } from '../ui/GridFoot.tsx';
import { Panel } from '../ui/Panel.tsx';
import { EmptyState, LiveRegion } from '../ui/States.tsx';
import { borrowerColumns } from './borrowerColumns.tsx';
import { borrowerSearch, readBorrowerView } from './borrowerView.ts';

interface BorrowersSheetProps {
  readonly query: BorrowerQuery;
  readonly first: Page<BorrowerRow>;
  readonly sectors: readonly { readonly code: string; readonly label: string }[];
}

/** The borrowers of the desks that the person reads, thinnest headroom first. */
export function BorrowersSheet(props: BorrowersSheetProps) {
  return (
    <IslandQueries>
      <Borrowers {...props} />
    </IslandQueries>
  );
}

function Borrowers({ query: firstQuery, first, sectors }: BorrowersSheetProps) {
  const [query, setQuery] = useState(firstQuery);
  const search = borrowerSearch(query);
  const borrowers = useQuery({
    queryKey: ['borrowers', search],
    queryFn: ({ signal }) => getOrThrow<Page<BorrowerRow>>(`/borrowers${search}`, signal),
    placeholderData: keepPreviousData,
    ...(query === firstQuery && { initialData: first }),
  });
  useEffect(() => {
    const back = () => setQuery(readBorrowerView(new URLSearchParams(location.search)).query);
    addEventListener('popstate', back);
    return () => removeEventListener('popstate', back);
  }, []);
  const show = (next: BorrowerQuery) => {
    history.pushState(null, '', `/borrowers${borrowerSearch(next)}`);
    setQuery(next);
  };
  const page = borrowers.data;
  return (
    <>
      <div className="filter-line">
        <FilterSelect
          label="Sector"
          value={query.sector ?? ''}
          options={[
            { value: '', label: 'any' },
            ...sectors.map((sector) => ({ value: sector.code, label: sector.label })),
          ]}
          onChange={(sector) => show({ ...query, page: 1, sector: sector === '' ? undefined : sector })}
        />
      </div>
      <LiveRegion message={page ? `${page.total} borrowers in this view` : ''} />
      {borrowers.error instanceof Refusal && (
        <ErrorState problem={borrowers.error.problem} onRetry={() => void borrowers.refetch()} />
      )}
      {page && <BorrowersTable page={page} query={query} onView={show} />}
    </>
  );
}

interface BorrowersTableProps {
  readonly page: Page<BorrowerRow>;
  readonly query: BorrowerQuery;
  readonly onView: (query: BorrowerQuery) => void;
}

function BorrowersTable({ page, query, onView }: BorrowersTableProps) {
  const [cursor, setCursor] = useState<number | null>(null);
  const rows = page.rows as BorrowerRow[];
  const sorting = [{ id: query.sort as string, desc: query.direction === 'down' }];
  const table = useTable({
    features: gridFeatures,
    columns: borrowerColumns,
    data: rows,
    getRowId: (row) => String(row.id),
    manualSorting: true,
    enableMultiSort: false,
    enableSortingRemoval: false,
    state: { sorting },
    onSortingChange: (change) => {
      const [sort] = typeof change === 'function' ? change(sorting) : change;
      const key = BORROWER_SORTS.find((each) => each === sort?.id);
      if (key && sort) onView({ ...query, page: 1, sort: key, direction: sort.desc ? 'down' : 'up' });
    },
  });
  const open = (row: BorrowerRow) => location.assign(`/borrowers/${row.id}`);
  useRowKeys({
    count: rows.length,
    selected: cursor,
    onSelect: setCursor,
    onOpen: (at) => {
      const row = rows[at];
      if (row) open(row);
    },
  });
  return (
    <Panel flush label="Borrowers">
      <DataGrid
        table={table}
        caption={`Borrowers, ${page.total} in this view`}
        current={cursor === null ? null : String(rows[cursor]?.id)}
        onOpen={open}
        empty={
          <EmptyState title="No borrowers in this view">
            Take a filter away, or ask the head of the desk whether the borrower belongs to another desk.
          </EmptyState>
        }
      />
      <GridFoot
        table={table}
        page={page.page}
        perPage={page.perPage}
        total={page.total}
        what="borrowers"
        hrefOf={(to) => `/borrowers${borrowerSearch({ ...query, page: to })}`}
        onPage={(to) => onView({ ...query, page: to })}
      />
    </Panel>
  );
}
