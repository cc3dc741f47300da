import { useState } from 'react';
import { newRun } from '../../contracts/runs.ts';
import { plainDate } from '../../core/calendar/plainDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Field } from '../ui/Field.tsx';
import { useSending } from '../ui/useSending.ts';

interface StartRunProps {
  readonly today: string;
  /** Another run is going on: one at a time. */
  readonly isOccupied: boolean;
  readonly onStarted: (runId: number) => void;
}

/** A business date, today's unless another is asked for, and the button that starts its run. */
export function StartRun({ today, isOccupied, onStarted }: StartRunProps) {
  const [day, setDay] = useState(today);
  const sending = useSending<{ readonly id: number }>();
  const checked = newRun.safeParse({ businessDate: day });
  const start = async () => {
    if (!checked.success) return;
    const started = await sending.submit('POST', '/runs', { body: checked.data });
    if (started) onStarted(started.id);
  };
  return (
    <div className="grid gap-3">
      <div className="flex flex-wrap items-end gap-4">
        <Field
          label="Business date"
          type="date"
          max={today}
          value={day}
          error={checked.success ? undefined : 'Give a day.'}
          onChange={(event) => setDay(event.target.value)}
        />
        <Button
          look="primary"
          busy={sending.busy || isOccupied}
          busyLabel={isOccupied ? 'A run is going on' : 'Starting…'}
          onClick={() => void start()}
        >
          Start the run{checked.success ? ` for ${formatDay(plainDate(day))}` : ''}
        </Button>
      </div>
      <p className="type-second max-w-[64ch]">
        A date that is done is computed once more with what is known now. A date before the latest one is kept
        beside it: it raises no alert and goes into no digest.
      </p>
      {sending.problem && <ErrorState problem={sending.problem} />}
    </div>
  );
}
