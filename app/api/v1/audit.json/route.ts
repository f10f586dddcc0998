import { endpoints } from '@/lib/contracts/endpoints';
import { fileResponse } from '@/lib/http/file';
import { route } from '@/lib/http/route';
import { trailAsJson } from '@/lib/services/audit/list';

export const GET = route(endpoints.exportTrailJson, async ({ actor, query, headers }) => fileResponse(await trailAsJson(actor, query), { type: 'application/json', filename: 'audit-trail.json', headers }));
