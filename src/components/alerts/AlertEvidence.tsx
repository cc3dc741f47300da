import { dayText } from '../../core/calendar/printDay.ts';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import type { AlertDetail } from '../../contracts/alerts.ts';
import { MovementList } from '../borrowers/Movements.tsx';
import { AlertMark, alertKindText } from '../marks/AlertMark.tsx';
import { Cautions } from '../marks/Cautions.tsx';
import { MethodLink } from '../marks/MethodLink.tsx';
import { SoundingStrip } from '../marks/SoundingStrip.tsx';
import { getOrThrow, Refusal } from '../ui/api.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Facts } from '../ui/Facts.tsx';
import { Panel } from '../ui/Panel.tsx';
import { LoadingState } from '../ui/States.tsx';
import { AlertHistory } from './AlertHistory.tsx';
import { AlertSteps } from './AlertSteps.tsx';
import { stateText } from './alertWords.ts';

interface AlertEvidenceProps {
  readonly id: number;
  readonly first?: AlertDetail;
  readonly onChanged?: () => void;
  readonly onClose?: () => void;
}

/** What an alert rests on, what would change it, what can be done, and what was done. */
export function AlertEvidence({ id, first, onChanged, onClose }: AlertEvidenceProps) {
  const queries = useQueryClient();
  const detail = useQuery({
    queryKey: ['alert', id],
    queryFn: ({ signal }) => getOrThrow<AlertDetail>(`/alerts/${id}`, signal),
    ...(first && { initialData: first }),
  });
  if (detail.error instanceof Refusal)
    return (
      <Panel label="Alert">
        <ErrorState problem={detail.error.problem} onRetry={() => void detail.refetch()} />
      </Panel>
    );
  if (!detail.data)
    return (
      <Panel label="Alert">
        <LoadingState what="the evidence" />
      </Panel>
    );
  const alert = detail.data;
  const changed = () => {
    void queries.invalidateQueries({ queryKey: ['alert', id] });
    onChanged?.();
  };
  return (
    <Panel
      title={<a href={`/borrowers/${alert.borrowerId}`}>{alert.borrowerName}</a>}
      aside={
        onClose && (
          <Button small look="quiet" onClick={onClose}>
            Put away
          </Button>
        )
      }
    >
      <p className="type-second">
        <AlertMark kind={alert.kind} /> {alertKindText(alert.kind)}
        {alert.covenantName && alert.covenantId !== null && `, ${alert.covenantName.toLowerCase()}`},{' '}
        {alert.severity}, facts of {dayText(alert.factDate)}
        {stateText(alert) && `, ${stateText(alert)}`}
      </p>
      {alert.strip.length > 0 && (
        <div className="my-3">
          <SoundingStrip
            tests={alert.strip}
            size="panel"
            label={`${alert.covenantName ?? 'Tests'} of ${alert.borrowerName}`}
          />
        </div>
      )}
      <p>
        {alert.sentence} <MethodLink topic="alerts" />
      </p>
      <Facts text facts={alert.evidence.map((fact) => ({ label: fact.label, value: fact.value }))} />
      <p className="mt-3">
        <span className="type-name">What would change this: </span>
        {alert.wouldChange} {alert.covenantId !== null && <MethodLink topic="headroom" />}
      </p>
      {alert.movements && (
        <section className="mt-3">
          <h3 className="type-heading">Moved since the night of {dayText(alert.movements.since)}</h3>
          <MovementList rows={alert.movements.rows} />
        </section>
      )}
      {alert.closing && (
        <p className="mt-3">
          <span className="type-name">{alert.state === 'closed' ? 'Closed' : 'Asked to close'}: </span>
          {alert.closing.reason}. {alert.closing.text}{' '}
          <span className="type-second">({alert.closing.by})</span>
        </p>
      )}
      <AlertSteps alert={alert} onChanged={changed} />
      <AlertHistory events={alert.events} />
      <Cautions />
    </Panel>
  );
}
