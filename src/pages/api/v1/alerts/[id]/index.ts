import { idParams } from '#contracts/ids.ts';
import { defineRoute } from '#server/http/route.ts';
import { showAlert } from '#server/services/showAlert.ts';

export const GET = defineRoute({
  can: 'read borrower',
  params: idParams,
  run: ({ actor, params }) => showAlert(actor, params.id),
});
