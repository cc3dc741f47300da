import type { ReactTable, RowData } from '@tanstack/react-table';
import type { GridFeatures } from './dataGrid.ts';

interface ColumnChoiceProps<TRow extends RowData> {
  readonly table: ReactTable<GridFeatures, TRow>;
}

/** Which columns a table shows. Columns that name the row stay. */
export function ColumnChoice<TRow extends RowData>({ table }: ColumnChoiceProps<TRow>) {
  const columns = table.getAllLeafColumns().filter((column) => !column.columnDef.meta?.fixed);
  return (
    <details
      className="column-choice"
      onBlur={(event) => {
        if (!event.currentTarget.contains(event.relatedTarget)) event.currentTarget.open = false;
      }}
    >
      <summary className="filter">Columns</summary>
      <fieldset>
        <legend className="sr-only">Columns shown</legend>
        {columns.map((column) => (
          <label key={column.id} className="choice">
            <input
              type="checkbox"
              checked={column.getIsVisible()}
              onChange={(event) => column.toggleVisibility(event.target.checked)}
            />
            <span>{column.columnDef.meta?.name ?? column.id}</span>
          </label>
        ))}
      </fieldset>
    </details>
  );
}
