/**
 * How an island talks to /api/v1. Every answer is a value: a refusal is the problem that the server wrote, and an
 * outage is a problem that says so. Nothing here throws, so that nothing typed is lost.
 */
import type { ProblemBody } from '../../contracts/problem.ts';

export type Answer<T> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problem: ProblemBody };

export type Method = 'POST' | 'PUT' | 'PATCH' | 'DELETE';

export interface Sending {
  /** Sent as JSON; a FormData goes as it is, for files. */
  readonly body?: unknown;
  /** The version that the person has seen, for If-Match. */
  readonly version?: number;
  /** Made once per intention and kept while it is tried again, so that a lost answer does not double the write. */
  readonly idempotencyKey?: string;
  readonly signal?: AbortSignal;
}

export const SESSION_ENDED_STATUS = 401;

/** Where a person signs in again without leaving the page. */
export const SIGN_IN_PATH = '/sign-in';

export const newIdempotencyKey = (): string => crypto.randomUUID();

/** A write that is sent again with the same key or version is not done twice. */
type Kind = 'read' | 'repeatable write' | 'write';

/** `path` starts after /api/v1: get<Page<AlertRow>>('/alerts?page=2'). */
export function get<T>(path: string, signal?: AbortSignal): Promise<Answer<T>> {
  return ask<T>(path, { headers: { accept: 'application/json' }, ...(signal && { signal }) }, 'read');
}

export function send<T>(method: Method, path: string, sending: Sending = {}): Promise<Answer<T>> {
  const { body, version, idempotencyKey, signal } = sending;
  const isForm = body instanceof FormData;
  const headers: Record<string, string> = { accept: 'application/json' };
  if (body !== undefined && !isForm) headers['content-type'] = 'application/json';
  if (version !== undefined) headers['if-match'] = `"${version}"`;
  if (idempotencyKey !== undefined) headers['idempotency-key'] = idempotencyKey;
  const init: RequestInit = { method, headers, ...(signal && { signal }) };
  if (body !== undefined) init.body = isForm ? body : JSON.stringify(body);
  const repeatable = version !== undefined || idempotencyKey !== undefined;
  return ask<T>(path, init, repeatable ? 'repeatable write' : 'write');
}

/** A refused read as an exception, for react-query, which tells failures by what is thrown. */
export class Refusal extends Error {
  readonly problem: ProblemBody;

  constructor(problem: ProblemBody) {
    super(problem.detail);
    this.name = 'Refusal';
    this.problem = problem;
  }
}

/** queryFn: ({ signal }) => getOrThrow<Page<AlertRow>>('/alerts', signal) */
export async function getOrThrow<T>(path: string, signal?: AbortSignal): Promise<T> {
  const answer = await get<T>(path, signal);
  if (!answer.ok) throw new Refusal(answer.problem);
  return answer.value;
}

async function ask<T>(path: string, init: RequestInit, kind: Kind): Promise<Answer<T>> {
  let response: Response;
  try {
    response = await fetch(`/api/v1${path}`, { ...init, credentials: 'same-origin' });
  } catch (cause) {
    if (!(cause instanceof TypeError)) throw cause;
    return { ok: false, problem: noAnswer(path, kind) };
  }
  if (response.status === SESSION_ENDED_STATUS) return { ok: false, problem: sessionEnded(path, kind) };
  if (!response.ok) return { ok: false, problem: await problemOf(response, path, kind) };
  if (response.status === 204) return { ok: true, value: undefined as T };
  const body = await jsonOf(response);
  return body.read ? { ok: true, value: body.json as T } : { ok: false, problem: noAnswer(path, kind) };
}

/** What the server wrote; where something in between answered in its place, that it could not be reached. */
async function problemOf(response: Response, path: string, kind: Kind): Promise<ProblemBody> {
  const body = await jsonOf(response);
  if (body.read && isProblem(body.json)) return body.json;
  return response.status === 503 ? notReached(path) : noAnswer(path, kind, response.status);
}

type Body = { readonly read: true; readonly json: unknown } | { readonly read: false };

/** A body that is cut or is no JSON is as good as none. */
async function jsonOf(response: Response): Promise<Body> {
  try {
    return { read: true, json: await response.json() };
  } catch (cause) {
    if (!(cause instanceof SyntaxError || cause instanceof TypeError)) throw cause;
    return { read: false };
  }
}

function isProblem(body: unknown): body is ProblemBody {
  return (
    typeof body === 'object' &&
    body !== null &&
    'title' in body &&
    typeof body.title === 'string' &&
    'detail' in body &&
    typeof body.detail === 'string'
  );
}

/** Refused at the door: the request did not get as far as changing anything. */
function notReached(path: string): ProblemBody {
  return {
    type: '/problems/no-answer',
    title: 'No answer',
    status: 503,
    detail: 'The server does not answer. Nothing was changed. Try again.',
    instance: `/api/v1${path}`,
  };
}

/** The line was cut. A write may have been done before that, and then it would be false to say that it was not. */
function noAnswer(path: string, kind: Kind, status = 503): ProblemBody {
  const whatNow = {
    read: 'Nothing was changed. Try again.',
    'repeatable write': 'Try again: should it have been done before the line was cut, it is not done twice.',
    write: 'It may have been done before the line was cut: look before you try again.',
  }[kind];
  return { ...notReached(path), status, detail: `The server does not answer. ${whatNow}` };
}

function sessionEnded(path: string, kind: Kind): ProblemBody {
  const typed = kind === 'read' ? '' : ', and what you typed is still here';
  return {
    type: '/problems/sign-in-first',
    title: 'Your session has ended',
    status: SESSION_ENDED_STATUS,
    detail: `Nothing was changed${typed}. Sign in in a new tab, then come back and try again.`,
    instance: `/api/v1${path}`,
  };
}
