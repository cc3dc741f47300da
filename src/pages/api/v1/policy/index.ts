import { defineRoute } from '#server/http/route.ts';
import { showPolicy } from '#server/services/showPolicy.ts';

export const GET = defineRoute({
  can: 'signed in',
  run: ({ actor }) => showPolicy(actor),
});
