import { totalDebt } from './debt.ts';
import { leverage } from './leverage.ts';

/** Total debt over adjusted EBITDA of twelve months. Source: methods.md A3. */
export const totalLeverage = leverage({
  code: 'total-leverage',
  label: 'Total leverage',
  burden: 'debt',
  debtOn: totalDebt,
});
