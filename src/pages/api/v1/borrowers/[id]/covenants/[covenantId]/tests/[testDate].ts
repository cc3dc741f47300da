import { testParams } from '#contracts/ids.ts';
import { download, XLSX } from '#server/http/download.ts';
import { defineRoute } from '#server/http/route.ts';
import { exportReperformance } from '#server/services/exportReperformance.ts';

export const GET = defineRoute({
  can: 'read borrower',
  params: testParams,
  run: ({ actor, params }) => exportReperformance(actor, params),
  present: ({ bytes, fileName }) => download(bytes, fileName, XLSX),
});
