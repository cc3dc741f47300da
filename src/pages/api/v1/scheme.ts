import { schemeForm } from '#contracts/scheme.ts';
import { ok } from '#core/result.ts';
import { defineForm } from '#server/http/form.ts';
import { setSchemeCookie } from '#server/http/schemeCookie.ts';

/** The switch in the person's menu: a cookie of this device, and back to the page. */
export const POST = defineForm({
  can: 'signed in',
  body: schemeForm,
  page: () => '/',
  keep: [],
  run: ({ body }) => Promise.resolve(ok(body)),
  done: ({ scheme, back }, context) => {
    setSchemeCookie(context.cookies, scheme);
    return back;
  },
});
