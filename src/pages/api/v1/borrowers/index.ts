import { borrowerQuery } from '#contracts/borrowers.ts';
import { defineRoute } from '#server/http/route.ts';
import { listBorrowers } from '#server/services/listBorrowers.ts';

export const GET = defineRoute({
  can: 'read borrower',
  query: borrowerQuery,
  run: ({ actor, query }) => listBorrowers(actor, query),
});
