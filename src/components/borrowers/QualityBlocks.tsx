import { dayText } from '../../core/calendar/printDay.ts';
import type { QuarterScore } from '../../core/quality/score.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Panel } from '../ui/Panel.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { BLOCK_TOPICS, rowsOf } from './qualityRows.ts';

/** The figures behind each block of the latest quarter end, beside a year ago and the peers. */
export function QualityBlocks({ latest }: { readonly latest: QuarterScore }) {
  const rows = latest.blocks.flatMap((block) => rowsOf(block).map((row) => ({ block, row })));
  if (rows.length === 0) return null;
  return (
    <Panel title="Figures and peers">
      <ScrollRegion label="Figures of the blocks beside the peers">
        <Table caption={`Figures of the quarter to ${dayText(latest.quarterEnd)} beside the peers`}>
          <TableHead>
            <tr role="row">
              <HeadCell>Figure</HeadCell>
              <HeadCell numeric>Now</HeadCell>
              <HeadCell numeric>A year ago</HeadCell>
              <HeadCell numeric>Peers’ median</HeadCell>
              <HeadCell numeric method="peer-standing">
                Standing
              </HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {rows.map(({ block, row }, at) => (
              <Row key={row.label}>
                <Cell>
                  {row.label}
                  {rows[at - 1]?.block !== block && (
                    <>
                      {' '}
                      <MethodLink topic={BLOCK_TOPICS[block.name]} />
                    </>
                  )}
                </Cell>
                <Cell numeric>{row.now}</Cell>
                <Cell numeric>{row.yearAgo}</Cell>
                <Cell numeric>{row.peers}</Cell>
                <Cell numeric>{row.standing}</Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </ScrollRegion>
      <p className="type-second mt-2">
        Standing: of a hundred firms, how many have less. Flows are twelve months, days the latest quarters;
        each is held against the same quarter a year before.
      </p>
    </Panel>
  );
}
