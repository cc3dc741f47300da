/** Words as they are compared: without accents, marks, case and numbering. */

/** 'Umsatzerlöse', 'Umsatzerloese' and 'UMSATZERLÖSE' become one; so do 'Bénéfices' and 'benefices'. */
export function plainText(text: string): string {
  return text
    .toLowerCase()
    .replace(/ß/g, 'ss')
    .replace(/œ/g, 'oe')
    .replace(/æ/g, 'ae')
    .replace(/ø/g, 'oe')
    .normalize('NFKD')
    .replace(/[\u0300-\u036f]/g, '')
    .replace(/ae/g, 'a')
    .replace(/oe/g, 'o')
    .replace(/ue/g, 'u');
}

/** '1.', 'II.', 'A.', '1.2.3', 'a)' before a label are its number, not its words. */
const NUMBERING =
  /^\s*(?:(?:\d{1,2}[.)])+\d{0,2}[.)]?\s+|\d+(?:\.\d+)+\s+|[ivx]{1,4}[.)]\s+|[a-h][.)]\s+|\((?:[a-h]|[ivx]{1,4}|\d{1,2})\)\s+)+/i;

/** The account number that a label begins with, '4000' of '4000 Sales'. */
const ACCOUNT_NUMBER = /^\s*\d{3,8}\s+(?=\D)/;

export function plainLabel(label: string): string {
  const words = label.replace(/\s+/g, ' ').replace(ACCOUNT_NUMBER, '').replace(NUMBERING, '');
  return plainText(words)
    .replace(/\((?:note|notes|anm\.?|anhang)\s*\d+[a-z]?\)/g, ' ')
    .replace(/&|\+/g, ' and ')
    .replace(/r and d\b/g, 'rnd')
    .replace(/\bsg and a\b/g, 'sga')
    .replace(/\bd and a\b/g, 'dna')
    .replace(/['’`´]/g, ' ')
    .replace(/[^a-z0-9]+/g, ' ')
    .trim()
    .replace(/ +/g, ' ');
}
