import { auditQuery } from '#contracts/audit.ts';
import { defineRoute } from '#server/http/route.ts';
import { readAuditLog } from '#server/services/readAuditLog.ts';

export const GET = defineRoute({
  can: 'read the audit log',
  query: auditQuery,
  run: ({ query }) => readAuditLog(query),
});
