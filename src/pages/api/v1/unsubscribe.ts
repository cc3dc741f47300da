import { unsubscribeForm } from '#contracts/session.ts';
import { ok } from '#core/result.ts';
import { defineForm } from '#server/http/form.ts';
import { unsubscribe } from '#server/services/unsubscribe.ts';

/** A mail program is answered without a redirect, as RFC 8058 asks; our own page leads back to itself. */
export const POST = defineForm({
  can: 'anyone',
  body: unsubscribeForm,
  page: () => '/unsubscribe',
  keep: [],
  run: async ({ actor, body, context }) => {
    const token = body.token ?? context.url.searchParams.get('token') ?? '';
    const done = await unsubscribe(actor, token);
    return done.ok ? ok({ isOneClick: body['List-Unsubscribe'] !== undefined }) : done;
  },
  done: ({ isOneClick }) => (isOneClick ? null : '/unsubscribe?done=unsubscribed'),
});
