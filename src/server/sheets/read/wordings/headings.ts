/** Headings that say which statement or which section of it follows (from memory). */
import type { StatementPart } from '#core/statements/lineItems.ts';
import type { Section } from './lines.ts';

export const PART_HEADINGS: Readonly<Record<Exclude<StatementPart, 'memo'>, string>> = {
  income:
    'income statement|income|consolidated income statement|statement of income|statement of operations|statement of earnings|profit and loss|profit and loss account|profit and loss statement|profit or loss|statement of profit or loss|p and l|pnl|pl|p l|is|earnings|trading statement|Gewinn- und Verlustrechnung|Gewinn und Verlust|GuV|Erfolgsrechnung|Ergebnisrechnung|compte de résultat|compte de resultats|CR|cuenta de pérdidas y ganancias|pérdidas y ganancias|PyG|cuenta de resultados|resultaträkning|winst- en verliesrekening',
  balance:
    'balance sheet|balance sheets|balance|consolidated balance sheet|statement of financial position|financial position|bs|b s|Bilanz|Konzernbilanz|bilan|balance de situación|balance general|estado de situación financiera|balansräkning|balans',
  'cash-flow':
    'cash flow|cash flows|cashflow|cash flow statement|cashflow statement|statement of cash flows|statement of cash flow|consolidated statement of cash flows|consolidated cash flow statement|cf|cfs|scf|Kapitalflussrechnung|Cashflow Rechnung|tableau de flux|tableau des flux de trésorerie|tableau de flux de trésorerie|flux de trésorerie|estado de flujos de efectivo|flujos de efectivo|flujo de caja|estado de flujo de efectivo|kassaflödesanalys|kasstroomoverzicht',
};

export const SECTION_HEADINGS: Readonly<Record<Section, string>> = {
  assets: 'assets|Aktiva|Vermögen|Vermögenswerte|actif|activo|tillgångar',
  'current-assets':
    'current assets|short term assets|Umlaufvermögen|kurzfristige Vermögenswerte|kurzfristiges Vermögen|actif circulant|actifs courants|activo corriente|activo circulante|omsättningstillgångar',
  'non-current-assets':
    'non current assets|noncurrent assets|long term assets|fixed assets|fixed and lt assets|lt assets|Anlagevermögen|langfristige Vermögenswerte|langfristiges Vermögen|actif immobilisé|actifs non courants|activo no corriente|inmovilizado|anläggningstillgångar',
  equity:
    'equity|shareholders equity|stockholders equity|shareholders funds|capital and reserves|owners equity|Eigenkapital|capitaux propres|fonds propres|patrimonio neto|fondos propios|eget kapital',
  liabilities:
    'liabilities|total liabilities|Verbindlichkeiten|Fremdkapital|Schulden|Rückstellungen|Rückstellungen und Verbindlichkeiten|dettes|passif exigible|pasivo|skulder|equity and liabilities|liabilities and equity|Passiva|passif|liabilities and shareholders equity|liabilities and stockholders equity|patrimonio neto y pasivo|eget kapital och skulder',
  'current-liabilities':
    'current liabilities|short term liabilities|creditors due within one year|creditors amounts falling due within one year|kurzfristige Verbindlichkeiten|kurzfristige Schulden|passif circulant|passifs courants|dettes à court terme|pasivo corriente|pasivo circulante|kortfristiga skulder',
  'non-current-liabilities':
    'non current liabilities|noncurrent liabilities|long term liabilities|lt liabilities|creditors due after one year|creditors amounts falling due after more than one year|langfristige Verbindlichkeiten|langfristige Schulden|passifs non courants|dettes à long terme|pasivo no corriente|långfristiga skulder',
  operating:
    'operating activities|cash flows from operating activities|cash flow from operating activities|operations|laufende Geschäftstätigkeit|activités opérationnelles|exploitation|actividades de explotación|löpande verksamheten|den löpande verksamheten',
  investing:
    'investing activities|cash flows from investing activities|cash flow from investing activities|investing|Investitionstätigkeit|activités d’investissement|opérations d’investissement|actividades de inversión|investeringsverksamheten',
  financing:
    'financing activities|cash flows from financing activities|cash flow from financing activities|financing|Finanzierungstätigkeit|activités de financement|opérations de financement|actividades de financiación|finansieringsverksamheten',
};
