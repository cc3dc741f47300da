import { z } from 'zod';
import { defineForm } from '#server/http/form.ts';
import { endOtherSessions } from '#server/services/signOut.ts';

export const POST = defineForm({
  can: 'signed in',
  body: z.object({}),
  page: () => '/account',
  keep: [],
  run: ({ actor, context }) => endOtherSessions(actor, context.locals.sessionId ?? ''),
  done: () => '/account?done=sessions-ended',
  present: (value) => Response.json(value),
});
