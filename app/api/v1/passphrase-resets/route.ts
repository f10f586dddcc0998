import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { resetPassphrase } from '@/lib/services/people/passphrase';

export const POST = route(endpoints.resetPassphrase, ({ body }) => resetPassphrase(body));
