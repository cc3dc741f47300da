import { netDebtOn } from './debt.ts';
import { leverage } from './leverage.ts';

/** Net debt over adjusted EBITDA of twelve months. Source: methods.md A3. */
export const netLeverage = leverage({
  code: 'net-leverage',
  label: 'Net leverage',
  burden: 'net debt',
  debtOn: netDebtOn,
});
