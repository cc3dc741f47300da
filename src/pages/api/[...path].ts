import type { APIRoute } from 'astro';
import { problemResponse } from '#server/http/problem.ts';

/** Whatever no other route answers to. */
export const ALL: APIRoute = (context) =>
  problemResponse(context, {
    status: 404,
    title: 'Not found',
    detail: 'There is nothing here that you can see.',
  });
