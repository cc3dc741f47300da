/**
 * How a route is made that a plain form posts to. The same address takes application/json, with the same schema
 * and the same service: JSON is answered with JSON or a problem, a form with 303 to a page.
 */
import type { APIContext, APIRoute } from 'astro';
import type { z } from 'zod';
import type { ServiceProblem } from '../../contracts/problem.ts';
import { err, ok, type Result } from '../../core/result.ts';
import { mayAnywhere, type Person } from '../auth/policy.ts';
import { keepAnswer } from './formAnswer.ts';
import { fieldErrors, plainProblem, problemResponse, type PlainProblem } from './problem.ts';
import {
  givenTwice,
  idempotencyKey,
  mediaType,
  readJson,
  repeatedName,
  roleMayNot,
  SIGN_IN_FIRST,
} from './request.ts';
import type { RequestActor, RouteRight } from './route.ts';

/** Nobody need be signed in where anyone may send the form. */
type FormActor<Right> = Right extends 'anyone'
  ? Omit<RequestActor, 'person'> & { readonly person: Person | null }
  : RequestActor;

interface FormDefinition<Right extends RouteRight, Body, Value> {
  readonly can: Right;
  readonly body: z.ZodType<Body>;
  /** The page that shows what is wrong, made from what was sent. */
  readonly page: (sent: Readonly<Record<string, string>>) => string;
  /** Fields whose text comes back with the page. Never a password, never a token. */
  readonly keep: readonly string[];
  readonly run: (input: {
    readonly actor: FormActor<Right>;
    readonly body: Body;
    readonly context: APIContext;
  }) => Promise<Result<Value, ServiceProblem>>;
  /** Sets cookies where that is the point, and says where a form leads to; null is answered as JSON is. */
  readonly done: (value: Value, context: APIContext) => string | null;
  /** Answer to JSON; 204 where left out. */
  readonly present?: (value: Value) => Response;
}

export interface DefinedForm extends APIRoute {
  readonly can: RouteRight;
}

export function defineForm<Right extends RouteRight, Body, Value>(
  definition: FormDefinition<Right, Body, Value>,
): DefinedForm {
  const { can } = definition;
  const handle = async (context: APIContext): Promise<Response> => {
    const { person, requestId, address, now } = context.locals;
    if (!person && can !== 'anyone') return problemResponse(context, SIGN_IN_FIRST);
    if (can !== 'anyone' && can !== 'signed in' && !(person && mayAnywhere(person, can)))
      return problemResponse(context, roleMayNot(can));
    const key = idempotencyKey(context.request);
    if (!key.ok) return problemResponse(context, key.error);

    const isForm = FORM_TYPES.includes(mediaType(context.request));
    const read = isForm ? await readForm(context.request) : await readJson(context.request);
    if (!read.ok) return problemResponse(context, read.error);
    const sent = isForm ? (read.value as Record<string, string>) : {};
    const refuse = (problem: PlainProblem): Response =>
      isForm ? backToPage(context, definition, sent, problem) : problemResponse(context, problem);

    const parsed = definition.body.safeParse(read.value);
    if (!parsed.success)
      return refuse({
        status: 422,
        title: 'Cannot be used',
        detail: 'Some of what was sent cannot be used; each field says why. Nothing was changed.',
        errors: fieldErrors(parsed.error),
      });
    const actor = { person, requestId, address, now, idempotencyKey: key.value } as FormActor<Right>;
    const result = await definition.run({ actor, body: parsed.data, context });
    if (!result.ok) return refuse(plainProblem(result.error));
    const location = definition.done(result.value, context);
    if (isForm && location !== null) return context.redirect(location, 303);
    return definition.present?.(result.value) ?? new Response(null, { status: 204 });
  };
  return Object.assign(handle, { can });
}

const FORM_TYPES = ['application/x-www-form-urlencoded', 'multipart/form-data'];

async function readForm(request: Request): Promise<Result<Record<string, string>, PlainProblem>> {
  let entries: [string, FormDataEntryValue][];
  try {
    entries = [...(await request.formData()).entries()];
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    return err({
      status: 400,
      title: 'Not a form',
      detail: 'The body cannot be read as a form. Nothing was changed.',
    });
  }
  const twice = repeatedName(entries);
  if (twice !== null) return err(givenTwice(twice));
  const texts = entries.filter((entry): entry is [string, string] => typeof entry[1] === 'string');
  return ok(Object.fromEntries(texts));
}

function backToPage(
  context: APIContext,
  form: Pick<FormDefinition<RouteRight, unknown, unknown>, 'page' | 'keep'>,
  sent: Readonly<Record<string, string>>,
  problem: PlainProblem,
): Response {
  const location = form.page(sent);
  const kept = form.keep.flatMap((name) => (sent[name] === undefined ? [] : [[name, sent[name]] as const]));
  keepAnswer(context.cookies, {
    page: new URL(location, context.url).pathname,
    detail: problem.detail,
    errors: (problem.errors ?? []).map(({ field, message }) => ({ field: field ?? '', message })),
    typed: Object.fromEntries(kept),
  });
  const headers: Record<string, string> = { location };
  if (problem.retryAfterSeconds !== undefined) headers['retry-after'] = String(problem.retryAfterSeconds);
  return new Response(null, { status: 303, headers });
}
