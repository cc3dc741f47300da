/** What answers without a session. Everything else asks for one; tests/api holds this list against every route. */
const OPEN_PAGES = ['/sign-in', '/set-up', '/forgot-password', '/reset-password', '/unsubscribe'];

/** Asked by whatever watches the process; what they say names nobody, and no session is looked up for them. */
const PROBES = ['/livez', '/readyz'];
export const isProbe = (path: string): boolean => PROBES.includes(path);

export const OPEN_ROUTES = [
  '/api/v1/session',
  '/api/v1/set-up',
  '/api/v1/password/forgot',
  '/api/v1/password/reset',
  '/api/v1/unsubscribe',
] as const;

/** Routes that no page belongs to: the answer is "not found" to everybody. */
const ERROR_PATTERNS = ['/404', '/500', '/[...path]', '/api/[...path]'];

export const isApi = (path: string): boolean => path === '/api' || path.startsWith('/api/');

export const isOpen = (path: string, routePattern: string): boolean => {
  const plain = path.length > 1 ? path.replace(/\/+$/, '') : path;
  return (
    OPEN_PAGES.includes(plain) ||
    isProbe(plain) ||
    (OPEN_ROUTES as readonly string[]).includes(plain) ||
    ERROR_PATTERNS.includes(routePattern)
  );
};
