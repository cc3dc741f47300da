import { defineRoute } from '#server/http/route.ts';
import { checkAuditLog } from '#server/services/readAuditLog.ts';

export const GET = defineRoute({ can: 'read the audit log', run: () => checkAuditLog() });
