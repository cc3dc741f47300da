import { firstSetUp } from '#contracts/session.ts';
import { defineForm } from '#server/http/form.ts';
import { setUp } from '#server/services/setUp.ts';

export const POST = defineForm({
  can: 'anyone',
  body: firstSetUp,
  page: ({ token }) => `/set-up?token=${encodeURIComponent(token ?? '')}`,
  keep: ['lenderName', 'zone', 'personName', 'email', 'deskName'],
  run: ({ actor, body }) => setUp(actor, body),
  done: () => '/sign-in?done=set-up',
});
