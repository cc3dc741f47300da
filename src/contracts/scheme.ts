/** Day or night, kept in a cookie so that the server draws the right scheme without a script. */
import { z } from './zod.ts';

export const SCHEMES = ['day', 'night', 'system'] as const;
export type Scheme = (typeof SCHEMES)[number];

export const SCHEME_COOKIE = 'underkeel-scheme';

/** An own page to go back to: one slash first, so that no other host can be named. */
const ownPath = z
  .string()
  .max(2_000)
  .regex(/^\/(?![/\\])[^\r\n\\]*$/);

export const schemeForm = z.object({ scheme: z.enum(SCHEMES), back: ownPath.catch('/') });
/** The cookie's scheme; anything else follows the system's setting. */
export function schemeOf(cookie: string | undefined): Scheme {
  return SCHEMES.find((scheme) => scheme === cookie) ?? 'system';
}
