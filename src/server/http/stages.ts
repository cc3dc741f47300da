/** The stages that every request passes, outermost first; src/middleware.ts puts them in order. */
import { randomUUID } from 'node:crypto';
import type { APIContext, MiddlewareHandler } from 'astro';
import { env } from '../config/env.ts';
import type { SignedIn } from '../auth/sessions.ts';
import { clientAddress } from './address.ts';
import { setMissingHeaders } from './headers.ts';
import { log } from './log.ts';
import { isApi, isOpen, isProbe } from './openPaths.ts';
import { isOwnRequest, ownOrigin, SAFE_METHODS } from './origin.ts';
import { problemResponse } from './problem.ts';
import { outagePage } from './outagePage.ts';
import { ownPath } from './ownPath.ts';
import { SIGN_IN_FIRST, wantsPage } from './request.ts';
import { clearSessionCookie, readSessionCookie } from './sessionCookie.ts';

const RETRY_AFTER_SECONDS = 10;

/** Request id, clock and address. An error page passes here a second time and keeps what the first pass set. */
export const requestStage =
  (socketAddress: (context: APIContext) => string): MiddlewareHandler =>
  (context, next) => {
    const { locals, request } = context;
    locals.person = null;
    locals.deskNames = [];
    locals.openAlerts = null;
    locals.policyToDecide = null;
    locals.sessionId = null;
    locals.requestId ??= randomUUID();
    locals.now = new Date();
    locals.address = clientAddress(
      locals.address ?? socketAddress(context),
      request.headers.get('x-forwarded-for'),
      env().BEHIND_PROXY,
    );
    return next();
  };

export const headerStage =
  (isDevelopment: boolean): MiddlewareHandler =>
  async (context, next) => {
    const response = await next();
    response.headers.set('x-request-id', context.locals.requestId);
    // An empty 404 or 500 becomes the error page, which passes here itself and keeps what stands on the empty one.
    if (response.body === null && (response.status === 404 || response.status === 500)) return response;
    response.headers.delete('x-astro-reroute');
    setMissingHeaders(response.headers, isDevelopment);
    return response;
  };

/** What was thrown is a bug or an outage: the reader learns which, and a number to ask with; the log learns why. */
export const outageStage =
  (isOutage: (error: unknown) => boolean): MiddlewareHandler =>
  async (context, next) => {
    try {
      return await next();
    } catch (error) {
      const { requestId } = context.locals;
      const path = context.url.pathname;
      log().error({ err: error, requestId, method: context.request.method, path }, 'request failed');
      const asPage = !isApi(path) || wantsPage(context.request);
      if (isOutage(error)) {
        const outcome = outcomeText(context);
        return asPage ? outagePage(requestId, RETRY_AFTER_SECONDS, outcome) : outageProblem(context, outcome);
      }
      if (asPage) return new Response(null, { status: 500 });
      return problemResponse(context, {
        status: 500,
        title: 'Failed',
        detail: `Something failed that should not. Give your administrator the request number ${requestId}.`,
      });
    }
  };

export const originStage: MiddlewareHandler = (context, next) => {
  const { request, url, locals } = context;
  if (isOwnRequest(request.method, url.pathname, request.headers, ownOrigin())) return next();
  const { requestId, address } = locals;
  log().warn({ requestId, address, method: request.method, path: url.pathname }, 'foreign origin refused');
  return problemResponse(context, {
    status: 403,
    title: 'Not from here',
    detail: `This request did not come from a page of ${ownOrigin()}. Nothing was changed. Open the product at that address and try again.`,
  });
};

export const sessionStage =
  (currentPerson: (token: string, now: Date) => Promise<SignedIn | null>): MiddlewareHandler =>
  async (context, next) => {
    const token = readSessionCookie(context.cookies);
    if (!token || isProbe(context.url.pathname)) return next();
    const signedIn = await currentPerson(token, context.locals.now);
    if (signedIn) {
      context.locals.person = signedIn.person;
      context.locals.deskNames = signedIn.deskNames;
      context.locals.sessionId = signedIn.sessionId;
    } else clearSessionCookie(context.cookies);
    return next();
  };

/** What every page's bar counts. */
interface BarCounts {
  readonly openAlerts: number | null;
  readonly policyToDecide: number | null;
}

/** Every page's bar shows how many alerts are open and what waits to be decided; an API answer has no bar. */
export const barCountStage =
  (count: (person: SignedIn['person']) => Promise<BarCounts>): MiddlewareHandler =>
  async (context, next) => {
    const { person } = context.locals;
    if (person && !isApi(context.url.pathname)) Object.assign(context.locals, await count(person));
    return next();
  };

export interface Refusal {
  readonly person: SignedIn['person'];
  readonly status: number;
  readonly method: string;
  readonly path: string;
  readonly requestId: string;
  readonly address: string;
  readonly now: Date;
}

/** A signed-in person who asks for what they may not have, or may not see, leaves a line in the audit log. */
export const refusalStage =
  (record: (refusal: Refusal) => Promise<void>): MiddlewareHandler =>
  async (context, next) => {
    const response = await next();
    const { person, requestId, address, now } = context.locals;
    // A thing is named in the address, or in the body of what is sent.
    const isNamedThing =
      Object.keys(context.params).some((name) => name !== 'path') ||
      (context.request.method === 'POST' && context.params['path'] === undefined);
    if (person && (response.status === 403 || (response.status === 404 && isNamedThing)))
      await record({
        person,
        status: response.status,
        method: context.request.method,
        path: context.url.pathname,
        requestId,
        address,
        now,
      });
    return response;
  };

/** Deny by default: only what is listed as open answers somebody who is not signed in. */
export const requireUserStage: MiddlewareHandler = (context, next) => {
  const { pathname, search } = context.url;
  // What the framework brings along (images, islands drawn apart) is used by no page.
  if (context.routePattern.startsWith('/_')) return new Response(null, { status: 404 });
  if (context.locals.person || isOpen(pathname, context.routePattern)) return next();
  if (!isApi(pathname)) return context.redirect(signInFor(ownPath(pathname + search, '')), 303);
  if (!wantsPage(context.request)) return problemResponse(context, SIGN_IN_FIRST);
  const formPage = context.request.headers.get('referer') ?? '';
  const path = URL.canParse(formPage) ? new URL(formPage).pathname + new URL(formPage).search : '';
  return context.redirect(signInFor(ownPath(path, ''), { ended: '1' }), 303);
};

/** Astro answers an unknown method of a route with an empty 404, which would become a page. */
export const methodStage: MiddlewareHandler = async (context, next) => {
  const response = await next();
  if (
    !isApi(context.url.pathname) ||
    response.status !== 404 ||
    response.body !== null ||
    context.request.method === 'HEAD'
  )
    return response;
  return problemResponse(context, {
    status: 405,
    title: 'Method not known here',
    detail: `This address does not take ${context.request.method}. Nothing was changed.`,
  });
};

function signInFor(path: string, more: Record<string, string> = {}): string {
  const query = new URLSearchParams(path === '' || path === '/' ? more : { next: path, ...more });
  return query.size === 0 ? '/sign-in' : `/sign-in?${query.toString()}`;
}

const outageProblem = (context: APIContext, outcome: string): Response =>
  problemResponse(context, {
    status: 503,
    title: 'Database does not answer',
    detail: `The database does not answer. ${outcome} Try again in a few seconds.`,
    retryAfterSeconds: RETRY_AFTER_SECONDS,
  });

/**
 * A COMMIT whose answer is lost may have happened. That can be so once somebody who is known has sent a change: who
 * it is, is asked of the database first.
 */
const outcomeText = ({ request, locals }: APIContext): string =>
  locals.person === null || SAFE_METHODS.has(request.method)
    ? 'Nothing was changed.'
    : 'It is not certain whether your change was made: look before you send it again.';
