import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { openTakeLink, useTakeLink } from '@/lib/services/alerts/take-links';

export const GET = route(endpoints.getTakeLink, ({ params }) => openTakeLink(params.token));
export const POST = route(endpoints.useTakeLink, ({ params }) => useTakeLink(params.token));
