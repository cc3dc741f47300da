import { lineParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { showSource } from '#server/services/listStatements.ts';

export const GET = defineRoute({
  can: 'read borrower',
  params: lineParams,
  run: ({ actor, params }) => showSource(actor, params.id, params.line),
});
