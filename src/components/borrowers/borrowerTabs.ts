import { dayText } from '../../core/calendar/printDay.ts';
import { formatInstant } from '../../core/calendar/printInstant.ts';
import type { BorrowerView } from '../../contracts/borrowers.ts';

export type BorrowerTab =
  'covenants' | 'outlook' | 'statements' | 'quality' | 'alerts' | 'facilities' | 'review-sheet';

/** The parts of a borrower's page, each with an address of its own. */
export const borrowerTabs = (borrower: Pick<BorrowerView, 'id' | 'alerts' | 'facilities'>) => {
  const at = `/borrowers/${borrower.id}`;
  return [
    { key: 'covenants', name: 'Covenants', href: at },
    { key: 'outlook', name: 'Outlook', href: `${at}/outlook` },
    { key: 'statements', name: 'Statements', href: `${at}/statements` },
    { key: 'quality', name: 'Reporting quality', href: `${at}/quality` },
    { key: 'alerts', name: 'Alerts', href: `${at}/alerts`, count: borrower.alerts.length },
    { key: 'facilities', name: 'Facilities', href: `${at}/facilities`, count: borrower.facilities.length },
    { key: 'review-sheet', name: 'Review sheet', href: `${at}/review-sheet` },
  ];
};

/** What dates and places the figures, beside the name. */
export function borrowerFacts(borrower: BorrowerView): string {
  const { computed } = borrower;
  const parts = [
    borrower.sectorLabel,
    `relationship ${borrower.managerName}`,
    `analyst ${borrower.analystName}`,
    borrower.watchlist &&
      `on watchlist at ${borrower.watchlist.grade} since ${dayText(borrower.watchlist.enteredOn)}`,
    computed ? `figures known to ${formatInstant(new Date(computed.dataCutOff), 'UTC')}` : 'not assessed yet',
    computed?.peersAreLastNights && 'peers as of last night',
  ];
  return parts.filter(Boolean).join(', ');
}
