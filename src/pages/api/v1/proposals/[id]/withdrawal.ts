import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { withdrawProposal } from '#server/services/decideProposal.ts';

export const POST = defineRoute({
  can: 'propose',
  params: idParams,
  needsVersion: true,
  run: ({ actor, params, version }) => withdrawProposal(actor, { id: params.id, version }),
});
