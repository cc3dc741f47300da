import { handingOver } from '#contracts/alerts.ts';
import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { handOverAlert } from '#server/services/workAlert.ts';

export const POST = defineRoute({
  can: 'hand over an alert',
  params: idParams,
  body: handingOver,
  needsVersion: true,
  run: ({ actor, params, version, body }) => handOverAlert(actor, params.id, version, body),
});
