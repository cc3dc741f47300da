/** Signing in as the people of the demo desk, and reading their mail. */
import { inject } from 'vitest';
import { signedIn, type Client } from './client.ts';
import type { DemoSignIn } from './product.ts';
import type { SunkMail } from '../../jobs/mailSinkPages.ts';

/** The first sign-in whose part begins so: 'analyst', 'head of Northern desk', 'auditor'. */
export function demoSignIn(part: string): DemoSignIn {
  const signIns = inject('demoSignIns');
  const found = signIns.find(({ role }) => role.startsWith(part));
  if (!found) throw new Error(`nobody is "${part}"; there are ${signIns.map(({ role }) => role).join('; ')}`);
  return found;
}

export function signInAs(part: string): Promise<Client> {
  const { email, password } = demoSignIn(part);
  return signedIn(email, password);
}

/** Everything in the sink, the oldest first. */
export async function sunkMail(): Promise<SunkMail[]> {
  const answer = await fetch(`${inject('sinkUrl')}/messages.json`);
  return (await answer.json()) as SunkMail[];
}

/** Waits for a mail that fits; throws after the time with what there was. */
export async function mailThat(fits: (mail: SunkMail) => boolean, seconds = 20): Promise<SunkMail> {
  for (let waited = 0; ; waited += 1) {
    const mails = await sunkMail();
    const found = mails.find(fits);
    if (found) return found;
    if (waited >= seconds * 5)
      throw new Error(
        `no such mail in ${seconds} s; there are ${mails.map(({ subject }) => subject).join('; ')}`,
      );
    await new Promise((resume) => setTimeout(resume, 200));
  }
}
