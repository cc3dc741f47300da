import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { BorrowerView } from '../../contracts/borrowers.ts';
import { newWatchlistProposal, WATCHLIST_GRADES, type WatchlistChange } from '../../contracts/watchlist.ts';
import { getOrThrow } from '../ui/api.ts';
import { Button } from '../ui/Button.tsx';
import { Dialog, DialogActions } from '../ui/Dialog.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { Field, Select, TextArea } from '../ui/Field.tsx';
import { RadioGroup } from '../ui/RadioGroup.tsx';
import { useSending } from '../ui/useSending.ts';

interface ProposeForWatchlistProps {
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly alertId: number | null;
  readonly change?: WatchlistChange;
  readonly onClose: () => void;
  readonly onDone: () => void;
}

const TITLES: Readonly<Record<WatchlistChange, string>> = {
  entry: 'Propose for watchlist',
  grade: 'Propose a change of grade',
  exit: 'Propose to leave the watchlist',
};

/** All five or nothing: grade, reason, owner, plan, next review. Another person decides. */
export function ProposeForWatchlist({
  borrowerId,
  borrowerName,
  alertId,
  change = 'entry',
  onClose,
  onDone,
}: ProposeForWatchlistProps) {
  const [form, setForm] = useState({ grade: '', reason: '', ownerId: '', plan: '', nextReviewOn: '' });
  const [faults, setFaults] = useState<Readonly<Record<string, string>>>({});
  const sending = useSending<{ id: number }>();
  const borrower = useQuery({
    queryKey: ['borrower', borrowerId],
    queryFn: ({ signal }) => getOrThrow<BorrowerView>(`/borrowers/${borrowerId}`, signal),
  });
  const errorOf = (field: string) =>
    faults[field] ?? sending.problem?.errors?.find((error) => error.field === field)?.message;
  const set = (field: keyof typeof form) => (value: string) =>
    setForm((before) => ({ ...before, [field]: value }));
  const submit = async () => {
    const proposal = newWatchlistProposal.safeParse({
      ...form,
      borrowerId,
      alertId,
      change,
      ownerId: form.ownerId === '' ? undefined : Number(form.ownerId),
    });
    if (!proposal.success) {
      setFaults(
        Object.fromEntries(proposal.error.issues.map((issue) => [issue.path.join('.'), issue.message])),
      );
      return;
    }
    setFaults({});
    if ((await sending.submit('POST', '/proposals', { body: proposal.data })) !== undefined) onDone();
  };
  return (
    <Dialog open title={`${TITLES[change]}: ${borrowerName}`} onClose={onClose}>
      <form
        className="grid gap-4"
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          void submit();
        }}
      >
        <RadioGroup
          legend="Grade"
          name="grade"
          value={form.grade === '' ? null : form.grade}
          onChange={set('grade')}
          error={errorOf('grade')}
          options={WATCHLIST_GRADES.map((grade) => ({
            value: grade.code,
            label: `${grade.code}, ${grade.meaning}`,
          }))}
        />
        <TextArea
          label="Reason"
          rows={3}
          value={form.reason}
          error={errorOf('reason')}
          onChange={(event) => set('reason')(event.target.value)}
        />
        <Select
          label="Owner of the plan"
          placeholder={borrower.data ? 'Choose a person' : 'Loading the people of the desk…'}
          value={form.ownerId}
          error={errorOf('ownerId')}
          options={(borrower.data?.deskMembers ?? []).map((member) => ({
            value: String(member.id),
            label: member.name,
          }))}
          onChange={(event) => set('ownerId')(event.target.value)}
        />
        <TextArea
          label="Plan"
          hint="What will be done, by whom, by when"
          rows={3}
          value={form.plan}
          error={errorOf('plan')}
          onChange={(event) => set('plan')(event.target.value)}
        />
        <Field
          label="Next review"
          type="date"
          value={form.nextReviewOn}
          error={errorOf('nextReviewOn')}
          onChange={(event) => set('nextReviewOn')(event.target.value)}
        />
        <p className="type-second">
          A committee member other than you decides. Until then the borrower is not on the watchlist.
        </p>
        {sending.problem && <ErrorState problem={sending.problem} />}
        <DialogActions>
          <Button onClick={onClose}>Leave it</Button>
          <Button type="submit" look="primary" busy={sending.busy} busyLabel="Sending…">
            Propose
          </Button>
        </DialogActions>
      </form>
    </Dialog>
  );
}
