import { FlexRender, type Cell as GridCell, type ReactTable, type RowData } from '@tanstack/react-table';
import { FoldedMethodLinks } from '../marks/MethodLink.tsx';
import { Fragment, type ReactNode } from 'react';
import type { GridFeatures } from './dataGrid.ts';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from './Table.tsx';

interface DataGridProps<TRow extends RowData> {
  readonly table: ReactTable<GridFeatures, TRow>;
  readonly caption: ReactNode;
  /** Row id of the current row; see getRowId of useTable. */
  readonly current?: string | null;
  readonly onOpen?: (row: TRow) => void;
  /** Shown in the table's place where there are no rows. */
  readonly empty?: ReactNode;
}

/** Draws a TanStack table: head with sort, rows, folded entries on narrow screens. It keeps no state. */
export function DataGrid<TRow extends RowData>({
  table,
  caption,
  current,
  onOpen,
  empty,
}: DataGridProps<TRow>) {
  const rows = table.getRowModel().rows;
  if (rows.length === 0 && empty) return empty;
  const methods = table.getVisibleLeafColumns().flatMap(({ columnDef }) => columnDef.meta?.method ?? []);
  return (
    <>
      <Table caption={caption} entries>
        <TableHead>
          {table.getHeaderGroups().map((group) => (
            <tr key={group.id} role="row">
              {group.headers.map((header) => {
                const { column } = header;
                const sorted = column.getIsSorted();
                const meta = column.columnDef.meta;
                return (
                  <HeadCell
                    key={header.id}
                    numeric={meta?.numeric}
                    label={meta?.name ?? column.id}
                    method={meta?.method}
                    sorted={column.getCanSort() ? directionOf(sorted) : undefined}
                    onSort={column.getCanSort() ? () => column.toggleSorting() : undefined}
                  >
                    {meta?.markOnly ? undefined : <FlexRender header={header} />}
                  </HeadCell>
                );
              })}
            </tr>
          ))}
        </TableHead>
        <TableBody>
          {rows.map((row) => (
            <Row key={row.id} current={row.id === current} onOpen={onOpen && (() => onOpen(row.original))}>
              {row.getVisibleCells().map((cell) => (
                <GridCellContent key={cell.id} cell={cell} />
              ))}
            </Row>
          ))}
        </TableBody>
      </Table>
      {methods.length > 0 && <FoldedMethodLinks topics={methods} />}
    </>
  );
}

function GridCellContent<TRow extends RowData>({ cell }: { readonly cell: GridCell<GridFeatures, TRow> }) {
  const meta = cell.column.columnDef.meta;
  const content = <FlexRender cell={cell} />;
  if (meta?.namesRow) return <Fragment>{content}</Fragment>;
  return (
    <Cell numeric={meta?.numeric} entry={meta?.entry} nowrap={meta?.nowrap}>
      {content}
    </Cell>
  );
}

function directionOf(sorted: false | 'asc' | 'desc') {
  if (sorted === false) return null;
  return sorted === 'asc' ? 'ascending' : 'descending';
}
