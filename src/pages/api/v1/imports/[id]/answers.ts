import { idParams } from '#contracts/ids.ts';
import { importAnswer } from '#contracts/imports.ts';
import { defineRoute } from '#server/http/route.ts';
import { answerImport } from '#server/services/answerImport.ts';

export const POST = defineRoute({
  can: 'import figures',
  params: idParams,
  body: importAnswer,
  needsVersion: true,
  run: ({ actor, params, version, body }) => answerImport(actor, { id: params.id, version }, body),
});
