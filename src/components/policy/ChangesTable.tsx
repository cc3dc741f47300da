import type { PolicyChangeRow } from '../../contracts/policy.ts';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';

interface ChangesTableProps {
  readonly caption: string;
  readonly changes: readonly PolicyChangeRow[];
}

/** What a change does: each value before and after. */
export function ChangesTable({ caption, changes }: ChangesTableProps) {
  return (
    <Table caption={caption}>
      <TableHead>
        <tr role="row">
          <HeadCell>Value</HeadCell>
          <HeadCell numeric>Before</HeadCell>
          <HeadCell numeric>After</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {changes.map((change) => (
          <Row key={change.key}>
            <Cell>{change.label}</Cell>
            <Cell numeric nowrap>
              {change.before}
            </Cell>
            <Cell numeric nowrap>
              <span className="type-name">{change.after}</span>
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
