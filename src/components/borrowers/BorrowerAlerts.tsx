import type { AlertRow } from '../../contracts/alerts.ts';
import { AlertMark, alertKindText } from '../marks/AlertMark.tsx';
import { dueText, stateText } from '../alerts/alertWords.ts';
import { Panel } from '../ui/Panel.tsx';
import { EmptyState } from '../ui/States.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';

/** The borrower's open alerts, gravest first; each opens with its evidence. */
export function BorrowerAlerts({
  alerts,
  today,
}: {
  readonly alerts: readonly AlertRow[];
  readonly today: string;
}) {
  return (
    <Panel flush label="Open alerts">
      {alerts.length === 0 ? (
        <EmptyState title="No open alert">The last assessment found nothing to raise.</EmptyState>
      ) : (
        <Table caption="Open alerts of this borrower" entries>
          <TableHead>
            <tr role="row">
              <HeadCell label="Mark" />
              <HeadCell>Alert</HeadCell>
              <HeadCell>Severity</HeadCell>
              <HeadCell>Owner</HeadCell>
              <HeadCell>Due</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {alerts.map((alert) => (
              <Row key={alert.id}>
                <Cell entry="mark">
                  <AlertMark kind={alert.kind} />
                </Cell>
                <NameCell
                  name={alertKindText(alert.kind)}
                  href={`/alerts/${alert.id}`}
                  beside={stateText(alert)}
                  second={alert.sentence}
                  keepSecond
                />
                <Cell entry="figure">{alert.severity}</Cell>
                <Cell nowrap>{alert.ownerName}</Cell>
                <Cell nowrap entry="extra">
                  {dueText(alert.dueOn, today)}
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      )}
    </Panel>
  );
}
