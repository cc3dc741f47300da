import { idParams } from '#contracts/ids.ts';
import { policyDecision } from '#contracts/policy.ts';
import { defineRoute } from '#server/http/route.ts';
import { decidePolicy } from '#server/services/decidePolicy.ts';

export const POST = defineRoute({
  can: 'confirm policy',
  params: idParams,
  body: policyDecision,
  needsVersion: true,
  run: ({ actor, params, version, body }) => decidePolicy(actor, { id: params.id, version }, body),
});
