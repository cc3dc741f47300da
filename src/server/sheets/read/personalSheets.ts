/** Sheets that hold personal data are neither read nor shown: a lender has no need of them. */
import type { SheetGrid } from './cells.ts';

const NAMES =
  /(?<![a-z])(?:payroll|salar(?:y|ies)|wage list|personnel list|employee list|staff list|gehalt\w*|lohn\w*|personalliste|paie|salaires|nomina\w*)(?![a-z])/i;
const HEADINGS =
  /(?<![a-z])(?:iban|date of birth|birth date|geburtsdatum|social security (?:number|no)|national insurance|tax id|passport|home address|sozialversicherungsnummer|date de naissance|fecha de nacimiento)(?![a-z])/i;
const IBAN = /(?<![A-Z])[A-Z]{2}\d{2}(?: ?[A-Z0-9]{4}){3,7}(?: ?[A-Z0-9]{1,4})?(?![A-Z0-9])/;

export function holdsPersonalData(sheet: SheetGrid): boolean {
  const cells = [...sheet.rows.values()].flatMap((row) => [...row.values()]);
  const ibans = cells.filter(({ kind, text }) => kind === 'text' && IBAN.test(text)).length;
  const headings = cells.filter(
    ({ kind, text }) => kind === 'text' && text.length < 60 && HEADINGS.test(text),
  ).length;
  return (
    NAMES.test(sheet.name.normalize('NFKD').replace(/[\u0300-\u036f]/g, '')) || ibans >= 2 || headings >= 2
  );
}
