import { err, type Result } from '../../core/result.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';

/** Refused for a while; the same for a right and a wrong password, since it was not looked at. */
export const tooManyTries = (what: string, seconds: number): Result<never, ServiceProblem> =>
  err({
    kind: 'too-many',
    detail: `Too many tries to ${what}. Nothing was changed. Wait ${waitInWords(seconds)} and try again.`,
    retryAfterSeconds: seconds,
  });

function waitInWords(seconds: number): string {
  const minutes = Math.ceil(seconds / 60);
  return minutes === 1 ? 'a minute' : `${minutes} minutes`;
}
