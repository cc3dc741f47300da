/** What every route reads from a request in the same way, and the refusals that go with it. */
import type { Action } from '../auth/policy.ts';
import { err, ok, type Result } from '../../core/result.ts';
import type { PlainProblem } from './problem.ts';

/** Visible ASCII, as a header can carry it, no longer than the column that keeps it. */
const IDEMPOTENCY_KEY = /^[\x21-\x7e]{1,100}$/;

export const SIGN_IN_FIRST: PlainProblem = {
  status: 401,
  title: 'Sign in first',
  detail:
    'Your session has ended or you are not signed in. Nothing was changed. Sign in and send this again.',
};

export const roleMayNot = (action: Action): PlainProblem => ({
  status: 403,
  title: 'Not allowed',
  detail: `Your role may not do this (${action}). Nothing was changed.`,
});

export const givenTwice = (name: string): PlainProblem => ({
  status: 422,
  title: 'Cannot be used',
  detail: `${name.slice(0, 60)} is given more than once, and which one counts would be a guess. Nothing was changed. Send it once.`,
  errors: [{ field: name.slice(0, 60), code: 'given-twice', message: 'Send it once.' }],
});

export function idempotencyKey(request: Request): Result<string | null, PlainProblem> {
  const key = request.headers.get('idempotency-key');
  if (key === null || IDEMPOTENCY_KEY.test(key)) return ok(key);
  return err({
    status: 400,
    title: 'Key cannot be used',
    detail:
      'Idempotency-Key takes 1 to 100 visible ASCII characters. Nothing was changed. Send another key, a UUID for instance.',
  });
}

/** The first name that occurs twice, or null. */
export function repeatedName(entries: Iterable<readonly [string, unknown]>): string | null {
  const seen = new Set<string>();
  for (const [name] of entries) {
    if (seen.has(name)) return name;
    seen.add(name);
  }
  return null;
}

export const mediaType = (request: Request): string =>
  (request.headers.get('content-type') ?? '').split(';')[0]?.trim().toLowerCase() ?? '';

/** A browser that went to an address, and shows what comes back: it wants a page, not a problem as JSON. */
export const wantsPage = (request: Request): boolean =>
  (request.headers.get('accept') ?? '').includes('text/html');

export async function readJson(request: Request): Promise<Result<unknown, PlainProblem>> {
  if (mediaType(request) !== 'application/json')
    return err({
      status: 415,
      title: 'Wrong content type',
      detail: 'This address takes application/json. Nothing was changed.',
    });
  try {
    return ok(await request.json());
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error;
    return err({
      status: 400,
      title: 'Not JSON',
      detail: 'The body cannot be read as JSON. Nothing was changed.',
    });
  }
}
