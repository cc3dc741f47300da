import { decimal } from '../../core/money/decimal.ts';
import { figureName } from '../../core/quality/missingFigures.ts';
import type { FigureSource, SourceCell } from '../../core/quality/score.ts';
import { lineItem } from '../../core/statements/lineItems.ts';
import { Panel } from '../ui/Panel.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { amountText, periodText, sourceHref } from './figures.ts';
import { plainScore } from './plainScore.ts';

/** The way back from the score's figures to the cells of the statements, folded. */
export function QualitySources({ sources }: { readonly sources: readonly FigureSource[] }) {
  if (sources.length === 0) return null;
  return (
    <Panel title="Where the figures come from">
      <details>
        <summary className="cursor-pointer">Figures of the latest quarter end, each to its cells</summary>
        <ScrollRegion label="Figures and their cells">
          <Table caption="Figures of the latest quarter end, whole currency units, paid items positive">
            <TableHead>
              <tr role="row">
                <HeadCell>Figure</HeadCell>
                <HeadCell numeric>Amount</HeadCell>
                <HeadCell>From</HeadCell>
              </tr>
            </TableHead>
            <TableBody>
              {sources.map(({ figure, amount, cells }) => (
                <Row key={figure}>
                  <Cell>{capitalised(figureName(figure))}</Cell>
                  <Cell numeric>
                    {figure === 'mScore' || figure === 'fScore'
                      ? plainScore(amount)
                      : amountText(decimal(Math.round(amount)).toFixed())}
                  </Cell>
                  <Cell>
                    <Cells cells={cells} />
                  </Cell>
                </Row>
              ))}
            </TableBody>
          </Table>
        </ScrollRegion>
      </details>
    </Panel>
  );
}

/** By line, so that a label stands once before its periods. */
function Cells({ cells }: { readonly cells: readonly SourceCell[] }) {
  const lines = [...new Set(cells.map(({ line }) => line))];
  return (
    <ul>
      {lines.map((line) => (
        <li key={line}>
          {lineItem(line).label}:{' '}
          {cells
            .filter((cell) => cell.line === line)
            .map((cell, at) => (
              <span key={`${cell.statementId}`}>
                {at > 0 && ', '}
                <a
                  href={sourceHref(cell.statementId, line)}
                  aria-label={`${lineItem(line).label}, ${periodText(cell)}`}
                >
                  {periodText(cell)}
                </a>
              </span>
            ))}
        </li>
      ))}
    </ul>
  );
}

const capitalised = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
