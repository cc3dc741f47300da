import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { withdrawImport } from '#server/services/withdrawImport.ts';

export const POST = defineRoute({
  can: 'import figures',
  params: idParams,
  needsVersion: true,
  run: ({ actor, params, version }) => withdrawImport(actor, { id: params.id, version }),
});
