import { endpoints } from '@/lib/contracts/endpoints';
import { fileResponse } from '@/lib/http/file';
import { route } from '@/lib/http/route';
import { printLabels } from '@/lib/services/labels/print';

export const GET = route(endpoints.printLabels, async ({ actor, params, query, headers }) => {
  const { pdf, filename } = await printLabels(actor, params.id, query);
  return fileResponse(new Uint8Array(pdf), { type: 'application/pdf', filename, show: true, headers });
});
