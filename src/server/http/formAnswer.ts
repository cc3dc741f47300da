/**
 * What a plain form is told: the API route answers 303, and the page it leads to shows what was wrong beside the
 * fields, with what was typed. It travels in a cookie of two minutes that only the server reads. Passwords never
 * go in.
 */
import type { AstroCookies } from 'astro';
import { z } from 'zod';
import { env } from '../config/env.ts';

const formAnswer = z.object({
  /** The page it is for; another page does not show it. */
  page: z.string(),
  detail: z.string(),
  errors: z.array(z.object({ field: z.string(), message: z.string() })),
  typed: z.record(z.string(), z.string()),
});
export type FormAnswer = z.infer<typeof formAnswer>;

/** A browser keeps 4,096 bytes of a cookie, name and attributes included. */
const MOST_CHARACTERS = 3_800;
const KEPT_SECONDS = 120;

const isHttps = (): boolean => new URL(env().APP_URL).protocol === 'https:';
const cookieName = (): string => (isHttps() ? '__Host-underkeel-form' : 'underkeel-form');
const attributes = () => ({ httpOnly: true, sameSite: 'lax', path: '/', secure: isHttps() }) as const;

/** Where all does not fit, the typed text gives way: the message is what the reader needs. */
export function keepAnswer(cookies: AstroCookies, answer: FormAnswer): void {
  const whole = encode(answer);
  const value = whole.length <= MOST_CHARACTERS ? whole : encode({ ...answer, typed: {} });
  cookies.set(cookieName(), value, { ...attributes(), maxAge: KEPT_SECONDS });
}

/** The answer that waits for this page, shown once. */
export function takeAnswer(cookies: AstroCookies, page: string): FormAnswer | null {
  const value = cookies.get(cookieName())?.value;
  if (!value) return null;
  cookies.set(cookieName(), '', { ...attributes(), maxAge: 0 });
  const answer = decode(value);
  return answer?.page === page ? answer : null;
}

const encode = (answer: FormAnswer): string => Buffer.from(JSON.stringify(answer)).toString('base64url');

/** Anybody can send any cookie: what is not an answer of ours is no answer. */
function decode(value: string): FormAnswer | null {
  try {
    const parsed = formAnswer.safeParse(JSON.parse(Buffer.from(value, 'base64url').toString()));
    return parsed.success ? parsed.data : null;
  } catch (error) {
    if (error instanceof SyntaxError) return null;
    throw error;
  }
}
