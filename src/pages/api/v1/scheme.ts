import { SCHEME_COOKIE, schemeForm } from '../../../contracts/scheme.ts';
import { err, ok } from '../../../core/result.ts';
import { defineRoute } from '../../../server/http/route.ts';

/** A plain form posts here, so that the switch works without a script; the answer leads back to the page. */
export const POST = defineRoute({
  can: 'signed in',
  run: async ({ request }) => {
    const form = schemeForm.safeParse(Object.fromEntries(await request.formData()));
    if (!form.success)
      return err({
        kind: 'invalid',
        detail: 'Day, night or system: nothing else can be chosen. Nothing was changed.',
        errors: [{ field: 'scheme', code: 'not-a-scheme', message: 'Choose day, night or system.' }],
      });
    return ok({ ...form.data, secure: new URL(request.url).protocol === 'https:' });
  },
  present: ({ scheme, back, secure }) => {
    const cookie = `${SCHEME_COOKIE}=${scheme}; Path=/; Max-Age=31536000; HttpOnly; SameSite=Lax${secure ? '; Secure' : ''}`;
    return new Response(null, { status: 303, headers: { location: back, 'set-cookie': cookie } });
  },
});
