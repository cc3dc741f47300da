import type { BridgeRow, CovenantView, SourceLink } from '../../contracts/borrowers.ts';
import { decimal } from '../../core/money/decimal.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { amountText, periodText, sourceHref } from './figures.ts';
import { MEASURE_METHODS } from './measureMethods.ts';

/** The way from reported to covenant figures, line by line, each to its cells. */
export function CovenantBridge({
  rows,
  measure,
}: {
  readonly rows: readonly BridgeRow[];
  readonly measure: CovenantView['measure'];
}) {
  const isTranslated = rows.some(({ kind }) => kind === 'rate');
  return (
    <section>
      <h3 className="type-heading">
        From reported to covenant figures <MethodLink topic={MEASURE_METHODS[measure]} />{' '}
        <MethodLink topic="twelve-months" />
        {isTranslated && (
          <>
            {' '}
            <MethodLink topic="other-currencies" />
          </>
        )}
      </h3>
      <ScrollRegion label="From reported to covenant figures">
        <Table caption="Bridge from reported to covenant figures, whole currency units">
          <TableHead>
            <tr role="row">
              <HeadCell>Line</HeadCell>
              <HeadCell numeric>Amount</HeadCell>
              <HeadCell>From</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {rows.map((row, at) => (
              <Row key={`${at} ${row.label}`}>
                <Cell>
                  {row.kind === 'subtotal' ? <span className="type-name">{row.label}</span> : row.label}
                  {row.kind === 'check' && <span className="type-second">, beside the sum</span>}
                  {row.note !== null && <p className="type-second">{row.note}</p>}
                </Cell>
                <Cell numeric>{row.kind === 'rate' ? row.amount : amountText(row.amount)}</Cell>
                <Cell>
                  {row.sources.map((source, at) => (
                    <span key={`${source.statementId} ${source.line} ${source.sign}`}>
                      {at > 0 && (source.sign === row.sources[0]?.sign ? ', ' : ' less ')}
                      <a href={sourceHref(source.statementId, source.line)}>
                        {linkText(source, row.sources)}
                      </a>
                    </span>
                  ))}
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </ScrollRegion>
    </section>
  );
}

/** The period; where two lines of one row have the same, the line too, so that no two links read alike. */
function linkText(source: SourceLink, all: readonly SourceLink[]): string {
  const period = periodText(source);
  const isAlone = all.every(
    (other) => other === source || other.line === source.line || periodText(other) !== period,
  );
  return isAlone ? period : `${source.label}, ${period}`;
}

/** The cells behind the latest test, folded; what is missing instead, where it could not be made. */
export function TestSources({ covenant }: { readonly covenant: CovenantView }) {
  if (covenant.missing.length > 0) return <p>Missing: {covenant.missing.join('; ')}.</p>;
  return (
    <details>
      <summary className="cursor-pointer">Figures behind this test</summary>
      <Table caption="Figures behind the latest test, each leads to its cell">
        <TableHead>
          <tr role="row">
            <HeadCell>Line</HeadCell>
            <HeadCell>Period</HeadCell>
            <HeadCell numeric>Amount</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {covenant.sources.map((source) => (
            <Row key={`${source.statementId} ${source.line} ${source.sign}`}>
              <Cell>
                <a href={sourceHref(source.statementId, source.line)}>{source.label}</a>
              </Cell>
              <Cell>{periodText(source)}</Cell>
              <Cell numeric>{amountText(decimal(source.amount).times(source.sign).toFixed())}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
    </details>
  );
}
