import { idParams } from '#contracts/ids.ts';
import { proposalDecision } from '#contracts/watchlist.ts';
import { defineRoute } from '#server/http/route.ts';
import { decideProposal } from '#server/services/decideProposal.ts';

export const POST = defineRoute({
  can: 'decide',
  params: idParams,
  body: proposalDecision,
  needsVersion: true,
  run: ({ actor, params, version, body }) => decideProposal(actor, { id: params.id, version }, body),
});
