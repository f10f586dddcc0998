import { endpoints } from '@/lib/contracts/endpoints';
import { fileResponse } from '@/lib/http/file';
import { route } from '@/lib/http/route';
import { trailAsCsv } from '@/lib/services/audit/list';

export const GET = route(endpoints.exportTrailCsv, async ({ actor, query, headers }) => fileResponse(await trailAsCsv(actor, query), { type: 'text/csv; charset=utf-8', filename: 'audit-trail.csv', headers }));
