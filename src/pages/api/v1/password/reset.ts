import { passwordReset } from '#contracts/session.ts';
import { defineForm } from '#server/http/form.ts';
import { resetPassword } from '#server/services/resetPassword.ts';

export const POST = defineForm({
  can: 'anyone',
  body: passwordReset,
  page: ({ token }) => `/reset-password?token=${encodeURIComponent(token ?? '')}`,
  keep: [],
  run: ({ actor, body }) => resetPassword(actor, body),
  done: () => '/sign-in?done=password-set',
});
