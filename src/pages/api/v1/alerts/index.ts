import { alertQuery } from '#contracts/alerts.ts';
import { defineRoute } from '#server/http/route.ts';
import { listAlerts } from '#server/services/listAlerts.ts';

export const GET = defineRoute({
  can: 'read borrower',
  query: alertQuery,
  run: ({ actor, query }) => listAlerts(actor, query),
});
