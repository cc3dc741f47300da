/**
 * The fixed texts that stand with every score, pattern, chart, mail and export. They are printed word for word; a
 * test fails where one is absent.
 */

/** With every score, chart and export. */
export const NO_FINDING_OF_MISCONDUCT =
  'This score describes how far reported earnings differ from cash and from peers. It is not evidence of misstatement or intent. Ordinary causes are common: growth, seasonality, acquisitions, changes of accounting policy, long contracts.';

/** With every just-passing pattern. */
export const POPULATION_NOT_BORROWER =
  'An excess of results just on the passing side is evidence about a group of tests. It cannot say which borrower, if any, managed its figures.';

/** With every covenant test. */
export const THE_AGREEMENT_GOVERNS =
  "Computed from the definitions recorded here (version, date, clause). The signed agreement and its amendments prevail. Only the lender's authorised persons, with counsel, determine what follows from a test not met.";

/** Where something is to be decided. */
export const HUMAN_DECISION_REQUIRED =
  'Underkeel decides nothing, files nothing and sends nothing to borrowers. A person decides; a score alone is never the ground.';

/** In the order in which they are printed where all of them stand. */
export const CAUTIONS = [
  NO_FINDING_OF_MISCONDUCT,
  POPULATION_NOT_BORROWER,
  THE_AGREEMENT_GOVERNS,
  HUMAN_DECISION_REQUIRED,
] as const;
