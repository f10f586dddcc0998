import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { getShared } from '@/lib/services/shares/shared';

export const GET = route(endpoints.getShared, ({ params, query }) => getShared(params.token, { again: query.again !== undefined }));
