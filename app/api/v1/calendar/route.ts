import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { endCalendar, getCalendar, makeCalendar } from '@/lib/services/calendar/own';

export const GET = route(endpoints.getCalendar, ({ actor }) => getCalendar(actor));
export const POST = route(endpoints.makeCalendar, ({ actor }) => makeCalendar(actor));
export const DELETE = route(endpoints.endCalendar, ({ actor }) => endCalendar(actor));
