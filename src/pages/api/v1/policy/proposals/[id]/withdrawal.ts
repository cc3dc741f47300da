import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { withdrawPolicy } from '#server/services/decidePolicy.ts';

export const POST = defineRoute({
  can: 'propose policy',
  params: idParams,
  needsVersion: true,
  run: ({ actor, params, version }) => withdrawPolicy(actor, { id: params.id, version }),
});
