/**
 * One address and nothing else. Mail libraries read lists, groups, comments and quoted parts out of an address, so
 * that mail for one reader can go to another: only the plain form passes (RFC 5321 4.1.2, dot-string local part).
 */
const LOCAL = /^[a-z0-9!#$%&'*+/=?^_`{|}~-]+(\.[a-z0-9!#$%&'*+/=?^_`{|}~-]+)*$/i;
const DOMAIN = /^([a-z0-9]([a-z0-9-]{0,61}[a-z0-9])?\.)+[a-z]([a-z0-9-]{0,61}[a-z0-9])?$/i;

export function isSingleAddress(text: string): boolean {
  const parts = text.split('@');
  const [local = '', domain = ''] = parts;
  return (
    parts.length === 2 && text.length <= 254 && local.length <= 64 && LOCAL.test(local) && DOMAIN.test(domain)
  );
}

/** A name or subject on one line. */
export const oneLine = (text: string): string => text.replaceAll(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ').trim();
