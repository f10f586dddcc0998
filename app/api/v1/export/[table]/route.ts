import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { streamedFile } from '@/lib/http/stream-file';
import { exportTable, type ExportedTable } from '@/lib/services/exports/tables';

export const GET = route(endpoints.exportTable, async ({ actor, params, query }) =>
  streamedFile(await exportTable(actor, params.table.replace('.csv', '') as ExportedTable, query.batch ?? null), { type: 'text/csv; charset=utf-8', filename: params.table }),
);
