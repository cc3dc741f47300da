import { newPolicyProposal } from '#contracts/policy.ts';
import { defineRoute } from '#server/http/route.ts';
import { proposePolicy } from '#server/services/proposePolicy.ts';

export const POST = defineRoute({
  can: 'propose policy',
  body: newPolicyProposal,
  run: ({ actor, body }) => proposePolicy(actor, body),
});
