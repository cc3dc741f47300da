import { defineRoute } from '#server/http/route.ts';
import { listWatchlist } from '#server/services/listWatchlist.ts';

export const GET = defineRoute({
  can: 'read borrower',
  run: ({ actor }) => listWatchlist(actor),
});
