import type { Page } from '../../contracts/paging.ts';
import type { RunRow } from '../../contracts/runs.ts';
import { plainDate } from '../../core/calendar/plainDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { Pager } from '../ui/Pager.tsx';
import { Panel } from '../ui/Panel.tsx';
import { EmptyState } from '../ui/States.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { durationText, instantText, STATE_WORDS } from './runWords.ts';

interface RunsTableProps {
  readonly page: Page<RunRow>;
  readonly zone: string;
  readonly shownId: number | null;
  readonly onShow: (runId: number) => void;
}

const runsHref = (page: number): string => `/desk-settings/runs${page === 1 ? '' : `?page=${page}`}`;

/** The runs, the latest business date first. */
export function RunsTable({ page, zone, shownId, onShow }: RunsTableProps) {
  if (page.total === 0)
    return (
      <Panel label="Runs">
        <EmptyState title="No run yet">Start the first one above, or wait for the night.</EmptyState>
      </Panel>
    );
  return (
    <Panel flush title="Runs">
      <Table caption={`Runs, the latest business date first; times in ${zone}`} entries>
        <TableHead>
          <tr role="row">
            <HeadCell>Business date</HeadCell>
            <HeadCell>State</HeadCell>
            <HeadCell numeric>Tested</HeadCell>
            <HeadCell numeric>Failed</HeadCell>
            <HeadCell>Started</HeadCell>
            <HeadCell numeric>Took</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {page.rows.map((run) => (
            <Row key={run.id} current={run.id === shownId} onOpen={() => onShow(run.id)}>
              <NameCell
                name={formatDay(plainDate(run.businessDate))}
                href={`#run-${run.id}`}
                beside={run.attempt > 1 ? `attempt ${run.attempt}` : undefined}
                current={run.id === shownId}
                onFollow={(event) => {
                  event.preventDefault();
                  onShow(run.id);
                }}
              />
              <Cell entry="extra">{STATE_WORDS[run.state]}</Cell>
              <Cell numeric entry="figure">
                {run.borrowersDone} of {run.borrowersTotal}
              </Cell>
              <Cell numeric>{run.borrowersFailed}</Cell>
              <Cell nowrap>
                {instantText(run.startedAt, zone)}
                <span className="type-second type-small block">
                  {run.startedBy ?? 'schedule or command line'}
                </span>
              </Cell>
              <Cell numeric>{durationText(run)}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      <Pager page={page.page} perPage={page.perPage} total={page.total} what="runs" hrefOf={runsHref} />
    </Panel>
  );
}
