import { dayText } from '../../core/calendar/printDay.ts';
import type { AlertRow } from '../../contracts/alerts.ts';
import { daysBetween, plainDate } from '../../core/calendar/plainDate.ts';

/** "Today", "2 days", "3 days overdue". */
export function dueText(dueOn: string, today: string): string {
  const days = daysBetween(plainDate(today), plainDate(dueOn));
  if (days === 0) return 'Today';
  const count = Math.abs(days) === 1 ? '1 day' : `${Math.abs(days)} days`;
  return days > 0 ? count : `${count} overdue`;
}

/** Where the alert stands, as its row says it: nothing for one that is simply open. */
export function stateText(
  row: Pick<AlertRow, 'state' | 'putOffUntil' | 'conditionGone' | 'severity'>,
): string | null {
  if (row.conditionGone && row.severity === 'urgent' && row.state !== 'closed')
    return 'condition gone, confirm';
  if (row.state === 'put off') return `put off until ${row.putOffUntil ? dayText(row.putOffUntil) : 'later'}`;
  if (row.state === 'raised') return null;
  return row.state;
}
