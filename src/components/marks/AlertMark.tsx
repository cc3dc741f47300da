import type { ReactNode } from 'react';
import type { AlertKind } from '../../core/alerts/alert.ts';
import { classes } from '../ui/classes.ts';

const LINE = { className: 'mark-line', strokeWidth: 1.5 } as const;

/** One drawing for each kind, told apart by shape; the warning colour only where a test is not met or just passing. */
const DRAWINGS: Readonly<Record<AlertKind, ReactNode>> = {
  'test not met': <path className="mark-fill" d="M8 1l7 7-7 7-7-7z" />,
  'thin headroom': (
    <>
      <circle {...LINE} cx="8" cy="8" r="5.75" />
      <path className="mark-fill" d="M2.25 8h11.5a5.75 5.75 0 0 1-11.5 0z" />
    </>
  ),
  'just passing, repeated': (
    <>
      <circle {...LINE} cx="8" cy="6.5" r="4.75" />
      <path className="mark-fill" d="M3.25 6.5h9.5a4.75 4.75 0 0 1-9.5 0z" />
      <path {...LINE} d="M1 14h14" />
    </>
  ),
  pattern: (
    <>
      <path {...LINE} d="M1 14h14M8 1v13" />
      <path className="mark-fill" d="M8.75 4h3v10h-3z" />
      <path {...LINE} strokeWidth="1" d="M3.5 14v-3M6 14v-1.5M14 14V9" />
    </>
  ),
  'met only with add-backs': (
    <>
      <rect {...LINE} x="2.25" y="2.25" width="11.5" height="11.5" />
      <path {...LINE} d="M8 5v6M5 8h6" />
    </>
  ),
  'met only on accruals': (
    <>
      <rect {...LINE} x="2.25" y="2.25" width="11.5" height="11.5" />
      <path {...LINE} d="M5 9.5c1-3 2-3 3-1.5s2 1.5 3-1.5" />
    </>
  ),
  'past our trigger': (
    <>
      <rect {...LINE} x="4" y="6" width="8" height="8" />
      <path {...LINE} d="M1 3h14" />
    </>
  ),
  'waiver, cure running out': (
    <>
      <path {...LINE} d="M3 1.75h10M3 14.25h10M4 2v2.5L8 8l4-3.5V2M4 14v-2.5L8 8l4 3.5V14" />
    </>
  ),
  'step-down ahead': (
    <>
      <path {...LINE} d="M1 4h5v4h5v4h4" />
      <path className="mark-fill" d="M11 8h4v4h-4z" fillOpacity="0.35" />
    </>
  ),
  'headroom shrinking': (
    <>
      <path {...LINE} d="M1 14h14M3.5 2v9.5M12.5 6.5v5" />
      <path {...LINE} strokeWidth="1" d="M3.5 2l9 4.5" />
    </>
  ),
  'reporting quality fell': (
    <>
      <path {...LINE} d="M1 4l4.5 4.5L8 6l5.5 5.5" />
      <path {...LINE} d="M14 7.5V12H9.5" />
    </>
  ),
  'reporting quality weak': (
    <>
      <rect {...LINE} x="1.25" y="5.25" width="13.5" height="5.5" />
      <path className="mark-fill" d="M1.25 5.25h3.75v5.5H1.25z" />
      <path {...LINE} strokeWidth="1" d="M8 5.25v5.5M11.4 5.25v5.5" />
    </>
  ),
  'prior figures restated': (
    <>
      <path {...LINE} d="M3.2 5.2A5.5 5.5 0 1 1 2.5 8" />
      <path {...LINE} d="M3 1.5v4h4" />
    </>
  ),
  'statement late': (
    <>
      <circle {...LINE} cx="8" cy="8" r="5.75" />
      <path {...LINE} d="M8 4.5V8l2.75 1.75" />
    </>
  ),
};

const IN_MAGENTA: readonly AlertKind[] = ['test not met', 'just passing, repeated'];

/** The mark alone; its word stands beside it on the same row. */
export function AlertMark({ kind }: { readonly kind: AlertKind }) {
  return (
    <svg
      className={classes('mark', IN_MAGENTA.includes(kind) && 'mark-magenta')}
      width="16"
      height="16"
      viewBox="0 0 16 16"
      aria-hidden="true"
      focusable="false"
    >
      {DRAWINGS[kind]}
    </svg>
  );
}

/** "Test not met": the kind as the screen prints it. */
export const alertKindText = (kind: AlertKind): string => kind.charAt(0).toUpperCase() + kind.slice(1);

/** Mark and word together. */
export function AlertKindLabel({ kind }: { readonly kind: AlertKind }) {
  return (
    <span className="inline-flex items-baseline gap-2">
      <AlertMark kind={kind} />
      {alertKindText(kind)}
    </span>
  );
}
