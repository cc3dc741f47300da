import { signInForm } from '#contracts/session.ts';
import { ok } from '#core/result.ts';
import { defineForm } from '#server/http/form.ts';
import { ownPath } from '#server/http/ownPath.ts';
import { setSessionCookie } from '#server/http/sessionCookie.ts';
import { signIn } from '#server/services/signIn.ts';

export const POST = defineForm({
  can: 'anyone',
  body: signInForm,
  page: ({ next }) => `/sign-in?next=${encodeURIComponent(ownPath(next, '/'))}`,
  keep: ['email'],
  run: async ({ actor, body, context }) => {
    const signedIn = await signIn(actor, body, context.locals.sessionId);
    return signedIn.ok ? ok({ ...signedIn.value, next: body.next }) : signedIn;
  },
  done: ({ token, next }, context) => {
    setSessionCookie(context.cookies, token);
    return ownPath(next, '/');
  },
});
