import { closingConfirmation } from '#contracts/alerts.ts';
import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { confirmClosing } from '#server/services/workAlert.ts';

export const POST = defineRoute({
  can: 'confirm a closing',
  params: idParams,
  body: closingConfirmation,
  needsVersion: true,
  run: ({ actor, params, version, body }) => confirmClosing(actor, params.id, version, body),
});
