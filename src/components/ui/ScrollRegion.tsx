import type { ReactNode } from 'react';
import { classes } from './classes.ts';

interface ScrollRegionProps {
  /** What lies in it, for somebody who comes to it by the Tab key. */
  readonly label: string;
  readonly className?: string;
  readonly children: ReactNode;
}

/** What is wider than its place scrolls within it, also by the arrow keys. */
export function ScrollRegion({ label, className, children }: ScrollRegionProps) {
  return (
    // A region that scrolls has to be reachable by keyboard.
    // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex
    <div className={classes('scroll-region', className)} role="region" aria-label={label} tabIndex={0}>
      {children}
    </div>
  );
}
