import { useId, type ReactNode } from 'react';
import { classes } from './classes.ts';

interface PanelProps {
  readonly title?: ReactNode;
  /** What the title needs beside it: a count, a date, a button. */
  readonly aside?: ReactNode;
  readonly level?: 2 | 3;
  /** A table that fills the panel to its lines. */
  readonly flush?: boolean;
  readonly id?: string;
  readonly className?: string;
  /** Names the region where there is no title. */
  readonly label?: string;
  readonly children: ReactNode;
}

/** A sheet inside a neatline. */
export function Panel({ title, aside, level = 2, flush, id, className, label, children }: PanelProps) {
  const titleId = useId();
  const Heading = level === 2 ? 'h2' : 'h3';
  return (
    <section
      id={id}
      className={classes('panel', flush && 'panel-flush', className)}
      aria-labelledby={title ? titleId : undefined}
      aria-label={title ? undefined : label}
    >
      {(title || aside) && (
        <div className="panel-head">
          {title && (
            <Heading id={titleId} className="type-panel">
              {title}
            </Heading>
          )}
          {aside}
        </div>
      )}
      {children}
    </section>
  );
}
