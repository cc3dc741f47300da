/**
 * How every API route is made. The order is always: who, may they, parse, one service, answer.
 *
 * A route declares `can`; tests/api lists every route against every role, and a route without it does not
 * compile.
 */
import type { APIContext, APIRoute } from 'astro';
import type { z } from 'zod';
import type { ServiceProblem } from '../../contracts/problem.ts';
import type { Result } from '../../core/result.ts';
import { mayAnywhere, type Action, type Person } from '../auth/policy.ts';
import { invalidInput, problemResponse } from './problem.ts';
import { givenTwice, idempotencyKey, readJson, repeatedName, roleMayNot, SIGN_IN_FIRST } from './request.ts';

export interface RequestActor {
  readonly person: Person;
  readonly requestId: string;
  readonly address: string;
  readonly idempotencyKey: string | null;
  readonly now: Date;
}

interface RouteInput<Params, Query, Body> {
  readonly actor: RequestActor;
  readonly params: Params;
  readonly query: Query;
  readonly body: Body;
  /** Version from If-Match; routes with `needsVersion` never see null. */
  readonly version: number;
  readonly request: Request;
}

interface RouteDefinition<Params, Query, Body, Value> {
  readonly can: Action | 'signed in';
  readonly params?: z.ZodType<Params>;
  readonly query?: z.ZodType<Query>;
  /** JSON body; routes that take a file leave it out and read the request themselves. */
  readonly body?: z.ZodType<Body>;
  /** Answers 428 without If-Match. */
  readonly needsVersion?: true;
  readonly run: (input: RouteInput<Params, Query, Body>) => Promise<Result<Value, ServiceProblem>>;
  readonly present?: (value: Value) => Response;
}

export interface DefinedRoute extends APIRoute {
  readonly can: Action | 'signed in';
}

/** `can` of a route, for the test that lists them all. */
export type RouteRight = Action | 'signed in' | 'anyone';

export function defineRoute<
  Params = Record<string, never>,
  Query = Record<string, never>,
  Body = null,
  Value = unknown,
>(definition: RouteDefinition<Params, Query, Body, Value>): DefinedRoute {
  const handle = async (context: APIContext): Promise<Response> => {
    const { person, requestId, address, now } = context.locals;
    if (!person) return problemResponse(context, SIGN_IN_FIRST);
    if (definition.can !== 'signed in' && !mayAnywhere(person, definition.can))
      return problemResponse(context, roleMayNot(definition.can));
    const key = idempotencyKey(context.request);
    if (!key.ok) return problemResponse(context, key.error);

    const params = definition.params?.safeParse(context.params);
    if (params && !params.success)
      return problemResponse(context, {
        status: 404,
        title: 'Not found',
        detail: 'There is nothing here that you can see.',
      });
    const twice = repeatedName(context.url.searchParams);
    if (twice !== null) return problemResponse(context, givenTwice(twice));
    const query = definition.query?.safeParse(Object.fromEntries(context.url.searchParams));
    if (query && !query.success) return invalidInput(context, query.error);

    let body: Body = null as Body;
    if (definition.body) {
      const json = await readJson(context.request);
      if (!json.ok) return problemResponse(context, json.error);
      const parsed = definition.body.safeParse(json.value);
      if (!parsed.success) return invalidInput(context, parsed.error);
      body = parsed.data;
    }

    const ifMatch = /^"?(\d+)"?$/.exec(context.request.headers.get('if-match') ?? '')?.[1];
    if (definition.needsVersion && ifMatch === undefined)
      return problemResponse(context, {
        status: 428,
        title: 'Version missing',
        detail: 'Send the version you have seen in If-Match. Nothing was changed.',
      });

    const result = await definition.run({
      actor: {
        person,
        requestId,
        address,
        idempotencyKey: key.value,
        now,
      },
      params: params?.data as Params,
      query: query?.data as Query,
      body,
      version: Number(ifMatch ?? 0),
      request: context.request,
    });
    if (!result.ok) return problemResponse(context, result.error);
    if (definition.present) return definition.present(result.value);
    return Response.json(result.value ?? null);
  };
  return Object.assign(handle, { can: definition.can });
}
