import type { RunDetail } from '../../contracts/runs.ts';
import { plainDate } from '../../core/calendar/plainDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { Notice } from '../ui/ErrorState.tsx';
import { Facts } from '../ui/Facts.tsx';
import { Panel } from '../ui/Panel.tsx';
import { Progress } from '../ui/States.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { durationText, instantText, isGoingOn, progressOf, STATE_WORDS } from './runWords.ts';

interface RunStateProps {
  readonly run: RunDetail;
  readonly zone: string;
}

/** One run: how far it is, or what it came to, and what failed. */
export function RunState({ run, zone }: RunStateProps) {
  const count = progressOf(run);
  return (
    <Panel
      title={`Run for ${formatDay(plainDate(run.businessDate))}`}
      aside={<span className="type-second">{STATE_WORDS[run.state]}</span>}
    >
      <div className="grid gap-4">
        {isGoingOn(run) && (
          <Progress label={count.label} done={count.done} of={count.of}>
            You can leave this page; the run goes on.
          </Progress>
        )}
        {run.state === 'interrupted' && (
          <Notice>
            The run stopped at “{run.phase}”: {run.failure ?? 'no reason was recorded'}. What is computed is
            kept. Mend the cause, then start the date again.
          </Notice>
        )}
        <Facts
          facts={[
            { label: 'Attempt', value: run.attempt },
            { label: 'Figures known at', value: instantText(run.knownAt, zone) },
            { label: 'Started', value: instantText(run.startedAt, zone) },
            { label: 'Started by', value: run.startedBy ?? 'schedule or command line' },
            { label: 'Took', value: durationText(run) || '–' },
            { label: 'Tested', value: `${run.borrowersDone} of ${run.borrowersTotal}` },
            { label: 'Failed', value: run.borrowersFailed },
          ]}
        />
        {run.failures.length > 0 && <Failures failures={run.failures} />}
      </div>
    </Panel>
  );
}

/** By number and desk: administrators do not read borrowers. */
function Failures({ failures }: Pick<RunDetail, 'failures'>) {
  return (
    <Table caption="Borrowers that could not be computed" showCaption>
      <TableHead>
        <tr role="row">
          <HeadCell>Borrower</HeadCell>
          <HeadCell>Desk</HeadCell>
          <HeadCell>Step</HeadCell>
          <HeadCell>Reason</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {failures.map((failure) => (
          <Row key={`${failure.borrowerId}:${failure.phase}`}>
            <Cell nowrap>No. {failure.borrowerId}</Cell>
            <Cell>{failure.deskName}</Cell>
            <Cell>{failure.phase}</Cell>
            <Cell>{failure.reason}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
