import { newPasswordFault } from '../auth/passwords.ts';
import { err, ok, type Result } from '../../core/result.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';

/** The rule for a new password, with the words that belong to the person and would be guessed first. */
export function acceptNewPassword(
  field: string,
  password: string,
  person: { name: string; email: string },
  more: readonly string[] = [],
): Result<string, ServiceProblem> {
  const words = [person.name, person.email, ...more].flatMap((text) => text.split(/[^\p{L}\p{N}]+/u));
  const fault = newPasswordFault(password, words);
  if (fault === null) return ok(password);
  return err({
    kind: 'invalid',
    detail: 'The new password cannot be used. Nothing was changed.',
    errors: [{ field, code: 'password', message: fault }],
  });
}
