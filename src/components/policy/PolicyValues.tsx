import type { ReactNode } from 'react';
import type { PolicyView } from '../../contracts/policy.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { policySetting } from '../../core/policySettings.ts';
import { Panel } from '../ui/Panel.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';

interface PolicyValuesProps {
  readonly view: PolicyView;
  readonly action: ReactNode;
}

/** Every value in force, and beside it what a confirmed later version will make of it. */
export function PolicyValues({ view, action }: PolicyValuesProps) {
  const later = view.versions.find(({ version }) => version === view.latest && version !== view.inForce);
  return (
    <Panel flush title={`In force: version ${view.inForce}`} aside={action}>
      <Table caption={`Values of the policy in force on ${dayText(view.day)}`} className="mt-2">
        <TableHead>
          <tr role="row">
            <HeadCell>Value</HeadCell>
            <HeadCell numeric>In force</HeadCell>
            {later?.validFrom && <HeadCell numeric>From {dayText(later.validFrom)}</HeadCell>}
          </tr>
        </TableHead>
        <TableBody>
          {view.values.map((value) => (
            <Row key={value.key}>
              <Cell>{policySetting(value.key).label}</Cell>
              <Cell numeric nowrap>
                <span className="type-name">{value.inForce}</span>
              </Cell>
              {later && (
                <Cell numeric nowrap>
                  {value.latestPrinted === value.inForce ? '' : value.latestPrinted}
                </Cell>
              )}
            </Row>
          ))}
        </TableBody>
      </Table>
    </Panel>
  );
}
