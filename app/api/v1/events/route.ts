import { endpoints } from '@/lib/contracts/endpoints';
import { streamRoute } from '@/lib/http/stream';

export const GET = streamRoute(endpoints.streamEvents);
