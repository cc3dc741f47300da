import { seniorDebt } from './debt.ts';
import { leverage } from './leverage.ts';

/** Short-term and senior debt over adjusted EBITDA of twelve months. Source: methods.md A3. */
export const seniorLeverage = leverage({
  code: 'senior-leverage',
  label: 'Senior leverage',
  burden: 'senior debt',
  debtOn: seniorDebt,
});
