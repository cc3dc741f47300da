import { dayText } from '../../core/calendar/printDay.ts';
import type { BorrowerView } from '../../contracts/borrowers.ts';
import { Facts } from '../ui/Facts.tsx';
import { Panel } from '../ui/Panel.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { amountText } from './figures.ts';

/** What was lent, and who the borrower is. */
export function Facilities({ borrower }: { readonly borrower: BorrowerView }) {
  return (
    <div className="with-evidence">
      <Panel flush label="Facilities">
        <Table caption="Facilities of this borrower" entries>
          <TableHead>
            <tr role="row">
              <HeadCell>Facility</HeadCell>
              <HeadCell numeric>Limit</HeadCell>
              <HeadCell numeric>Drawn</HeadCell>
              <HeadCell numeric>Margin, basis points</HeadCell>
              <HeadCell>Matures</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {borrower.facilities.map((facility) => (
              <Row key={facility.id}>
                <NameCell name={facility.name} beside={facility.kind} second={facility.security} keepSecond />
                <Cell numeric nowrap>
                  {facility.currency} {amountText(facility.limit)}
                </Cell>
                <Cell numeric nowrap entry="figure">
                  {amountText(facility.drawn)}
                </Cell>
                <Cell numeric>{facility.marginBps ?? '–'}</Cell>
                <Cell nowrap entry="extra">
                  {dayText(facility.maturesOn)}
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </Panel>
      <Panel title="Borrower">
        <Facts
          text
          facts={[
            { label: 'Legal form', value: borrower.legalForm },
            { label: 'LEI', value: borrower.lei ?? 'none' },
            { label: 'Listed', value: borrower.isListed ? 'yes: private side' : 'no' },
            { label: 'Sector', value: `${borrower.sectorLabel} (${borrower.sectorCode})` },
            { label: 'Country', value: borrower.country },
            { label: 'Currency', value: borrower.currency },
            { label: 'Year ends in month', value: borrower.fiscalYearEndMonth },
            { label: 'Desk', value: borrower.deskName },
          ]}
        />
      </Panel>
    </div>
  );
}
