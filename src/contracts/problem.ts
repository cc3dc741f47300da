/**
 * Why a request was not done. Services return these; src/server/http turns them into RFC 9457 problem details,
 * and the browser shows `detail`. A message says what happened, why, what to do, and what was not changed.
 */
export type ServiceProblem =
  | { readonly kind: 'not-found'; readonly what: string }
  | { readonly kind: 'not-allowed'; readonly detail: string }
  /** The name or the password is wrong; the answer does not say which. */
  | { readonly kind: 'not-signed-in'; readonly detail: string }
  /** A link that was used up or has run out. */
  | { readonly kind: 'gone'; readonly detail: string }
  | { readonly kind: 'stale'; readonly detail: string; readonly currentVersion: number }
  | { readonly kind: 'conflict'; readonly detail: string }
  | { readonly kind: 'invalid'; readonly detail: string; readonly errors: readonly FieldError[] }
  | {
      readonly kind: 'refused-file';
      readonly detail: string;
      readonly code: string;
      readonly errors: readonly FieldError[];
    }
  | { readonly kind: 'too-many'; readonly detail: string; readonly retryAfterSeconds: number };

/** Where in the request (or the workbook) the fault is. */
export interface FieldError {
  readonly field?: string;
  readonly sheet?: string;
  readonly cell?: string;
  readonly code: string;
  readonly message: string;
}

/** RFC 9457 body as it crosses the wire. */
export interface ProblemBody {
  readonly type: string;
  readonly title: string;
  readonly status: number;
  readonly detail: string;
  readonly instance: string;
  readonly errors?: readonly FieldError[];
  readonly currentVersion?: number;
}
