import type { MouseEvent, ReactNode, TableHTMLAttributes } from 'react';
import type { MethodTopic } from '../../contracts/methodTopics.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { classes } from './classes.ts';

/** Where a cell stands when a narrow screen folds the row into an entry of two lines; without one it is left out. */
export type EntryPlace = 'mark' | 'main' | 'figure' | 'strip' | 'extra';

export type SortDirection = 'ascending' | 'descending';

interface TableProps extends Omit<TableHTMLAttributes<HTMLTableElement>, 'style'> {
  readonly caption: ReactNode;
  readonly showCaption?: boolean;
  /** Folds rows into entries on narrow screens; cells then carry `entry`. */
  readonly entries?: boolean;
  readonly children: ReactNode;
}

/**
 * A real table. Roles are written out because the folded entries lay rows out as a grid, and a browser then forgets
 * that they are rows.
 */
export function Table({ caption, showCaption, entries, className, children, ...rest }: TableProps) {
  return (
    <table {...rest} role="table" className={classes('data-table', entries && 'entries', className)}>
      <caption className={showCaption ? 'type-second' : 'sr-only'}>{caption}</caption>
      {children}
    </table>
  );
}

export function TableHead({ children }: { readonly children: ReactNode }) {
  return <thead>{children}</thead>;
}

export function TableBody({ children }: { readonly children: ReactNode }) {
  return <tbody>{children}</tbody>;
}

interface HeadCellProps {
  readonly children?: ReactNode;
  readonly numeric?: boolean;
  /** Undefined: cannot be sorted; null: can be, is not. */
  readonly sorted?: SortDirection | null;
  readonly onSort?: () => void;
  /** How the figures of the column are computed. */
  readonly method?: MethodTopic;
  /** Says what an empty head is for. */
  readonly label?: string;
  readonly className?: string;
}

export function HeadCell({ children, numeric, sorted, onSort, method, label, className }: HeadCellProps) {
  return (
    <th
      scope="col"
      role="columnheader"
      className={classes(numeric && 'numeric', className)}
      aria-sort={sorted === undefined ? undefined : (sorted ?? 'none')}
    >
      {onSort ? (
        <button type="button" className="sort" onClick={onSort}>
          {!numeric && children}
          <span className="sort-mark" aria-hidden="true">
            {sorted === 'descending' ? '↓' : '↑'}
          </span>
          {numeric && children}
        </button>
      ) : (
        (children ?? <span className="sr-only">{label}</span>)
      )}
      {method && (
        <>
          {' '}
          <MethodLink topic={method} />
        </>
      )}
    </th>
  );
}

interface RowProps {
  readonly children: ReactNode;
  /** The row that j and k stand on, or whose evidence is shown. */
  readonly current?: boolean;
  /** A press anywhere on the row does the same as its link; the link stays for keyboard and screen reader. */
  readonly onOpen?: () => void;
  readonly id?: string;
}

export function Row({ children, current, onOpen, id }: RowProps) {
  const open = (event: MouseEvent<HTMLTableRowElement>) => {
    const onControl =
      event.target instanceof Element && event.target.closest('a, button, input, select, label');
    if (!onControl) onOpen?.();
  };
  return (
    <tr
      id={id}
      role="row"
      data-current={current ? 'true' : undefined}
      className={onOpen && 'row-opens'}
      onClick={onOpen && open}
    >
      {children}
    </tr>
  );
}

interface CellProps {
  readonly children?: ReactNode;
  readonly numeric?: boolean;
  readonly entry?: EntryPlace;
  /** A short word that must not be cut in two: a person's name, a date. */
  readonly nowrap?: boolean;
  readonly className?: string;
  readonly colSpan?: number;
}

export function Cell({ children, numeric, entry, nowrap, className, colSpan }: CellProps) {
  return (
    <td
      className={classes(numeric && 'numeric', nowrap && 'whitespace-nowrap', className)}
      data-entry={entry}
      colSpan={colSpan}
    >
      {children}
    </td>
  );
}

/** The cell that names its row: name and kind on the first line, the sentence with the figures on the second. */
interface NameCellProps {
  readonly name: ReactNode;
  readonly href?: string;
  readonly beside?: ReactNode;
  /** Left out where a narrow screen folds the row, unless `keepSecond`. */
  readonly second?: ReactNode;
  readonly keepSecond?: boolean;
  readonly current?: boolean;
  readonly onFollow?: (event: MouseEvent<HTMLAnchorElement>) => void;
}

export function NameCell({ name, href, beside, second, keepSecond, current, onFollow }: NameCellProps) {
  return (
    <th scope="row" role="rowheader" data-entry="main">
      {href === undefined ? (
        <span className="type-name">{name}</span>
      ) : (
        <a className="row-link" href={href} onClick={onFollow} aria-current={current ? 'true' : undefined}>
          {name}
        </a>
      )}
      {beside && (
        <>
          {' '}
          <span className="row-beside type-second type-small">{beside}</span>
        </>
      )}
      {second && (
        <>
          {' '}
          <span className={classes('row-second type-second', keepSecond && 'row-second-kept')}>{second}</span>
        </>
      )}
    </th>
  );
}
