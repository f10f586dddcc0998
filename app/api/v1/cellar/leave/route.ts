import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { leaveCellar } from '@/lib/services/cellars/members';

export const POST = route(endpoints.leaveCellar, ({ actor }) => leaveCellar(actor));
