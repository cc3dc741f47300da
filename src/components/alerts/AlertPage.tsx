import type { AlertDetail } from '../../contracts/alerts.ts';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { AlertEvidence } from './AlertEvidence.tsx';

/** One alert as a page of its own: where a mail's link leads, and on narrow screens. */
export function AlertPage({ alert }: { readonly alert: AlertDetail }) {
  return (
    <IslandQueries>
      <div className="max-w-[620px]">
        <AlertEvidence id={alert.id} first={alert} />
      </div>
    </IslandQueries>
  );
}
