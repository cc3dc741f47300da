/** Signing in, the forgotten and the changed password, and the first set-up, as they cross the wire. */
import { z } from './zod.ts';

/** Longer than any address of mail, and than any password that can be set. */
const MOST_TYPED = 1_024;

const mailAddress = z
  .string({ error: 'Type your email address.' })
  .trim()
  .max(254, 'An email address has at most 254 characters.')
  .pipe(z.email('This is not an email address. Type one like name@lender.example.'));

/** The server knows whether it is right; here it only has to be there. */
const typedPassword = z
  .string({ error: 'Type your password.' })
  .min(1, 'Type your password.')
  .max(MOST_TYPED, `A password has at most ${MOST_TYPED} characters here.`);

const newPassword = z
  .string({ error: 'Type a new password.' })
  .min(1, 'Type a new password.')
  .max(MOST_TYPED, 'Use at most 128 characters.');

const linkToken = z
  .string({ error: 'Open the link again: its last part is missing.' })
  .regex(/^[A-Za-z0-9_-]{43}$/, 'Open the link again: its last part is missing.');

export const signInForm = z.object({
  email: z
    .string({ error: 'Type your email address.' })
    .trim()
    .min(1, 'Type your email address.')
    .max(MOST_TYPED, 'An email address has at most 254 characters.'),
  password: typedPassword,
  /** Where to go after; a path of this product, checked before it is used. */
  next: z.string().max(2_000).optional(),
});
export type SignIn = z.infer<typeof signInForm>;

export const forgottenPassword = z.object({ email: mailAddress });
export type ForgottenPassword = z.infer<typeof forgottenPassword>;

export const passwordReset = z.object({ token: linkToken, newPassword });
export type PasswordReset = z.infer<typeof passwordReset>;

export const passwordChange = z.object({ currentPassword: typedPassword, newPassword });
export type PasswordChange = z.infer<typeof passwordChange>;

const name = (what: string, most: number) =>
  z
    .string({ error: `Type ${what}.` })
    .trim()
    .min(1, `Type ${what}.`)
    .max(most, `Use at most ${most} characters.`)
    .regex(/^\P{Cc}*$/u, 'Use letters, digits and marks only: something here cannot be printed.');

export const firstSetUp = z.object({
  token: linkToken,
  lenderName: name('the lender’s name', 200),
  zone: z
    .string({ error: 'Choose a time zone.' })
    .refine(isTimeZone, 'Choose a time zone from the list, such as Europe/Amsterdam.'),
  personName: name('your name', 200),
  email: mailAddress,
  password: newPassword,
  deskName: name('the first desk’s name', 120),
});
export type FirstSetUp = z.infer<typeof firstSetUp>;

/** A mail program sends the second (RFC 8058) and has the token in the address; our own page sends the first. */
export const unsubscribeForm = z.object({
  token: linkToken.optional(),
  'List-Unsubscribe': z.literal('One-Click').optional(),
});

export const digestChoice = z.object({ digest: z.enum(['wanted', 'not wanted']) });

/** Asked of the platform itself: its list and what it accepts differ by the old names. */
function isTimeZone(zone: string): boolean {
  if (!/^[A-Za-z][A-Za-z0-9_+/-]{0,63}$/.test(zone)) return false;
  try {
    new Intl.DateTimeFormat('en', { timeZone: zone });
    return true;
  } catch (error) {
    if (error instanceof RangeError) return false;
    throw error;
  }
}
