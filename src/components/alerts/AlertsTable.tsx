import { useTable } from '@tanstack/react-table';
import { useMemo, useState } from 'react';
import { ALERT_SORTS, type AlertQuery, type AlertRow } from '../../contracts/alerts.ts';
import type { Page } from '../../contracts/paging.ts';
import { DataGrid } from '../ui/DataGrid.tsx';
import { gridFeatures } from '../ui/dataGrid.ts';
import { useRowKeys } from '../ui/keys.ts';
import { GridFoot } from '../ui/GridFoot.tsx';
import { EmptyState } from '../ui/States.tsx';
import { alertColumns } from './alertColumns.tsx';
import { alertSearch, withChange } from './alertView.ts';

interface AlertsTableProps {
  readonly page: Page<AlertRow>;
  readonly query: AlertQuery;
  readonly today: string;
  readonly selected: number | null;
  readonly onSelect: (id: number) => void;
  readonly onView: (query: AlertQuery) => void;
}

/** Below this width the evidence is a page of its own. */
const EVIDENCE_BESIDE = '(min-width: 1000px)';

export function AlertsTable({ page, query, today, selected, onSelect, onView }: AlertsTableProps) {
  const columns = useMemo(() => alertColumns(today), [today]);
  const [cursor, setCursor] = useState<number | null>(null);
  const rows = page.rows as AlertRow[];
  const table = useTable({
    features: gridFeatures,
    columns,
    data: rows,
    getRowId: (row) => String(row.id),
    manualSorting: true,
    enableMultiSort: false,
    enableSortingRemoval: false,
    state: { sorting: [{ id: query.sort, desc: query.direction === 'down' }] },
    onSortingChange: (change) => {
      const before = [{ id: query.sort as string, desc: query.direction === 'down' }];
      const [sort] = typeof change === 'function' ? change(before) : change;
      const key = ALERT_SORTS.find((each) => each === sort?.id);
      if (key && sort) onView(withChange(query, { sort: key, direction: sort.desc ? 'down' : 'up' }));
    },
  });
  const open = (id: number) => {
    if (matchMedia(EVIDENCE_BESIDE).matches) onSelect(id);
    else location.assign(`/alerts/${id}`);
  };
  useRowKeys({
    count: rows.length,
    selected: cursor,
    onSelect: (row) => {
      setCursor(row);
      document.getElementById(`alert-row-${row}`)?.scrollIntoView({ block: 'nearest' });
    },
    onOpen: (row) => {
      const at = rows[row];
      if (at) open(at.id);
    },
  });
  const current = selected ?? (cursor === null ? null : (rows[cursor]?.id ?? null));
  return (
    <>
      <DataGrid
        table={table}
        caption={`Alerts, ${page.total} in this view`}
        current={current === null ? null : String(current)}
        onOpen={(row) => open(row.id)}
        empty={
          <EmptyState title="No alerts in this view">
            Nothing is open that these filters let through. Take a filter away, or look at your whole desk.
          </EmptyState>
        }
      />
      <GridFoot
        table={table}
        page={page.page}
        perPage={page.perPage}
        total={page.total}
        what="alerts"
        hrefOf={(to) => `/alerts${alertSearch({ ...query, page: to })}`}
        onPage={(to) => onView({ ...query, page: to })}
      />
    </>
  );
}
