import { dayText } from '../../core/calendar/printDay.ts';
import type { StatementView } from '../../contracts/borrowers.ts';
import { LINE_ITEMS, type LineItem, type StatementPart } from '../../core/statements/lineItems.ts';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { amountText, sourceHref } from './figures.ts';

const PART_NAMES: Readonly<Record<StatementPart, string>> = {
  income: 'Income statement',
  balance: 'Balance sheet',
  'cash-flow': 'Cash flow',
  memo: 'Memorandum',
};

interface StatementsTableProps {
  readonly part: StatementPart;
  /** Columns, newest first. */
  readonly statements: readonly StatementView[];
}

/** One part of the accounts, a column a version; every amount leads to its cell. */
export function StatementsTable({ part, statements }: StatementsTableProps) {
  const lines = (LINE_ITEMS as readonly LineItem[]).filter(
    (line) =>
      line.part === part && statements.some((statement) => statement.amounts[line.code] !== undefined),
  );
  if (lines.length === 0) return null;
  return (
    <ScrollRegion label={`${PART_NAMES[part]}, periods side by side`} className="accounts">
      <Table caption={`${PART_NAMES[part]}, whole currency units`} showCaption>
        <TableHead>
          <tr role="row">
            <HeadCell method="statement-checks">{PART_NAMES[part]}</HeadCell>
            {statements.map((statement) => (
              <HeadCell key={statement.id} numeric>
                <StatementHead statement={statement} />
              </HeadCell>
            ))}
          </tr>
        </TableHead>
        <TableBody>
          {lines.map((line) => (
            <Row key={line.code}>
              <th scope="row" role="rowheader">
                {line.subtotal ? <span className="type-name">{line.label}</span> : line.label}
              </th>
              {statements.map((statement) => (
                <Cell key={statement.id} numeric nowrap>
                  <Amount statement={statement} line={line.code} />
                </Cell>
              ))}
            </Row>
          ))}
        </TableBody>
      </Table>
    </ScrollRegion>
  );
}

function StatementHead({ statement }: { readonly statement: StatementView }) {
  return (
    <>
      {dayText(statement.periodEnd)}
      <span className="type-second type-small block">
        {statement.months === 0 ? 'balance' : `${statement.months} months`}, {statement.basis},{' '}
        {statement.currency}
      </span>
      <span className="type-second type-small block">
        version {statement.version}
        {!statement.inForce && ', superseded'}
        {statement.tie === 'does-not-tie' && ', does not tie'}
        {statement.tie === 'warning' && ', small differences'}
      </span>
    </>
  );
}

/** Missing and nought are different: a missing line says so to a screen reader and shows a dot. */
function Amount({ statement, line }: { readonly statement: StatementView; readonly line: string }) {
  const amount = statement.amounts[line];
  if (amount === undefined)
    return (
      <span className="type-second">
        <span aria-hidden="true">·</span>
        <span className="sr-only">missing</span>
      </span>
    );
  return (
    <a className="link-quiet" href={sourceHref(statement.id, line)}>
      {amountText(amount)}
    </a>
  );
}
