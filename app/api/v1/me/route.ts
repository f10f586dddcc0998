import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getMe } from '@/lib/services/people/get-me';

export const GET = route(endpoints.getMe, ({ actor }) => getMe(actor));
