import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { confirmMailChange } from '@/lib/services/people/change-mail';

export const POST = route(endpoints.confirmMail, ({ body }) => confirmMailChange(body.token));
