import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { listMutes } from '@/lib/services/messages/mutes';

export const GET = route(endpoints.listMutes, ({ actor }) => listMutes(actor));
