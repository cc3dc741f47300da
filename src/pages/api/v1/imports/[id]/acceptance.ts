import { idParams } from '#contracts/ids.ts';
import { importAcceptance } from '#contracts/imports.ts';
import { defineRoute } from '#server/http/route.ts';
import { acceptImport } from '#server/services/acceptImport.ts';

export const POST = defineRoute({
  can: 'import figures',
  params: idParams,
  body: importAcceptance,
  needsVersion: true,
  run: ({ actor, params, version, body }) => acceptImport(actor, { id: params.id, version }, body),
});
