import { importQuery } from '#contracts/imports.ts';
import { idParams } from '#contracts/ids.ts';
import { err } from '#core/result.ts';
import { defineRoute } from '#server/http/route.ts';
import { readUpload } from '#server/http/upload.ts';
import { listImports } from '#server/services/listImports.ts';
import { stageImport } from '#server/services/stageImport.ts';

export const GET = defineRoute({
  can: 'read borrower',
  query: importQuery,
  run: ({ actor, query }) => listImports(actor, query),
});

export const POST = defineRoute({
  can: 'import figures',
  run: async ({ actor, request }) => {
    const upload = await readUpload(request);
    if (!upload.ok) return upload;
    const borrower = idParams.safeParse({ id: upload.value.fields.get('borrowerId') });
    if (!borrower.success) return err({ kind: 'not-found', what: 'borrower' });
    const { name, bytes } = upload.value.file;
    return stageImport(actor, { borrowerId: borrower.data.id, fileName: name, bytes });
  },
});
