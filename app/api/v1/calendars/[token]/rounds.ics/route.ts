import { endpoints } from '@/lib/contracts/endpoints';
import { fileResponse } from '@/lib/http/file';
import { route } from '@/lib/http/route';
import { readCalendar } from '@/lib/services/calendar/read';

export const GET = route(endpoints.readCalendar, async ({ params, headers }) => fileResponse(await readCalendar(params.token), { type: 'text/calendar; charset=utf-8', filename: 'rounds.ics', headers }));
