import { SCHEME_COOKIE, schemeForm } from '#contracts/scheme.ts';
import { ok } from '#core/result.ts';
import { defineForm } from '#server/http/form.ts';

const ONE_YEAR_SECONDS = 31_536_000;

/** A plain form posts here, so that the switch works without a script; the answer leads back to the page. */
export const POST = defineForm({
  can: 'signed in',
  body: schemeForm,
  page: () => '/account',
  keep: [],
  run: ({ body }) => Promise.resolve(ok(body)),
  done: ({ scheme, back }, { cookies, url }) => {
    const secure = url.protocol === 'https:';
    cookies.set(SCHEME_COOKIE, scheme, {
      path: '/',
      maxAge: ONE_YEAR_SECONDS,
      httpOnly: true,
      sameSite: 'lax',
      secure,
    });
    return back;
  },
});
