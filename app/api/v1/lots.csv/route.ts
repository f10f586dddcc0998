import { endpoints } from '@/lib/contracts/endpoints';
import { fileResponse } from '@/lib/http/file';
import { route } from '@/lib/http/route';
import { exportLots } from '@/lib/services/lots/export';

export const GET = route(endpoints.exportLots, async ({ actor, query, headers }) => fileResponse(await exportLots(actor, query), { type: 'text/csv; charset=utf-8', filename: 'cellar-book.csv', headers }));
