import { lineItem, type LineItemCode } from '../statements/lineItems.ts';
import { NOW, type AccountsAt, type Back } from './accountsAt.ts';

/**
 * Figures for one measure, every gap noted by name. A missing figure is not a number, and so is all that is reckoned
 * with it: whoever reads asks for the gaps before believing a result.
 */
export interface FigureReader {
  readonly balance: (line: LineItemCode, back?: Back) => number;
  /** Nought for a line that the borrower had never carried by then. */
  readonly optionalBalance: (line: LineItemCode, back?: Back) => number;
  readonly flow: (line: LineItemCode, back?: Back) => number;
  readonly optionalFlow: (line: LineItemCode, back?: Back) => number;
  /** Undefined where it is missing, and nothing noted: for what may be filled. */
  readonly accounts: AccountsAt;
  /** Why nothing can be said; null where every figure is there. */
  readonly gap: () => string | null;
}

/** Accounts that do not tie are excluded from every comparison: methods.md A2. */
const DOES_NOT_TIE = 'rests on accounts that do not tie';

/**
 * A reader of one borrower's figures around a quarter end.
 *
 * @example figureReader(accounts).gap() // => null
 */
export function figureReader(accounts: AccountsAt): FigureReader {
  const missing = new Set<string>();
  const noting =
    (
      read: (line: LineItemCode, back?: Back) => number | undefined,
      named: (line: LineItemCode, back: Back) => string,
    ) =>
    (line: LineItemCode, back: Back = NOW): number => {
      const value = read(line, back);
      if (value === undefined) missing.add(`${named(line, back)}${ago(back)}`);
      return value ?? NaN;
    };
  // One sheet that is not there is one gap, however many lines of it are asked for.
  const balanceName = (line: LineItemCode, back: Back): string =>
    accounts.hasBalanceSheet(back) ? inText(line) : 'the balance sheet';
  const flowName = (line: LineItemCode): string => `${inText(line)} over twelve months`;
  return {
    balance: noting(accounts.balance, balanceName),
    optionalBalance: noting(accounts.optionalBalance, balanceName),
    flow: noting(accounts.twelveMonths, flowName),
    optionalFlow: noting(accounts.optionalTwelveMonths, flowName),
    accounts,
    gap: () => {
      if (missing.size > 0) return `missing: ${[...missing].join(', ')}`;
      return accounts.used().some(({ tie }) => tie === 'does-not-tie') ? DOES_NOT_TIE : null;
    },
  };
}

/** A label within a sentence. */
function inText(line: LineItemCode): string {
  const { label } = lineItem(line);
  return label.charAt(0).toLowerCase() + label.slice(1);
}

function ago({ months }: Back): string {
  if (months === 0) return '';
  return months === 12 ? ' a year ago' : months === 24 ? ' two years ago' : ` ${months} months ago`;
}
