/** ISO 17442 legal entity identifiers and their check digits (ISO/IEC 7064, MOD 97-10). */

const FIRST_18 = /^[A-Z0-9]{18}$/;
const LEI = /^[A-Z0-9]{18}\d{2}$/;

/** Digits stand for themselves, A to Z for 10 to 35; the remainder is carried digit by digit. */
function remainder97(text: string): number {
  let remainder = 0;
  for (const character of text)
    for (const digit of parseInt(character, 36).toString()) remainder = (remainder * 10 + Number(digit)) % 97;
  return remainder;
}

/**
 * The two check digits that make eighteen characters a legal entity identifier: 98 minus the remainder of the
 * eighteen followed by 00, modulo 97.
 *
 * Throws RangeError unless the text is eighteen of A to Z and 0 to 9. Source: ISO/IEC 7064 MOD 97-10 as ISO 17442
 * uses it.
 *
 * @example leiCheckDigits('ZZ0000UKEEL000000A') // => '65'
 */
export function leiCheckDigits(first18: string): string {
  if (!FIRST_18.test(first18))
    throw new RangeError(`leiCheckDigits requires eighteen capitals or digits: ${first18}`);
  return String(98 - remainder97(`${first18}00`)).padStart(2, '0');
}

/**
 * Whether the text is a legal entity identifier with right check digits: the whole number modulo 97 is 1. Says
 * nothing about whether anybody holds the code. Positions 1 to 6 may be letters or digits.
 *
 * Source: ISO 17442, ISO/IEC 7064 MOD 97-10.
 *
 * @example isLei('ZZ0000UKEEL000000A65') // => true
 */
export const isLei = (text: string): boolean => LEI.test(text) && remainder97(text) === 1;
