import type { RequestActor } from './route.ts';

/** Who looks at a page: what its one service is asked with. A page only reads, so there is no key to repeat. */
export function pageActor(locals: App.Locals): RequestActor {
  const { person, requestId, address, now } = locals;
  if (!person) throw new Error('the page is open to people who are not signed in');
  return { person, requestId, address, idempotencyKey: null, now };
}
