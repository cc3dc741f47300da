import { z } from 'zod';
import { defineForm } from '#server/http/form.ts';
import { clearSessionCookie } from '#server/http/sessionCookie.ts';
import { signOut } from '#server/services/signOut.ts';

export const POST = defineForm({
  can: 'signed in',
  body: z.object({}),
  page: () => '/account',
  keep: [],
  run: ({ actor, context }) => signOut(actor, context.locals.sessionId ?? ''),
  done: (_value, context) => {
    clearSessionCookie(context.cookies);
    return '/sign-in?done=signed-out';
  },
});
