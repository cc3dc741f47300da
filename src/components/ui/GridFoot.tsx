import type { ReactTable, RowData } from '@tanstack/react-table';
import { ColumnChoice } from './ColumnChoice.tsx';
import type { GridFeatures } from './dataGrid.ts';
import { Pager, type PagerProps } from './Pager.tsx';

interface GridFootProps<TRow extends RowData> extends PagerProps {
  readonly table: ReactTable<GridFeatures, TRow>;
}

/** Under a table: which rows of how many, the pages, and which columns are shown. Nothing under an empty one. */
export function GridFoot<TRow extends RowData>({ table, ...pages }: GridFootProps<TRow>) {
  if (pages.total === 0) return null;
  return (
    <div className="table-tools">
      <Pager {...pages} />
      <ColumnChoice table={table} />
    </div>
  );
}
