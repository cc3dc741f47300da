import type { Statement } from '../statements/statement.ts';

/**
 * Whether a statement is under IFRS 18, which moves interest and dividends out of cash from operations. Two figures are
 * comparable within one rule only.
 *
 * @example isUnderNewPresentation({ ...statements[0], framework: 'IFRS 18' }) // => true
 */
const isUnderNewPresentation = ({ framework }: Pick<Statement, 'framework'>): boolean =>
  /IFRS\s*18/i.test(framework);

/**
 * Whether flows under both rules stand among the statements.
 *
 * @example mixesPresentations(statements) // => false
 */
export function mixesPresentations(statements: readonly Statement[]): boolean {
  const flows = statements.filter(({ months }) => months > 0);
  const underNewRule = flows.filter(isUnderNewPresentation).length;
  return underNewRule > 0 && underNewRule < flows.length;
}
