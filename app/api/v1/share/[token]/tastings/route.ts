import { endpoints } from '@/lib/contracts/endpoints';
import { addressOf } from '@/lib/http/address';
import { route } from '@/lib/http/route';
import { tasteShared } from '@/lib/services/shares/shared';

export const POST = route(endpoints.tasteShared, ({ params, body, request }) => tasteShared(params.token, body, addressOf(request)));
