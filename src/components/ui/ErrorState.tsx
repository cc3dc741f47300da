import type { ReactNode } from 'react';
import type { ProblemBody } from '../../contracts/problem.ts';
import { SESSION_ENDED_STATUS, SIGN_IN_PATH } from './api.ts';
import { Button } from './Button.tsx';
import { classes } from './classes.ts';

interface ErrorStateProps {
  readonly problem: ProblemBody;
  readonly onRetry?: () => void;
  readonly retryLabel?: string;
  /** Further ways out: a link back, another view. */
  readonly children?: ReactNode;
}

/** Why something was not done: the problem in words, each field's fault, the request to quote, the way on. */
export function ErrorState({ problem, onRetry, retryLabel = 'Try again', children }: ErrorStateProps) {
  return (
    <div className="notice" role="alert">
      <p className="type-heading">{problem.title}</p>
      <p>{problem.detail}</p>
      {problem.errors && problem.errors.length > 0 && (
        <ul className="mt-2 list-disc pl-5">
          {problem.errors.map((error) => (
            <li
              key={`${error.sheet ?? ''}!${error.cell ?? ''}:${error.field ?? ''}:${error.code}:${error.message}`}
            >
              {whereOf(error) && <span className="type-name">{whereOf(error)}: </span>}
              {error.message}
            </li>
          ))}
        </ul>
      )}
      {problem.instance.startsWith('urn:request:') && (
        <p className="type-second type-fine mt-1">
          Request {problem.instance.slice('urn:request:'.length)}. Quote it when you ask for help.
        </p>
      )}
      {(onRetry || children || problem.status === SESSION_ENDED_STATUS) && (
        <div className="mt-3 flex flex-wrap items-center gap-3">
          {problem.status === SESSION_ENDED_STATUS && (
            <a href={SIGN_IN_PATH} target="_blank" rel="noopener">
              Sign in in a new tab
            </a>
          )}
          {onRetry && (
            <Button small onClick={onRetry}>
              {retryLabel}
            </Button>
          )}
          {children}
        </div>
      )}
    </div>
  );
}

function whereOf(error: { readonly sheet?: string; readonly cell?: string }): string {
  return [error.sheet, error.cell].filter(Boolean).join('!');
}

interface NoticeProps {
  /** Blocks what comes next, as an open question does: the one case that carries the warning colour. */
  readonly blocking?: boolean;
  readonly children: ReactNode;
}

/** Something to read in its place on the page; it stays until it no longer holds. */
export function Notice({ blocking, children }: NoticeProps) {
  return <div className={classes('notice', blocking && 'notice-blocking')}>{children}</div>;
}
