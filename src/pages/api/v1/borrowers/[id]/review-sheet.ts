import { idParams } from '#contracts/ids.ts';
import { download, XLSX } from '#server/http/download.ts';
import { defineRoute } from '#server/http/route.ts';
import { exportReviewSheet } from '#server/services/exportReviewSheet.ts';

export const GET = defineRoute({
  can: 'read borrower',
  params: idParams,
  run: ({ actor, params }) => exportReviewSheet(actor, params.id),
  present: ({ bytes, fileName }) => download(bytes, fileName, XLSX),
});
