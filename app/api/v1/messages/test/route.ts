import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { sendTestMessage } from '@/lib/services/messages/send-test';

export const POST = route(endpoints.sendTestMessage, ({ actor }) => sendTestMessage(actor));
