import { digestChoice } from '#contracts/session.ts';
import { defineForm } from '#server/http/form.ts';
import { chooseDigest } from '#server/services/unsubscribe.ts';

export const POST = defineForm({
  can: 'signed in',
  body: digestChoice,
  page: () => '/account',
  keep: [],
  run: ({ actor, body }) => chooseDigest(actor, body.digest === 'wanted'),
  done: () => '/account?done=digest-chosen',
});
