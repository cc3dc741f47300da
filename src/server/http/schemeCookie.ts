import type { AstroCookies } from 'astro';
import { SCHEME_COOKIE, type Scheme } from '../../contracts/scheme.ts';
import { env } from '../config/env.ts';

const SECONDS_IN_A_YEAR = 31_536_000;

/** Kept on this device for a year; only the server reads it. */
export function setSchemeCookie(cookies: AstroCookies, scheme: Scheme): void {
  cookies.set(SCHEME_COOKIE, scheme, {
    httpOnly: true,
    sameSite: 'lax',
    path: '/',
    secure: new URL(env().APP_URL).protocol === 'https:',
    maxAge: SECONDS_IN_A_YEAR,
  });
}
