import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { listStatements } from '#server/services/listStatements.ts';

export const GET = defineRoute({
  can: 'read borrower',
  params: idParams,
  run: ({ actor, params }) => listStatements(actor, params.id),
});
