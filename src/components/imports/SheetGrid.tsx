import { dayText } from '../../core/calendar/printDay.ts';
import { useEffect, useRef } from 'react';
import type { Reading, ReadColumn, ReadSheet } from '../../contracts/reading.ts';
import { LINE_ITEMS } from '../../core/statements/lineItems.ts';
import { classes } from '../ui/classes.ts';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { cellName, columnName } from './gridPlaces.ts';

interface SheetGridProps {
  readonly sheet: ReadSheet;
  readonly reading: Reading;
  /** The cell to show, from a figure elsewhere or from a question. */
  readonly target: string | null;
}

const LABELS: ReadonlyMap<string, string> = new Map(LINE_ITEMS.map((item) => [item.code, item.label]));

/** A sheet as the borrower sent it, with the period of each column and where each row goes. */
export function SheetGrid({ sheet, reading, target }: SheetGridProps) {
  const marked = useRef<HTMLTableCellElement>(null);
  useEffect(() => {
    marked.current?.scrollIntoView({ block: 'center', inline: 'center' });
  }, [target, sheet.name]);
  const width = Math.max(1, ...sheet.grid.map((row) => row.length));
  const columns = Array.from({ length: width }, (_, at) => at);
  const places = new Map(
    reading.placements.filter((each) => each.sheet === sheet.name).map((each) => [each.row, each]),
  );
  const asked = new Set(
    reading.questions
      .filter((question) => question.answer === null)
      .flatMap((question) => question.where.filter((at) => at.sheet === sheet.name).map((at) => at.cell)),
  );
  return (
    <ScrollRegion label={`Cells of ${sheet.name}`} className="sheet-grid">
      <table className="sheet-table">
        <caption className="sr-only">{sheet.name} as the borrower sent it</caption>
        <thead>
          <tr>
            <th scope="col">
              <span className="sr-only">Row</span>
            </th>
            {columns.map((at) => (
              <th key={at} scope="col">
                {columnName(at)}
                <ColumnPeriod column={sheet.columns.find((each) => each.column === columnName(at))} />
              </th>
            ))}
            <th scope="col">Goes to</th>
          </tr>
        </thead>
        <tbody>
          {sheet.grid.map((row, rowAt) => (
            <tr key={rowAt}>
              <th scope="row">{rowAt + 1}</th>
              {columns.map((at) => {
                const cell = row[at];
                const name = cellName(rowAt, at);
                return (
                  <td
                    key={at}
                    ref={name === target ? marked : undefined}
                    className={classes(
                      cell?.numeric && 'numeric',
                      cell?.bold && 'type-name',
                      (cell?.error ?? false) && 'grid-error',
                      asked.has(name) && 'grid-asked',
                      name === target && 'grid-target',
                    )}
                    aria-current={name === target ? 'true' : undefined}
                  >
                    {cell?.text}
                  </td>
                );
              })}
              <td>
                <Place place={places.get(rowAt + 1)} />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </ScrollRegion>
  );
}

function ColumnPeriod({ column }: { readonly column: ReadColumn | undefined }) {
  if (!column) return null;
  const text =
    column.scenario !== 'actual'
      ? `${column.scenario}, left out`
      : column.periodEnd === null
        ? column.heading
        : column.months === null
          ? `to ${dayText(column.periodEnd)}, how long?`
          : column.months === 0
            ? `at ${dayText(column.periodEnd)}`
            : `${column.months} months to ${dayText(column.periodEnd)}`;
  return (
    <span
      className={classes('tag', column.months === null && column.scenario === 'actual' && 'tag-question')}
    >
      {text}
    </span>
  );
}

function Place({ place }: { readonly place: Reading['placements'][number] | undefined }) {
  if (!place) return null;
  if (place.code === null) return <span className="tag tag-quiet">not placed</span>;
  return (
    <span className="tag" title={place.reason}>
      {LABELS.get(place.code) ?? place.code}
    </span>
  );
}
