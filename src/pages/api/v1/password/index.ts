import { passwordChange } from '#contracts/session.ts';
import { defineForm } from '#server/http/form.ts';
import { setSessionCookie } from '#server/http/sessionCookie.ts';
import { changePassword } from '#server/services/changePassword.ts';

export const POST = defineForm({
  can: 'signed in',
  body: passwordChange,
  page: () => '/account',
  keep: [],
  run: ({ actor, body }) => changePassword(actor, body),
  done: ({ token }, context) => {
    setSessionCookie(context.cookies, token);
    return '/account?done=password-changed';
  },
});
