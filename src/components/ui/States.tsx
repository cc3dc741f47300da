import type { ReactNode } from 'react';

interface EmptyStateProps {
  readonly title: string;
  /** Why there is nothing and what to do next. */
  readonly children?: ReactNode;
}

export function EmptyState({ title, children }: EmptyStateProps) {
  return (
    <div className="px-5 py-10">
      <p className="type-panel">{title}</p>
      {children && <div className="type-second mt-1 max-w-[64ch]">{children}</div>}
    </div>
  );
}

interface NoPermissionProps {
  /** "open the audit log" */
  readonly what: string;
  /** Who can, or whom to ask. */
  readonly children?: ReactNode;
}

export function NoPermission({ what, children }: NoPermissionProps) {
  return (
    <EmptyState title={`Your role may not ${what}`}>
      {children ?? 'An administrator of the desk can change what your role may do. Nothing was changed.'}
    </EmptyState>
  );
}

/** "Loading alerts": says what is coming, quietly, and is read out once. */
export function LoadingState({ what }: { readonly what: string }) {
  return (
    <p className="type-second px-5 py-10" role="status">
      Loading {what}…
    </p>
  );
}

interface ProgressProps {
  /** "Tested 212 of 312 borrowers" */
  readonly label: string;
  readonly done: number;
  readonly of: number;
  /** "You can leave this page; the run goes on." */
  readonly children?: ReactNode;
}

/** Long work with its count. Ink on a ruled scale, as the quality bar. */
export function Progress({ label, done, of, children }: ProgressProps) {
  const share = of > 0 ? Math.min(Math.max(done / of, 0), 1) : 0;
  return (
    <div>
      <p className="mb-1">{label}</p>
      <div role="progressbar" aria-label={label} aria-valuemin={0} aria-valuemax={of} aria-valuenow={done}>
        <svg className="progress" viewBox="0 0 400 9" preserveAspectRatio="none" aria-hidden="true">
          <rect
            className="bar-frame"
            x="0.5"
            y="0.5"
            width="399"
            height="8"
            vectorEffect="non-scaling-stroke"
          />
          <rect className="bar-ink" x="0" y="0" width={400 * share} height="9" />
        </svg>
      </div>
      {children && <p className="type-second type-small mt-1">{children}</p>}
    </div>
  );
}

/** A caution where it has to stand: a bar of land at the left, quiet, never folded away. */
export function Caution({ children }: { readonly children: ReactNode }) {
  return (
    <div className="caution" role="note">
      {children}
    </div>
  );
}

/** Says to a screen reader what has just changed on the page. One on a page; the text changes. */
export function LiveRegion({ message }: { readonly message: string }) {
  return (
    <p className="sr-only" role="status" aria-live="polite">
      {message}
    </p>
  );
}
