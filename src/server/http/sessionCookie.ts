/** The one cookie that signs a person in. */
import type { AstroCookies } from 'astro';
import { env } from '../config/env.ts';

const isHttps = (): boolean => new URL(env().APP_URL).protocol === 'https:';

/** `__Host-` binds the cookie to this host and to https; a browser refuses that name over plain http. */
const sessionCookieName = (): string => (isHttps() ? '__Host-underkeel' : 'underkeel');

const attributes = () => ({ httpOnly: true, sameSite: 'lax', path: '/', secure: isHttps() }) as const;

export const readSessionCookie = (cookies: AstroCookies): string | null =>
  cookies.get(sessionCookieName())?.value ?? null;

/** Without a Max-Age the cookie goes with the browser; the server ends the session by its own clock. */
export function setSessionCookie(cookies: AstroCookies, token: string): void {
  cookies.set(sessionCookieName(), token, attributes());
}

export function clearSessionCookie(cookies: AstroCookies): void {
  cookies.set(sessionCookieName(), '', { ...attributes(), maxAge: 0 });
}
