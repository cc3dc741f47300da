import type { MovementRow, MovementsView } from '../../contracts/movements.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Facts } from '../ui/Facts.tsx';
import { Panel } from '../ui/Panel.tsx';

/** What stands otherwise than last night, and what each cause added. */
export function Movements({ movements }: { readonly movements: MovementsView | null }) {
  if (!movements) return null;
  const night = `the night of ${dayText(movements.since)}`;
  return (
    <Panel
      title={
        <>
          Moved since {night} <MethodLink topic="why-it-moved" />
        </>
      }
    >
      {movements.rows.length === 0 ? (
        <p className="type-second">Nothing moved since {night}.</p>
      ) : (
        <MovementList rows={movements.rows} />
      )}
    </Panel>
  );
}

export const MovementList = ({ rows }: { readonly rows: readonly MovementRow[] }) => (
  <Facts text facts={rows.map((row) => ({ key: row.key, label: row.what, value: <Moved row={row} /> }))} />
);

/** One cause needs no figures of its own: before and now say them. */
function Moved({ row: { before, after, steps } }: { readonly row: MovementRow }) {
  const [only] = steps;
  return (
    <>
      <span className="block">Before: {before}</span>
      <span className="type-name block">Now: {after}</span>
      {only && steps.length === 1 ? (
        <span className="type-second block">Because of {only.cause}</span>
      ) : (
        steps.map(({ cause, to }) => (
          <span key={cause} className="type-second block">
            With {cause}: {to}
          </span>
        ))
      )}
    </>
  );
}
