import type { LineItemCode } from './lineItems.ts';
import type { InputUsed } from './reading.ts';
import type { Statement } from './statement.ts';
import type { StatementBook } from './statementBook.ts';

/**
 * The cells of one statement that make up a line, or null where the line is not there. Blank is not zero.
 *
 * `depreciation_and_amortisation` is the one line that sheets give either whole or in parts: depreciation and
 * amortisation where both are there, else the sum as the sheet gives it, else depreciation alone, as
 * long as the borrower has shown no amortisation. It is put together here and nowhere else.
 *
 * @example lineInputs(book, statements[0], 'revenue')?.length // => 1
 */
export function lineInputs(
  book: StatementBook,
  statement: Statement,
  line: LineItemCode,
): readonly InputUsed[] | null {
  if (line !== 'depreciation_and_amortisation') return oneCell(statement, line);
  return (
    cells(statement, ['depreciation', 'amortisation']) ??
    cells(statement, ['depreciation_and_amortisation']) ??
    (book.isCarriedBy('amortisation', statement.periodEnd) ? null : cells(statement, ['depreciation']))
  );
}

function oneCell(
  { id: statementId, periodEnd, months, amounts }: Statement,
  line: LineItemCode,
): readonly InputUsed[] | null {
  const amount = amounts[line];
  return amount ? [{ statementId, line, sign: 1, amount, periodEnd, months }] : null;
}

function cells(statement: Statement, lines: readonly LineItemCode[]): readonly InputUsed[] | null {
  const { id: statementId, periodEnd, months } = statement;
  const inputs: InputUsed[] = [];
  for (const line of lines) {
    const amount = statement.amounts[line];
    if (!amount) return null;
    inputs.push({ statementId, line, sign: 1, amount, periodEnd, months });
  }
  return inputs;
}
