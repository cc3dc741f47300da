import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { PolicyView } from '../../contracts/policy.ts';
import { getOrThrow, Refusal } from '../ui/api.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { LiveRegion } from '../ui/States.tsx';
import { PolicyProposals } from './PolicyProposals.tsx';
import { PolicyValues } from './PolicyValues.tsx';
import { PolicyVersions } from './PolicyVersions.tsx';
import { ProposePolicy } from './ProposePolicy.tsx';

interface PolicySheetProps {
  readonly first: PolicyView;
  readonly personId: number;
}

/** The policy in force, what is proposed, every version that there was; the form for whoever may propose. */
export function PolicySheet(props: PolicySheetProps) {
  return (
    <IslandQueries>
      <PolicyParts {...props} />
    </IslandQueries>
  );
}

function PolicyParts({ first, personId }: PolicySheetProps) {
  const [proposing, setProposing] = useState(false);
  const [said, setSaid] = useState('');
  const policy = useQuery({
    queryKey: ['policy'],
    queryFn: ({ signal }) => getOrThrow<PolicyView>('/policy', signal),
    initialData: first,
  });
  const view = policy.data;
  const isWaiting = view.proposals.some(({ state }) => state === 'proposed');
  const changed = (what: string) => {
    setProposing(false);
    setSaid(what);
    // The form or dialog that had the focus is gone; what was decided stands at the top.
    document.getElementById('main')?.focus();
    void policy.refetch();
  };
  return (
    <div className="with-evidence">
      <div className="stack">
        {policy.error instanceof Refusal && (
          <ErrorState problem={policy.error.problem} onRetry={() => void policy.refetch()} />
        )}
        <PolicyProposals view={view} personId={personId} onChanged={changed} />
        {proposing ? (
          <ProposePolicy
            view={view}
            onClose={() => setProposing(false)}
            onDone={() => changed('Change proposed')}
          />
        ) : (
          <PolicyValues
            view={view}
            action={
              view.mayPropose &&
              !isWaiting && <Button onClick={() => setProposing(true)}>Propose a change</Button>
            }
          />
        )}
      </div>
      <PolicyVersions versions={view.versions} zone={view.zone} />
      <LiveRegion message={said} />
    </div>
  );
}
