/**
 * The main job, once through, as people do it: a borrower's workbook goes in, the night turns it into an alert, the
 * alert is mailed, worked and carried onto the watchlist by two persons' word, the review sheet is exported, and the
 * auditor finds every step; then the policy changes by two persons, and the next night goes by it. One story in steps: each rests on the ones before it.
 */
import { fromNightToWatchlist } from './walk/fromNightToWatchlist.ts';
import { fromWorkbookToBorrower } from './walk/fromWorkbookToBorrower.ts';
import { policyByTwoPersons } from './walk/policyByTwoPersons.ts';
import { reviewAndAudit } from './walk/reviewAndAudit.ts';

fromWorkbookToBorrower();
fromNightToWatchlist();
reviewAndAudit();
policyByTwoPersons();
