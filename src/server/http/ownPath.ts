/** A place to go after signing in: a path of this product and nothing else. */
export function ownPath(text: string | null | undefined, otherwise: string): string {
  if (!text || !text.startsWith('/') || text.startsWith('//')) return otherwise;
  if (/[\\\p{Cc}]/u.test(text)) return otherwise;
  if (!URL.canParse(text, 'http://own.invalid')) return otherwise;
  const url = new URL(text, 'http://own.invalid');
  if (url.origin !== 'http://own.invalid' || url.pathname.startsWith('//')) return otherwise;
  if (url.pathname.startsWith('/api/') || url.pathname === '/sign-in') return otherwise;
  return url.pathname + url.search;
}
