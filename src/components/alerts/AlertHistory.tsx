import { formatInstant } from '../../core/calendar/printInstant.ts';
import type { AlertEvent } from '../../contracts/alerts.ts';

/** What happened to the alert, newest first; times in UTC, as the audit log has them. */
export function AlertHistory({ events }: { readonly events: readonly AlertEvent[] }) {
  return (
    <ol className="history" aria-label="What was done">
      {events.map((event) => (
        <li key={`${event.at} ${event.what}`}>
          <time className="type-second" dateTime={event.at}>
            {formatInstant(new Date(event.at), 'UTC')}
          </time>
          <span>
            {event.what} by {event.who}
            {event.text && <span className="type-second block">{event.text}</span>}
          </span>
        </li>
      ))}
    </ol>
  );
}
