/** RFC 9457 problem details, one shape for every refusal. */
import type { APIContext } from 'astro';
import type { z } from 'zod';
import type { FieldError, ProblemBody, ServiceProblem } from '../../contracts/problem.ts';
import { unreachable } from '../../core/result.ts';

export interface PlainProblem {
  readonly status: number;
  readonly title: string;
  readonly detail: string;
  readonly errors?: readonly FieldError[];
  readonly currentVersion?: number;
  readonly retryAfterSeconds?: number;
}

/** `type` is a stable name of the kind of problem: the title in lower case, as a relative address. */
export const problemBody = (requestId: string, problem: PlainProblem): ProblemBody => ({
  type: `/problems/${problem.title.toLowerCase().replaceAll(/[^a-z]+/g, '-')}`,
  title: problem.title,
  status: problem.status,
  detail: problem.detail,
  instance: `urn:request:${requestId}`,
  ...(problem.errors && { errors: problem.errors }),
  ...(problem.currentVersion !== undefined && { currentVersion: problem.currentVersion }),
});

export function problemResponse(
  context: Pick<APIContext, 'locals'>,
  problem: ServiceProblem | PlainProblem,
): Response {
  const plain = plainProblem(problem);
  return new Response(JSON.stringify(problemBody(context.locals.requestId, plain)), {
    status: plain.status,
    headers: {
      'content-type': 'application/problem+json; charset=utf-8',
      ...(plain.retryAfterSeconds !== undefined && { 'retry-after': String(plain.retryAfterSeconds) }),
    },
  });
}

export const fieldErrors = (error: z.ZodError): FieldError[] =>
  error.issues.map((issue) => ({ field: issue.path.join('.'), code: issue.code, message: issue.message }));

export function invalidInput(context: Pick<APIContext, 'locals'>, error: z.ZodError): Response {
  return problemResponse(context, {
    status: 422,
    title: 'Cannot be used',
    detail: 'Some of what was sent cannot be used; each field says why. Nothing was changed.',
    errors: fieldErrors(error),
  });
}

/** Status, title and words of a problem, whichever shape it comes in. */
export const plainProblem = (problem: ServiceProblem | PlainProblem): PlainProblem =>
  'kind' in problem ? toPlain(problem) : problem;

function toPlain(problem: ServiceProblem): PlainProblem {
  switch (problem.kind) {
    case 'not-found':
      return { status: 404, title: 'Not found', detail: 'There is nothing here that you can see.' };
    case 'not-allowed':
      return { status: 403, title: 'Not allowed', detail: problem.detail };
    case 'not-signed-in':
      return { status: 401, title: 'Not signed in', detail: problem.detail };
    case 'gone':
      return { status: 410, title: 'No longer there', detail: problem.detail };
    case 'stale':
      return {
        status: 412,
        title: 'Changed since you looked',
        detail: problem.detail,
        currentVersion: problem.currentVersion,
      };
    case 'conflict':
      return { status: 409, title: 'Cannot be done now', detail: problem.detail };
    case 'invalid':
      return { status: 422, title: 'Cannot be used', detail: problem.detail, errors: problem.errors };
    case 'refused-file':
      return { status: 422, title: 'File refused', detail: problem.detail, errors: problem.errors };
    case 'too-many':
      return {
        status: 429,
        title: 'Too many tries',
        detail: problem.detail,
        retryAfterSeconds: problem.retryAfterSeconds,
      };
    default:
      return unreachable(problem);
  }
}
