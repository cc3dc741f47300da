/** A4 across, as wide as the paper, with what it is and where it ends on every page. */
import type ExcelJS from 'exceljs';
import type { ReviewSheet } from '../../../core/reviewSheet.ts';

const PAPER_A4 = 9;
const NAME_MOST = 60;

export function pageSetup(
  sheet: Pick<ReviewSheet, 'borrowerName' | 'basisLine' | 'privateSide'>,
  { titleRows }: { readonly titleRows: string },
): Pick<ExcelJS.WorksheetProperties & Partial<ExcelJS.AddWorksheetOptions>, 'pageSetup' | 'headerFooter'> {
  return {
    pageSetup: {
      paperSize: PAPER_A4,
      orientation: 'landscape',
      fitToPage: true,
      fitToWidth: 1,
      fitToHeight: 0,
      printTitlesRow: titleRows,
      margins: { left: 0.35, right: 0.35, top: 0.45, bottom: 0.6, header: 0.2, footer: 0.3 },
    },
    headerFooter: {
      oddFooter: `&L&8DRAFT, ${footerText(sheet.basisLine)}&C&8${footerText(named(sheet))}&R&8Page &P of &N`,
    },
  };
}

const named = ({ borrowerName, privateSide }: Pick<ReviewSheet, 'borrowerName' | 'privateSide'>): string =>
  `${borrowerName.slice(0, NAME_MOST)}${privateSide === null ? '' : ' (private side)'}`;

/** An ampersand begins a code in a footer; a digit at the start would be read as its size. */
const footerText = (text: string): string => {
  const plain = text.replaceAll(/\p{C}/gu, ' ').replaceAll('&', '&&');
  return /^\d/.test(plain) ? ` ${plain}` : plain;
};
