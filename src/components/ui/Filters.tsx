import type { ReactNode } from 'react';
import { classes } from './classes.ts';

interface FilterButtonProps {
  /** "Kind: any", "Due within 10 days". */
  readonly children: ReactNode;
  /** The filter narrows the list. */
  readonly set?: boolean;
  readonly href?: string;
  readonly onClick?: () => void;
  /** Takes the filter away; without it a press on the button does. */
  readonly removes?: boolean;
}

/** One filter of the filter line, as a link (the address carries the view) or as a button. */
export function FilterButton({ children, set, href, onClick, removes }: FilterButtonProps) {
  const className = classes('filter', set && 'filter-set');
  const content = (
    <>
      {children}
      {set && removes && (
        <>
          <span aria-hidden="true">×</span>
          <span className="sr-only">, take this filter away</span>
        </>
      )}
    </>
  );
  return href === undefined ? (
    <button type="button" className={className} aria-pressed={set ?? false} onClick={onClick}>
      {content}
    </button>
  ) : (
    <a className={className} href={href}>
      {content}
    </a>
  );
}

interface FilterSelectProps {
  readonly label: string;
  readonly value: string;
  readonly options: readonly { readonly value: string; readonly label: string }[];
  /** The value that does not narrow; any other shows the filter as set. */
  readonly anyValue?: string;
  readonly onChange: (value: string) => void;
}

/** A filter with a closed list of values: reads "Kind: any" and opens the browser's own list. */
export function FilterSelect({ label, value, options, anyValue = '', onChange }: FilterSelectProps) {
  return (
    <label className={classes('filter', value !== anyValue && 'filter-set')}>
      <span>{label}:</span>
      <select className="filter-select" value={value} onChange={(event) => onChange(event.target.value)}>
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    </label>
  );
}

export interface Segment {
  readonly value: string;
  readonly label: string;
  readonly href?: string;
}

interface SegmentsProps {
  readonly label: string;
  readonly segments: readonly Segment[];
  readonly value: string;
  readonly onChange?: (value: string) => void;
}

/** One of a few views of the same list. Segments with an address are links. */
export function Segments({ label, segments, value, onChange }: SegmentsProps) {
  return (
    <div className="segments" role="group" aria-label={label}>
      {segments.map((segment) =>
        segment.href === undefined ? (
          <button
            key={segment.value}
            type="button"
            className="segment"
            aria-pressed={segment.value === value}
            onClick={() => onChange?.(segment.value)}
          >
            {segment.label}
          </button>
        ) : (
          <a
            key={segment.value}
            className="segment"
            href={segment.href}
            aria-current={segment.value === value ? 'true' : undefined}
          >
            {segment.label}
          </a>
        ),
      )}
    </div>
  );
}
