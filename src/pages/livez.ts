import type { APIRoute } from 'astro';

/** The process answers: nothing else is asked, least of all the database. */
export const GET: APIRoute = () =>
  new Response('live\n', { headers: { 'content-type': 'text/plain; charset=utf-8' } });
