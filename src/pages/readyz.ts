import type { APIRoute } from 'astro';
import { readiness } from '../server/services/readiness.ts';

export const GET: APIRoute = async ({ locals }) => {
  const { isReady, checks } = await readiness(locals.now);
  return Response.json({ status: isReady ? 'ready' : 'not ready', checks }, { status: isReady ? 200 : 503 });
};
