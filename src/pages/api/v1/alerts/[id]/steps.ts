import { alertStep } from '#contracts/alerts.ts';
import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { workAlert } from '#server/services/workAlert.ts';

export const POST = defineRoute({
  can: 'work an alert',
  params: idParams,
  body: alertStep,
  needsVersion: true,
  run: ({ actor, params, version, body }) => workAlert(actor, params.id, version, body),
});
