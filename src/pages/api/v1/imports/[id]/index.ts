import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { showImport } from '#server/services/listImports.ts';

export const GET = defineRoute({
  can: 'read borrower',
  params: idParams,
  run: ({ actor, params }) => showImport(actor, params.id),
});
