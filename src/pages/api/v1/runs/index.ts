import { newRun, runQuery } from '#contracts/runs.ts';
import { defineRoute } from '#server/http/route.ts';
import { listRuns } from '#server/services/listRuns.ts';
import { startRun } from '#server/services/startRun.ts';

export const GET = defineRoute({
  can: 'administer',
  query: runQuery,
  run: ({ actor, query }) => listRuns(actor, query),
});

export const POST = defineRoute({
  can: 'administer',
  body: newRun,
  run: ({ actor, body }) => startRun(actor, body),
});
