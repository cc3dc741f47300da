import type { SheetCell, SheetColumn, SheetTable as SheetTableBlock } from '../../contracts/reviewSheet.ts';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { SheetCellText } from './SheetCellText.tsx';

interface Placed {
  readonly column: SheetColumn;
  readonly place: number;
}

/** A table of the review sheet. Columns that stand under another one are lines in its cells, so that a page is wide enough. */
export function SheetTable({ caption, columns, rows }: SheetTableBlock) {
  const placed = columns.map((column, place) => ({ column, place }));
  const main = placed.filter(({ column }) => column.under === undefined);
  const under = ({ column }: Placed) => placed.filter((other) => other.column.under === column.key);
  return (
    <ScrollRegion label={caption}>
      <Table caption={caption} showCaption className="review-table">
        <TableHead>
          <tr role="row">
            {main.map(({ column }) => (
              <HeadCell key={column.key} numeric={column.numeric}>
                {column.label}
              </HeadCell>
            ))}
          </tr>
        </TableHead>
        <TableBody>
          {rows.map((row, number) => (
            <Row key={number}>
              {main.map((each) => (
                <Cell key={each.column.key} numeric={each.column.numeric}>
                  {cellAt(row, each)}
                  {under(each)
                    .filter(({ place }) => row[place]?.text !== '')
                    .map((line) => (
                      <span key={line.column.key} className="review-under type-second type-small">
                        {line.column.label}: {cellAt(row, line)}
                      </span>
                    ))}
                </Cell>
              ))}
            </Row>
          ))}
        </TableBody>
      </Table>
    </ScrollRegion>
  );
}

function cellAt(row: readonly SheetCell[], { place }: Placed) {
  const cell = row[place];
  return cell && <SheetCellText cell={cell} />;
}
