import type { StripTest } from '../../contracts/alerts.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { plainDate } from '../../core/calendar/plainDate.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatShare } from '../../core/money/print.ts';
import { lastTests } from './stripGeometry.ts';

/** What a strip says to somebody who does not see it: every test with its outcome and its number. */
export function stripText(label: string, tests: readonly StripTest[]): string {
  const shown = lastTests(tests);
  if (shown.length === 0) return `${label}: no test yet.`;
  const count = shown.length === 1 ? 'the last test' : `the last ${shown.length} tests, oldest first`;
  return `${label}, ${count}: ${shown.map(testText).join('; ')}.`;
}

/** "30 Sep 2026 met, just passing, may fall 1.4 %" */
export function testText({ testDate, outcome, justPassing, mayFall }: StripTest): string {
  const words = [`${formatDay(plainDate(testDate))} ${outcome}`];
  if (justPassing) words.push('just passing');
  if (mayFall !== null && outcome !== 'cannot be tested') {
    const share = decimal(mayFall);
    words.push(share.lt(0) ? `short by ${formatShare(share.abs())}` : `may fall ${formatShare(share)}`);
  }
  return words.join(', ');
}
