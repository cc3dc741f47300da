import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { showBorrower } from '#server/services/showBorrower.ts';

export const GET = defineRoute({
  can: 'read borrower',
  params: idParams,
  run: ({ actor, params }) => showBorrower(actor, params.id),
});
