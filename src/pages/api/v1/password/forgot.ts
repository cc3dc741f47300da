import { forgottenPassword } from '#contracts/session.ts';
import { defineForm } from '#server/http/form.ts';
import { forgotPassword } from '#server/services/forgotPassword.ts';

export const POST = defineForm({
  can: 'anyone',
  body: forgottenPassword,
  page: () => '/forgot-password',
  keep: ['email'],
  run: ({ actor, body }) => forgotPassword(actor, body),
  done: () => '/forgot-password?done=asked',
});
