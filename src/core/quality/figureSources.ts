import type { InputUsed } from '../statements/reading.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { accountsAt, type AccountsAt } from './accountsAt.ts';
import { LINE_FIGURES, readFigure } from './lineFigures.ts';
import type { PeerFigure, PeerInputs } from './peerFigures.ts';
import type { FigureSource, SourceCell } from './score.ts';
import { fScreen, mScreen } from './screenScores.ts';

/**
 * The way back from the figures of a quarter end to the cells of the statements, figure by figure: read once more, each
 * by itself. Figures that rest on no cell, such as a nought of what the borrower never had, are left out; so is accrual
 * noise, which rests on every quarter's cells.
 *
 * @example figureSources(book, { ...peer, figures: { revenue: 90000000 } }).map(({ cells }) => cells[0].line) // => ['revenue']
 */
export function figureSources(book: StatementBook, peer: PeerInputs): readonly FigureSource[] {
  const readers: readonly (readonly [PeerFigure, (accounts: AccountsAt) => unknown])[] = [
    ...LINE_FIGURES.map(
      (figure) => [figure, (accounts: AccountsAt) => readFigure(figure, accounts)] as const,
    ),
    ['mScore', (accounts) => mScreen(accounts, peer.mScoreForm !== 'M5')],
    ['fScore', fScreen],
  ];
  return readers.flatMap(([figure, read]) => {
    const amount = peer.figures[figure];
    if (amount === undefined) return [];
    const accounts = accountsAt(book, peer.quarterEnd);
    read(accounts);
    const cells = onceEach(accounts.cells());
    return cells.length === 0 ? [] : [{ figure, amount, cells }];
  });
}

/** Every cell once, by line and then by period. */
function onceEach(inputs: readonly InputUsed[]): readonly SourceCell[] {
  const cells = new Map<string, SourceCell>();
  for (const { statementId, line, periodEnd, months } of inputs)
    cells.set(`${statementId} ${line}`, { statementId, line, periodEnd, months });
  return [...cells.values()].sort(
    (a, b) => compareText(a.line, b.line) || compareText(a.periodEnd, b.periodEnd) || a.months - b.months,
  );
}

const compareText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);
