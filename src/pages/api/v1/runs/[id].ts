import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { showRun } from '#server/services/listRuns.ts';

export const GET = defineRoute({
  can: 'administer',
  params: idParams,
  run: ({ actor, params }) => showRun(actor, params.id),
});
