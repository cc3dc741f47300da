import type { SourceCellView } from '../../contracts/borrowers.ts';
import { Panel } from '../ui/Panel.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { cellHref } from './cellHref.ts';

/** The cells that one amount was added up from. */
export function SourceCells({ cells }: { readonly cells: readonly SourceCellView[] }) {
  return (
    <Panel flush label="Source cells">
      <Table caption="Cells that this amount was added up from">
        <TableHead>
          <tr role="row">
            <HeadCell>Cell</HeadCell>
            <HeadCell>Row</HeadCell>
            <HeadCell numeric>As sent</HeadCell>
            <HeadCell>File</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {cells.map((source) => (
            <Row key={`${source.sheet}!${source.cell}`}>
              <Cell nowrap>
                {source.importId === null ? (
                  `${source.sheet}!${source.cell}`
                ) : (
                  <a href={cellHref(source.importId, source)}>
                    {source.sheet}!{source.cell}
                  </a>
                )}
              </Cell>
              <Cell>{source.label}</Cell>
              <Cell numeric>
                {source.rawText}
                {source.fromFormula && <span className="type-second type-small block">from a formula</span>}
              </Cell>
              <Cell>{source.fileName ?? 'entered by hand'}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
    </Panel>
  );
}
