import { newWatchlistProposal } from '#contracts/watchlist.ts';
import { defineRoute } from '#server/http/route.ts';
import { proposeWatchlist } from '#server/services/proposeWatchlist.ts';

export const POST = defineRoute({
  can: 'propose',
  body: newWatchlistProposal,
  run: ({ actor, body }) => proposeWatchlist(actor, body),
});
